import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Network, NetworkResponse } from '../../app/network/network.ts';
import { solveNetwork } from '../../app/network/solve-network.ts';
import { abs, add, at, type C, mul, solveDenseNetwork, sub } from '../support/dense-network.ts';
import { expectPhasor, line, lineAt, net, wavelengthM } from './support.ts';

const SEED = 20_417;

const conjugateRe = (a: C, b: C): number => a[0] * b[0] + a[1] * b[1];

/** A connected random net: a tree of sections (some of them vias), further sections as loops, drives and loads. */
const anyNet = ({ loops, isLossless }: { loops: number; isLossless: boolean }) =>
  fc.integer({ min: 2, max: 14 }).chain((nodeCount) => {
    const node = fc.integer({ min: 0, max: nodeCount - 1 });
    const part = fc.record({
      pick: fc.double({ min: 0, max: 0.999, noNaN: true }),
      lengthM: fc.oneof(
        fc.double({ min: 1e-4, max: 0.2, noNaN: true }),
        fc.double({ min: 1e-6, max: 1e-5, noNaN: true }),
      ),
      z0Ohm: fc.double({ min: 20, max: 200, noNaN: true }),
      epsilonEff: fc.double({ min: 1, max: 9, noNaN: true }),
      alpha: isLossless ? fc.constant(0) : fc.double({ min: 0.05, max: 3, noNaN: true }),
      isVia: fc.integer({ min: 0, max: 5 }).map((value) => value === 0),
    });
    const drive = fc.record({ node, resistanceOhm: fc.double({ min: 1, max: 100, noNaN: true }) });
    const load = fc.record({
      node,
      resistanceOhm: fc.double({ min: 5, max: 1e4, noNaN: true }),
      capacitanceF: fc.double({ min: 0, max: 2e-11, noNaN: true }),
    });
    return fc
      .record({
        tree: fc.array(part, { minLength: nodeCount - 1, maxLength: nodeCount - 1 }),
        extra: fc.array(fc.record({ part, a: node, b: node }), { maxLength: loops }),
        drives: fc.array(drive, { minLength: 1, maxLength: 3 }),
        loads: fc.array(load, { maxLength: 4 }),
      })
      .map(({ tree, extra, drives, loads }): Network => {
        const sectionOf = (nodeA: number, nodeB: number, p: (typeof tree)[number]) => ({
          nodeA,
          nodeB,
          lengthM: p.lengthM,
          line: line(p.z0Ohm, p.epsilonEff, p.alpha),
        });
        const links = tree.map((p, i) => ({ a: Math.floor(p.pick * (i + 1)), b: i + 1, p }));
        return net(nodeCount, {
          sections: [
            ...links.filter(({ p }) => !p.isVia).map(({ a, b, p }) => sectionOf(a, b, p)),
            ...extra.filter(({ a, b }) => a !== b).map(({ a, b, part: p }) => sectionOf(a, b, p)),
          ],
          branches: links
            .filter(({ p }) => p.isVia)
            .map(({ a, b, p }) => ({ nodeA: a, nodeB: b, inductanceH: p.z0Ohm * 1e-11 })),
          drives,
          loads,
        });
      });
  });

const anyFrequencyHz = fc.double({ min: 1e6, max: 6e9, noNaN: true });

/** Largest violation of: V at section ends = node voltage; Kirchhoff at nodes; source and load laws. In V, or 50 Ω times A. */
function violation(network: Network, response: NetworkResponse, frequencyHz: number, driveIndex: number): number {
  let worst = 0;
  const check = (difference: C, scale: number) => {
    worst = Math.max(worst, abs(difference) * scale);
  };
  const leaving = Array.from({ length: network.nodeCount }, (): C => [0, 0]);
  const leave = (node: number, current: C) => {
    leaving[node] = add(leaving[node]!, current);
  };
  for (const [i, section] of network.sections.entries()) {
    const start = lineAt(network, response, frequencyHz, i, 0);
    const end = lineAt(network, response, frequencyHz, i, section.lengthM);
    check(sub(start.voltage, at(response.nodeVoltages, section.nodeA)), 1);
    check(sub(end.voltage, at(response.nodeVoltages, section.nodeB)), 1);
    leave(section.nodeA, start.current);
    leave(section.nodeB, mul([-1, 0], end.current));
  }
  for (const [i, { nodeA, nodeB, inductanceH }] of network.branches.entries()) {
    const current = at(response.branchCurrents, i);
    const across = sub(at(response.nodeVoltages, nodeA), at(response.nodeVoltages, nodeB));
    check(sub(across, mul([0, 2 * Math.PI * frequencyHz * inductanceH], current)), 1);
    leave(nodeA, current);
    leave(nodeB, mul([-1, 0], current));
  }
  for (const [i, { node, resistanceOhm }] of network.drives.entries()) {
    const current = at(response.driveCurrents, i);
    const source: C = [i === driveIndex ? 1 : 0, 0];
    check(sub(sub(source, mul([resistanceOhm, 0], current)), at(response.nodeVoltages, node)), 1);
    leave(node, mul([-1, 0], current));
  }
  for (const [i, { node, resistanceOhm = Infinity, capacitanceF }] of network.loads.entries()) {
    const current = at(response.loadCurrents, i);
    const voltage = at(response.nodeVoltages, node);
    if (resistanceOhm === 0) check(voltage, 1);
    else check(sub(current, mul([1 / resistanceOhm, 2 * Math.PI * frequencyHz * capacitanceF], voltage)), 50);
    leave(node, current);
  }
  for (const current of leaving) check(current, 50);
  return worst;
}

