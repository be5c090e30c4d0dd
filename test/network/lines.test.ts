import { describe, expect, it } from 'vitest';
import { solveNetwork } from '../../app/network/solve-network.ts';
import { add, at, type C, div, exp, gammaOf, mul, sub } from '../support/dense-network.ts';
import { expectPhasor, line, lineAt, net, wavelengthM } from './support.ts';

const FREQUENCY_HZ = 137e6;

/** Textbook input impedance, D. M. Pozar, Microwave Engineering, 4th ed., eq. 2.91. */
function inputImpedance(z0Ohm: number, gammaL: C, load: C): C {
  const forth = exp(gammaL);
  const back = exp([-gammaL[0], -gammaL[1]]);
  const sinh = mul([0.5, 0], sub(forth, back));
  const cosh = mul([0.5, 0], add(forth, back));
  const z0: C = [z0Ohm, 0];
  return div(mul(z0, add(mul(load, cosh), mul(z0, sinh))), add(mul(z0, cosh), mul(load, sinh)));
}

const oneLine = (
  lengthM: number,
  z0Ohm: number,
  alpha: number,
  sourceOhm: number,
  loads: { resistanceOhm?: number }[],
) =>
  net(2, {
    sections: [{ nodeA: 0, nodeB: 1, lengthM, line: line(z0Ohm, 3.2, alpha) }],
    drives: [{ node: 0, resistanceOhm: sourceOhm }],
    loads: loads.map((load) => ({ node: 1, capacitanceF: 0, ...load })),
  });

