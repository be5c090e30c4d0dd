import fc from 'fast-check';
import { expect, test } from 'vitest';
import { PORT_OHM } from '../../app/levers/net-ports.ts';
import { portExcitations, portMatrix } from '../../app/levers/port-excitation.ts';
import type { Network } from '../../app/network/network.ts';
import { solveNetwork } from '../../app/network/solve-network.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { expectClose } from '../support/expect-close.ts';

const line = (z0Ohm: number, epsilonEff = 3, lossNpPerM = 0) => ({ z0Ohm, epsilonEff, alphaNpPerM: () => lossNpPerM });

/** What a net's real response is as the mixture of its unit responses: node voltages. */
function mixture(
  base: Pick<Network, 'nodeCount' | 'sections' | 'branches'>,
  nodes: readonly number[],
  real: Network,
  hz: number,
) {
  const unit: Network = { ...base, drives: nodes.map((node) => ({ node, resistanceOhm: PORT_OHM })), loads: [] };
  const responses = solveNetwork(unit, hz);
  const portOf = (node: number) => nodes.indexOf(node);
  const terminals = {
    drives: real.drives.map(({ node, resistanceOhm }) => ({ port: portOf(node), resistanceOhm })),
    loads: real.loads.map(({ node, resistanceOhm = Infinity, capacitanceF }) => ({
      port: portOf(node),
      resistanceOhm,
      capacitanceF,
    })),
  };
  return real.drives.map((_, driven) => {
    const source = new Float64Array(2 * real.drives.length);
    source[2 * driven] = 1;
    const [amplitudes] = portExcitations(portMatrix(responses, nodes), terminals, hz, [source]);
    const voltages = new Float64Array(2 * base.nodeCount);
    for (const [p, { nodeVoltages }] of responses.entries()) {
      const [re, im] = [amplitudes![2 * p]!, amplitudes![2 * p + 1]!];
      for (let i = 0; i < voltages.length; i += 2) {
        voltages[i]! += re * nodeVoltages[i]! - im * nodeVoltages[i + 1]!;
        voltages[i + 1]! += re * nodeVoltages[i + 1]! + im * nodeVoltages[i]!;
      }
    }
    return voltages;
  });
}

test('a loaded lossless line: voltage at the load by the textbook (D. M. Pozar, Microwave Engineering, 2.3)', () => {
  const [hz, lengthM, z0, sourceOhm, loadOhm] = [300e6, 0.13, 70, 20, 300];
  const base = { nodeCount: 2, sections: [{ nodeA: 0, nodeB: 1, lengthM, line: line(z0) }], branches: [] };
  const real: Network = {
    ...base,
    drives: [{ node: 0, resistanceOhm: sourceOhm }],
    loads: [{ node: 1, resistanceOhm: loadOhm, capacitanceF: 0 }],
  };
  const [voltages] = mixture(base, [0, 1], real, hz);
  // V_L = U / [(1 + R/Z_L) cos θ + j (Z0/Z_L + R/Z0) sin θ], from the line's chain matrix.
  const theta = ((2 * Math.PI * hz * Math.sqrt(3)) / SPEED_OF_LIGHT_M_PER_S) * lengthM;
  const re = (1 + sourceOhm / loadOhm) * Math.cos(theta);
  const im = (z0 / loadOhm + sourceOhm / z0) * Math.sin(theta);
  const size = re * re + im * im;
  expectClose(voltages![2]!, re / size, { rel: 1e-12, because: 'rounding' });
  expectClose(voltages![3]!, -im / size, { rel: 1e-12, because: 'rounding' });
});

test('any terminals of a branched net: the mixture of unit responses is the solved net', () => {
  const base = {
    nodeCount: 4,
    sections: [
      { nodeA: 0, nodeB: 1, lengthM: 0.03, line: line(60, 3, 0.4) },
      { nodeA: 1, nodeB: 2, lengthM: 0.05, line: line(75) },
      { nodeA: 1, nodeB: 3, lengthM: 0.02, line: line(45, 2.5) },
    ],
    branches: [],
  };
  const ohm = fc.constantFrom(0, 1e-6, 3, 50, 1e4);
  const load = fc.record({
    resistanceOhm: fc.constantFrom(0, 1e-3, 75, 1e6, Infinity),
    capacitanceF: fc.constantFrom(0, 3e-12, 1e-7),
  });
  fc.assert(
    fc.property(
      fc.tuple(ohm, ohm),
      fc.tuple(load, load),
      fc.constantFrom(30e6, 470e6, 2.3e9),
      ([one, two], loads, hz) => {
        fc.pre(!(two === 0 && loads[1]!.resistanceOhm === 0));
        const real: Network = {
          ...base,
          drives: [
            { node: 0, resistanceOhm: one },
            { node: 2, resistanceOhm: two },
          ],
          loads: loads.map((own, i) => ({ node: i === 0 ? 3 : 2, ...own })),
        };
        const solved = solveNetwork(real, hz);
        for (const [d, voltages] of mixture(base, [0, 2, 3], real, hz).entries()) {
          // 1 V drives; a shorted driver's own response is 0.
          const size = Math.max(1e-6, ...solved[d]!.nodeVoltages.map(Math.abs));
          for (const [i, value] of voltages.entries()) {
            // Near the resonances of a lossless net the conditions amplify rounding.
            expect(Math.abs(value - solved[d]!.nodeVoltages[i]!) / size).toBeLessThan(1e-9);
          }
        }
      },
    ),
    { seed: 20261207, numRuns: 200 },
  );
});