/** Largest voltage or Z0·current anywhere, V: what rounding is relative to. */
const sizeOf = (network: Network, response: NetworkResponse): number =>
  Math.max(
    1,
    ...response.nodeVoltages.map(Math.abs),
    ...network.sections.flatMap(({ line: { z0Ohm } }, i) => [
      z0Ohm * abs(at(response.forward, i)),
      z0Ohm * abs(at(response.backward, i)),
    ]),
  );

describe('random nets', () => {
  it('agree with dense nodal analysis by Y-parameters', () => {
    fc.assert(
      fc.property(anyNet({ loops: 3, isLossless: false }), anyFrequencyHz, (network, frequencyHz) => {
        for (const [d, response] of solveNetwork(network, frequencyHz).entries()) {
          const dense = solveDenseNetwork(network, frequencyHz, d);
          const because = 'Y-parameters of 1 µm sections are 1e6 of Z0 and more: the oracle loses digits';
          const floor = sizeOf(network, response);
          for (const [i, voltage] of dense.nodeVoltages.entries()) {
            expectPhasor(at(response.nodeVoltages, i), voltage, 1e-8, because, floor);
          }
          for (const [i, section] of network.sections.entries()) {
            const { current } = lineAt(network, response, frequencyHz, i, section.lengthM);
            expectPhasor(mul([-1, 0], current), dense.intoB[i]!, 1e-8, because, floor / 20);
            expectPhasor(
              lineAt(network, response, frequencyHz, i, 0).current,
              dense.intoA[i]!,
              1e-8,
              because,
              floor / 20,
            );
          }
          for (const [i, current] of dense.driveCurrents.entries()) {
            expectPhasor(at(response.driveCurrents, i), current, 1e-8, because, floor / 20);
          }
        }
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it.each([true, false])(
    'satisfy Kirchhoff and every element law at all frequencies of a sweep (lossless: %s)',
    (isLossless) => {
      fc.assert(
        fc.property(
          anyNet({ loops: 3, isLossless }),
          fc.array(anyFrequencyHz, { minLength: 4, maxLength: 8 }),
          (network, sweep) => {
            for (const frequencyHz of sweep) {
              for (const [d, response] of solveNetwork(network, frequencyHz).entries()) {
                const allowed = 1e-10 * sizeOf(network, response);
                expect(violation(network, response, frequencyHz, d)).toBeLessThanOrEqual(allowed);
              }
            }
          },
        ),
        { seed: SEED, numRuns: 150 },
      );
    },
  );

  it('lossless nets of quarter waves, half waves and specks satisfy them too', () => {
    fc.assert(
      fc.property(
        anyNet({ loops: 2, isLossless: true }),
        fc.array(fc.integer({ min: 0, max: 4 }), { minLength: 16, maxLength: 16 }),
        (drawn, quarters) => {
          const frequencyHz = 250e6;
          const network: Network = {
            ...drawn,
            sections: drawn.sections.map((section, i) => ({
              ...section,
              lengthM:
                quarters[i]! === 0 ? 1e-7 : (quarters[i]! * wavelengthM(frequencyHz, section.line.epsilonEff)) / 4,
            })),
          };
          // A first frequency off all resonances, whose pivots are no good at the second.
          solveNetwork(network, 0.61 * frequencyHz);
          for (const [d, response] of solveNetwork(network, frequencyHz).entries()) {
            const allowed = 1e-10 * sizeOf(network, response);
            expect(violation(network, response, frequencyHz, d)).toBeLessThanOrEqual(allowed);
          }
        },
      ),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('balance power: sources = loads + lines', () => {
    fc.assert(
      fc.property(anyNet({ loops: 3, isLossless: false }), anyFrequencyHz, (network, frequencyHz) => {
        const [response] = solveNetwork(network, frequencyHz);
        const sourceW = conjugateRe([1, 0], at(response!.driveCurrents, 0)) / 2;
        let usedW = 0;
        for (const [i, { resistanceOhm }] of network.drives.entries()) {
          usedW += (resistanceOhm * abs(at(response!.driveCurrents, i)) ** 2) / 2;
        }
        for (const { node, resistanceOhm } of network.loads) {
          usedW += abs(at(response!.nodeVoltages, node)) ** 2 / resistanceOhm! / 2;
        }
        for (const [i, section] of network.sections.entries())
          usedW += lossW(network, response!, frequencyHz, i, section.lengthM);
        expect(Math.abs(sourceW - usedW)).toBeLessThanOrEqual(1e-9 * Math.max(sourceW, usedW));
      }),
      { seed: SEED, numRuns: 100 },
    );
  });

  it('are reciprocal: the current at drive 2 for 1 V at drive 1 is that at drive 1 for 1 V at drive 2', () => {
    fc.assert(
      fc.property(anyNet({ loops: 3, isLossless: true }), anyFrequencyHz, (network, frequencyHz) => {
        const responses = solveNetwork(network, frequencyHz);
        if (responses.length < 2) return;
        const [one, two] = [at(responses[0]!.driveCurrents, 1), at(responses[1]!.driveCurrents, 0)];
        const floor = Math.max(abs(at(responses[0]!.driveCurrents, 0)), abs(at(responses[1]!.driveCurrents, 1)));
        expectPhasor(one, two, 1e-9, 'reciprocity', floor);
      }),
      { seed: SEED, numRuns: 150 },
    );
  });
});

/** ∫ (R|I|² + G|V|²)/2 ds with R = αZ0, G = α/Z0, by Simpson's rule on ever finer steps. */
function lossW(
  network: Network,
  response: NetworkResponse,
  frequencyHz: number,
  section: number,
  lengthM: number,
): number {
  const { line: own } = network.sections[section]!;
  const alpha = own.alphaNpPerM(frequencyHz);
  const densityW = (atM: number): number => {
    const { current, voltage } = lineAt(network, response, frequencyHz, section, atM);
    return (alpha / 2) * (own.z0Ohm * abs(current) ** 2 + abs(voltage) ** 2 / own.z0Ohm);
  };
  const steps = 2 * Math.ceil(20 + (100 * lengthM) / wavelengthM(frequencyHz, own.epsilonEff));
  let sum = densityW(0) + densityW(lengthM);
  for (let i = 1; i < steps; i++) sum += (i % 2 === 1 ? 4 : 2) * densityW((lengthM * i) / steps);
  return (sum * lengthM) / (3 * steps);
}

describe('special nets', () => {
  const stub = { nodeA: 0, nodeB: 1, lengthM: 0.2, line: line(50, 4, 0.1) };

  it('several drives: each response holds the others at 0 V behind their resistance', () => {
    const network = net(2, {
      sections: [stub],
      drives: [
        { node: 0, resistanceOhm: 0 },
        { node: 1, resistanceOhm: 35 },
      ],
    });
    const [first, second] = solveNetwork(network, 80e6);
    expectPhasor(at(first!.nodeVoltages, 0), [1, 0], 1e-13, 'ideal source');
    expectPhasor(at(first!.nodeVoltages, 1), mul([-35, 0], at(first!.driveCurrents, 1)), 1e-12, 'Ohm');
    expectPhasor(at(second!.nodeVoltages, 0), [0, 0], 1e-13, 'ideal source at 0 V', 1);
  });

  it('parts without a drive stay at 0 V, an isolated node and a floating via too', () => {
    const network = net(7, {
      sections: [stub, { ...stub, nodeA: 2, nodeB: 3 }],
      branches: [{ nodeA: 4, nodeB: 5, inductanceH: 1e-9 }],
      drives: [{ node: 0, resistanceOhm: 10 }],
    });
    for (const frequencyHz of [30e6, 31e6, 400e6]) {
      const [response] = solveNetwork(network, frequencyHz);
      expect(response!.nodeVoltages.slice(4).every((value) => value === 0)).toBe(true);
      expect(abs(at(response!.nodeVoltages, 1))).toBeGreaterThan(0.5);
      expect(abs(at(response!.branchCurrents, 0))).toBe(0);
    }
  });

  it('a net without drives has no response; one resonant without loss answers finitely', () => {
    expect(solveNetwork(net(2, { sections: [stub] }), 1e8)).toEqual([]);
    const frequencyHz = 1e8;
    const resonant = net(2, {
      sections: [{ nodeA: 0, nodeB: 1, lengthM: wavelengthM(frequencyHz) / 4, line: line(50) }],
      drives: [{ node: 0, resistanceOhm: 0 }],
    });
    const [response] = solveNetwork(resonant, frequencyHz);
    expect(abs(at(response!.nodeVoltages, 1))).toBeGreaterThan(1e9);
    expect(response!.forward.every(Number.isFinite)).toBe(true);
  });

  it('a section from a node to itself is a ring', () => {
    // By symmetry the far point of the ring carries no current: two open stubs of half the length in parallel.
    const ring = net(1, {
      sections: [{ nodeA: 0, nodeB: 0, lengthM: 0.5, line: line(90, 2) }],
      drives: [{ node: 0, resistanceOhm: 40 }],
    });
    const stubs = net(3, {
      sections: [1, 2].map((nodeB) => ({ nodeA: 0, nodeB, lengthM: 0.25, line: line(90, 2) })),
      drives: ring.drives,
    });
    const [one, other] = [ring, stubs].map((network) => solveNetwork(network, 210e6)[0]!);
    expectPhasor(at(one!.driveCurrents, 0), at(other!.driveCurrents, 0), 1e-12, 'the same circuit');
  });

  it.each<[string, Network, string]>([
    [
      'two ideal sources',
      net(1, {
        drives: [
          { node: 0, resistanceOhm: 0 },
          { node: 0, resistanceOhm: 0 },
        ],
      }),
      'drives[1]',
    ],
    [
      'a shorted ideal source',
      net(1, { drives: [{ node: 0, resistanceOhm: 0 }], loads: [{ node: 0, resistanceOhm: 0, capacitanceF: 0 }] }),
      'loads[0]',
    ],
    ['a node that is not there', net(1, { drives: [{ node: 1, resistanceOhm: 1 }] }), 'drives[0].node'],
    ['a negative length', net(2, { sections: [{ ...stub, lengthM: -1 }] }), 'sections[0].lengthM'],
    ['no impedance', net(2, { sections: [{ ...stub, line: line(0) }] }), 'sections[0].line.z0Ohm'],
    ['a negative capacitance', net(1, { loads: [{ node: 0, capacitanceF: -1 }] }), 'loads[0].capacitanceF'],
    ['a NaN inductance', net(2, { branches: [{ nodeA: 0, nodeB: 1, inductanceH: Number.NaN }] }), 'branches[0]'],
  ])('refuses %s', (_, network, path) => {
    expect(() => solveNetwork(network, 1e8)).toThrow(path);
  });

  it('refuses a frequency that is not positive', () => {
    for (const frequencyHz of [0, -1, Number.NaN, Infinity]) {
      expect(() => solveNetwork(net(1, {}), frequencyHz)).toThrow('frequencyHz');
    }
  });

  it('a tree of 20 000 sections is solved in linear work: dense elimination would take hours', () => {
    const count = 20_000;
    const network = net(count + 1, {
      // A bushy tree: every node hangs on one of about half its number, one long chain among them.
      sections: Array.from({ length: count }, (_, i) => ({
        nodeA: i % 3 === 0 ? i : Math.floor(i / 2),
        nodeB: i + 1,
        lengthM: 1e-4 + (i % 7) * 1e-4,
        line: line(40 + (i % 50), 3, 0.3),
      })),
      drives: [{ node: 0, resistanceOhm: 20 }],
      loads: [{ node: count, resistanceOhm: 60, capacitanceF: 1e-12 }],
    });
    const startMs = performance.now();
    const [response] = solveNetwork(network, 10e6);
    expect(performance.now() - startMs).toBeLessThan(20_000);
    expect(violation(network, response!, 10e6, 0)).toBeLessThan(1e-8 * sizeOf(network, response!));
  });
});

it('what comes out at a frequency does not depend on what was solved before, to the last bit', () => {
  fc.assert(
    fc.property(anyNet({ loops: 2, isLossless: false }), (network) => {
      const frequenciesHz = [30e6, 77e6, 410e6, 999e6, 5.1e9];
      const upward = frequenciesHz.map((hz) => solveNetwork(network, hz));
      // A copy is another network: nothing is known about it.
      const copy = { ...network };
      const downward = [...frequenciesHz].reverse().map((hz) => solveNetwork(copy, hz));
      expect(downward.reverse()).toEqual(upward);
    }),
    { numRuns: 60, seed: SEED },
  );
});