describe('one line', () => {
  it.each([0, 0.7])('matched: I(s) = V/(R + Z0) e^(−γs), loss %f Np/m', (alpha) => {
    const network = oneLine(0.83, 62, alpha, 21, [{ resistanceOhm: 62 }]);
    const [response] = solveNetwork(network, FREQUENCY_HZ);
    const [a, b] = gammaOf(network.sections[0]!, FREQUENCY_HZ);
    for (const atM of [0, 0.1, 0.4, 0.83]) {
      const expected = mul([1 / (21 + 62), 0], exp([-a * atM, -b * atM]));
      expectPhasor(lineAt(network, response!, FREQUENCY_HZ, 0, atM).current, expected, 1e-12, 'rounding');
    }
    expectPhasor(at(response!.backward, 0), [0, 0], 1e-13, 'no reflection', 1 / 83);
    expectPhasor(
      at(response!.loadCurrents, 0),
      lineAt(network, response!, FREQUENCY_HZ, 0, 0.83).current,
      1e-12,
      'same',
    );
  });

  it.each([
    ['a quarter wave transforms R to Z0²/R', 0.25, 20, [180, 0]],
    ['half a wave repeats R', 0.5, 20, [20, 0]],
    ['a whole wave repeats R', 1, 20, [20, 0]],
    ['three quarters', 0.75, 45, [80, 0]],
  ] as const)('lossless, exactly: %s', (_, waves, resistanceOhm, seen) => {
    const network = oneLine(waves * wavelengthM(FREQUENCY_HZ, 3.2), 60, 0, 7, [{ resistanceOhm }]);
    const [response] = solveNetwork(network, FREQUENCY_HZ);
    expectPhasor(at(response!.driveCurrents, 0), div([1, 0], add([7, 0], seen)), 1e-12, 'rounding of π');
  });

  it('near half a wavelength the input impedance stays right to rounding, however near', () => {
    for (const off of [1e-3, 1e-6, 1e-9, 1e-12, 0]) {
      const network = oneLine((0.5 + off) * wavelengthM(FREQUENCY_HZ, 3.2), 60, 1e-9, 7, [{ resistanceOhm: 20 }]);
      const [a, b] = mul(gammaOf(network.sections[0]!, FREQUENCY_HZ), [network.sections[0]!.lengthM, 0]);
      const expected = div([1, 0], add([7, 0], inputImpedance(60, [a, b], [20, 0])));
      expectPhasor(at(solveNetwork(network, FREQUENCY_HZ)[0]!.driveCurrents, 0), expected, 1e-12, 'rounding');
    }
  });

  it('open: Zin = Z0 coth γl, short: Z0 tanh γl', () => {
    for (const lengthM of [0.01, 0.3, 1.1]) {
      for (const [resistanceOhm, load] of [
        [undefined, [1e18, 0]],
        [0, [0, 0]],
      ] as const) {
        const network = oneLine(lengthM, 71, 0.3, 13, resistanceOhm === undefined ? [] : [{ resistanceOhm }]);
        const [a, b] = mul(gammaOf(network.sections[0]!, FREQUENCY_HZ), [lengthM, 0]);
        const expected = div([1, 0], add([13, 0], inputImpedance(71, [a, b], load)));
        const [response] = solveNetwork(network, FREQUENCY_HZ);
        expectPhasor(at(response!.driveCurrents, 0), expected, 1e-11, 'rounding');
        const end = lineAt(network, response!, FREQUENCY_HZ, 0, lengthM);
        if (resistanceOhm === 0) expectPhasor(end.voltage, [0, 0], 1e-13, 'shorted', 1);
        else expectPhasor(end.current, [0, 0], 1e-13, 'open', 1 / 71);
      }
    }
  });

  it('a lossless quarter-wave open stub shorts the node it hangs on, and itself stays finite', () => {
    const quarterM = wavelengthM(FREQUENCY_HZ, 2) / 4;
    const network = net(3, {
      sections: [
        { nodeA: 0, nodeB: 1, lengthM: 0.3, line: line(50, 3) },
        { nodeA: 1, nodeB: 2, lengthM: quarterM, line: line(80, 2) },
      ],
      drives: [{ node: 0, resistanceOhm: 50 }],
      loads: [{ node: 1, resistanceOhm: 33, capacitanceF: 2e-12 }],
    });
    const [response] = solveNetwork(network, FREQUENCY_HZ);
    expectPhasor(at(response!.nodeVoltages, 1), [0, 0], 1e-13, 'cot(π/2) rounds to 6e-17', 1);
    // A matched source into a shorted line sends 1/2 V; the short takes twice its current, V/Z0 e^(−jβl).
    const [, b] = gammaOf(network.sections[0]!, FREQUENCY_HZ);
    const arriving = mul([1 / 50, 0], exp([0, -b * 0.3]));
    expectPhasor(lineAt(network, response!, FREQUENCY_HZ, 1, 0).current, arriving, 1e-12, 'all of it enters the stub');
    // At the stub's open end V = −j Z0 I of its mouth.
    expectPhasor(at(response!.nodeVoltages, 2), mul([0, -80], arriving), 1e-12, 'standing wave of a quarter wave');
  });

  it('very short sections act as what they are: L per length in series, C per length across', () => {
    const lengthM = 1e-6;
    const network = oneLine(lengthM, 50, 0, 25, [{ resistanceOhm: 75 }]);
    const [response] = solveNetwork(network, 1e6);
    const omega = 2e6 * Math.PI;
    const perM = Math.sqrt(3.2) / 299_792_458;
    // First order in γl: I = V/(R_s + R_l + jωL'l − …); the exact line differs at (γl)² = 1e-15.
    const inductance: C = [0, omega * 50 * perM * lengthM];
    const capacitance: C = [0, (omega * perM * lengthM) / 50];
    const load = div([75, 0], add([1, 0], mul(capacitance, [75, 0])));
    expectPhasor(at(response!.driveCurrents, 0), div([1, 0], add(add([25, 0], inductance), load)), 1e-14, 'rounding');
    const across = sub(at(response!.nodeVoltages, 0), at(response!.nodeVoltages, 1));
    const current = at(response!.driveCurrents, 0);
    expectPhasor(across, mul(inductance, current), 1e-6, 'a difference of 1e-9 V between voltages of 1 V');
  });

  it('a section of no length joins its nodes', () => {
    const network = oneLine(0, 50, 0, 25, [{ resistanceOhm: 75 }]);
    expectPhasor(at(solveNetwork(network, FREQUENCY_HZ)[0]!.driveCurrents, 0), [0.01, 0], 1e-14, 'rounding');
  });

  it('a line of 60 Np: all that enters is lost, nothing grows', () => {
    const network = oneLine(2, 50, 30, 25, [{ resistanceOhm: 10 }]);
    const [response] = solveNetwork(network, FREQUENCY_HZ);
    expectPhasor(at(response!.driveCurrents, 0), [1 / 75, 0], 1e-12, 'Z0 is seen');
    for (const values of [response!.forward, response!.backward, response!.nodeVoltages, response!.loadCurrents]) {
      expect(values.every(Number.isFinite)).toBe(true);
    }
    for (const atM of [0, 1, 2]) {
      const expected = mul([1 / 75, 0], exp(mul(gammaOf(network.sections[0]!, FREQUENCY_HZ), [-atM, 0])));
      const { current } = lineAt(network, response!, FREQUENCY_HZ, 0, atM);
      expectPhasor(current, expected, 1e-11, 'what is below rounding of the input is noise', 1e-4);
    }
  });
});

describe('one line in pieces', () => {
  const lengthM = 1.37;
  const whole = oneLine(lengthM, 64, 0.05, 18, [{ resistanceOhm: 150 }]);
  const half = wavelengthM(FREQUENCY_HZ, 3.2) / 2;

  it.each([
    ['unequal', [0.2, 0.5, 0.9]],
    ['1 µm pieces', [0.4, 0.400001, 0.400002, 0.400003]],
    ['a piece of exactly half a wavelength', [0.11, 0.11 + half]],
    ['a hundred', Array.from({ length: 99 }, (_, i) => (lengthM * (i + 1)) / 100)],
  ])('%s: the same currents', (_, cuts) => {
    const ends = [0, ...cuts, lengthM];
    const last = ends.length - 1;
    const cut = net(last + 1, {
      // Every second piece runs the other way round.
      sections: ends.slice(1).map((endM, i) => ({
        nodeA: i % 2 === 0 ? i : i + 1,
        nodeB: i % 2 === 0 ? i + 1 : i,
        lengthM: endM - ends[i]!,
        line: whole.sections[0]!.line,
      })),
      drives: whole.drives,
      loads: [{ ...whole.loads[0]!, node: last }],
    });
    const [expected] = solveNetwork(whole, FREQUENCY_HZ);
    const [response] = solveNetwork(cut, FREQUENCY_HZ);
    for (const [i, { lengthM: pieceM }] of cut.sections.entries()) {
      for (const part of [0, 0.37, 1]) {
        const isReversed = i % 2 === 1;
        const atM = ends[i]! + pieceM * (isReversed ? 1 - part : part);
        const { current } = lineAt(cut, response!, FREQUENCY_HZ, i, part * pieceM);
        const { current: reference } = lineAt(whole, expected!, FREQUENCY_HZ, 0, atM);
        expectPhasor(
          isReversed ? [-current[0], -current[1]] : current,
          reference,
          1e-9,
          'rounding over a hundred joints',
        );
      }
    }
  });
});

describe('other elements', () => {
  it('a via barrel is a series inductance', () => {
    const network = net(2, {
      branches: [{ nodeA: 0, nodeB: 1, inductanceH: 0.8e-9 }],
      drives: [{ node: 0, resistanceOhm: 30 }],
      loads: [{ node: 1, resistanceOhm: 45, capacitanceF: 0 }],
    });
    const [response] = solveNetwork(network, 1e9);
    const expected = div([1, 0], [75, 2 * Math.PI * 0.8]);
    expectPhasor(at(response!.branchCurrents, 0), expected, 1e-14, 'rounding');
    expectPhasor(at(response!.loadCurrents, 0), expected, 1e-14, 'series');
  });

  it('R ∥ C, an impedance table, 0 Ω and nothing at all as loads', () => {
    const omega = 2 * Math.PI * FREQUENCY_HZ;
    const drives = [{ node: 0, resistanceOhm: 10 }];
    const currentWith = (load: object): C => {
      const network = net(1, { drives, loads: [{ node: 0, capacitanceF: 0, ...load }] });
      const [response] = solveNetwork(network, FREQUENCY_HZ);
      expectPhasor(at(response!.loadCurrents, 0), at(response!.driveCurrents, 0), 1e-13, 'series', 1e-3);
      return at(response!.driveCurrents, 0);
    };
    const rc = div([1, 0], [1 / 200, omega * 5e-12]);
    expectPhasor(
      currentWith({ resistanceOhm: 200, capacitanceF: 5e-12 }),
      div([1, 0], add([10, 0], rc)),
      1e-13,
      'R ∥ C',
    );
    expectPhasor(currentWith({ capacitanceF: 5e-12 }), div([1, 0], [10, -1 / (omega * 5e-12)]), 1e-13, 'C alone');
    expectPhasor(currentWith({ resistanceOhm: 0 }), [0.1, 0], 1e-13, 'short');
    expectPhasor(currentWith({}), [0, 0], 1e-13, 'open', 0.1);
    const impedance = (frequencyHz: number) => ({ re: 12, im: frequencyHz * 1e-7 });
    expectPhasor(currentWith({ impedance }), div([1, 0], [22, FREQUENCY_HZ * 1e-7]), 1e-13, 'table');
  });

  it('two lines side by side between two nodes (a loop): their Y-parameters add', () => {
    const [first, second] = [
      { nodeA: 0, nodeB: 1, lengthM: 0.31, line: line(55, 3.1, 0.2) },
      { nodeA: 1, nodeB: 0, lengthM: 0.52, line: line(90, 2.2, 0.1) },
    ];
    const network = net(2, {
      sections: [first, second],
      drives: [{ node: 0, resistanceOhm: 20 }],
      loads: [{ node: 1, resistanceOhm: 70, capacitanceF: 0 }],
    });
    // By hand: y11 = Σ coth/Z0, y12 = −Σ 1/(Z0 sinh); Yin = y11 − y12²/(y11 + 1/R).
    let y11: C = [0, 0];
    let y12: C = [0, 0];
    for (const section of [first, second]) {
      const x = mul(gammaOf(section, FREQUENCY_HZ), [section.lengthM, 0]);
      const sinh = mul([0.5, 0], sub(exp(x), exp([-x[0], -x[1]])));
      const cosh = mul([0.5, 0], add(exp(x), exp([-x[0], -x[1]])));
      y11 = add(y11, div(cosh, mul(sinh, [section.line.z0Ohm, 0])));
      y12 = sub(y12, div([1, 0], mul(sinh, [section.line.z0Ohm, 0])));
    }
    const yIn = sub(y11, div(mul(y12, y12), add(y11, [1 / 70, 0])));
    const expected = div([1, 0], add([20, 0], div([1, 0], yIn)));
    const [response] = solveNetwork(network, FREQUENCY_HZ);
    expectPhasor(at(response!.driveCurrents, 0), expected, 1e-12, 'rounding');
    const sent = add(
      lineAt(network, response!, FREQUENCY_HZ, 0, 0).current,
      mul([-1, 0], lineAt(network, response!, FREQUENCY_HZ, 1, second.lengthM).current),
    );
    expectPhasor(sent, expected, 1e-12, 'Kirchhoff at the source');
  });
});
