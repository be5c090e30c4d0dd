import { skinDepthM, surfaceResistanceOhm } from '../lines/conductor-loss.ts';
import type { CrossSection } from '../lines/cross-section.ts';
import { lineOf } from '../lines/line.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { hzToMhz } from '../units/convert.ts';
import { type Check, check } from './check.ts';
import { fieldSolverCases } from './line-cases.ts';

const HEIGHT_M = 1.27e-3;
const SPACING_M = 3.2e-3;

const thinMicrostrip = (u: number, epsilonR: number): CrossSection => ({
  kind: 'microstrip',
  widthM: u * HEIGHT_M,
  thicknessM: 0,
  heightM: HEIGHT_M,
  epsilonR,
  tanDelta: 0,
});

const thinStripline = (part: number, epsilonR: number, tanDelta = 0): CrossSection => ({
  kind: 'stripline',
  widthM: part * SPACING_M,
  thicknessM: 0,
  heightAboveM: SPACING_M / 2,
  heightBelowM: SPACING_M / 2,
  epsilonR,
  tanDelta,
});

/** Impedances, permittivities and losses of lines against published, exact and field-solver values. */
export function lineChecks(): Check[] {
  return [
    ...hammerstadJensen(),
    ...pozar(),
    ...exactStripline(),
    ...rulesOfThumb(),
    ...copper(),
    ...fieldSolverCases.map(({ id, quantity, section, z0Ohm, tolerancePart }) =>
      check({
        id,
        source: '2-D method of moments (Wei, Harrington, Mautz, Sarkar 1984)',
        sourceStatus: 'reference solver',
        quantity,
        unit: 'Ω',
        expected: z0Ohm,
        computed: lineOf(section).z0Ohm,
        tolerance: tolerancePart * z0Ohm,
      }),
    ),
  ];
}

function hammerstadJensen(): Check[] {
  const source = 'E. Hammerstad, Ø. Jensen, IEEE MTT-S Digest 1980';
  const figures = [
    [1, 1, 126.42, 1],
    [1, 4.3, 71.75, 3.105],
    [1, 9.8, 49.29, 6.579],
    [0.5, 4.3, 96.4, 2.99],
    [2, 4.3, 49.19, 3.275],
  ] as const;
  return figures.flatMap(([u, epsilonR, expectedOhm, expectedEpsilon]) => {
    const line = lineOf(thinMicrostrip(u, epsilonR));
    const id = `line-microstrip-u${u}-e${epsilonR}`;
    const what = `microstrip w/h ${u}, ε ${epsilonR}`;
    const row = { source, sourceStatus: 'derived' } as const;
    return [
      // Figures rounded to 0.01 Ω and 0.001.
      check({
        ...row,
        id: `${id}-z0`,
        quantity: `Z0 ${what}`,
        unit: 'Ω',
        expected: expectedOhm,
        computed: line.z0Ohm,
        tolerance: 0.01,
      }),
      check({
        ...row,
        id: `${id}-epsilon`,
        quantity: `ε_eff ${what}`,
        unit: '',
        expected: expectedEpsilon,
        computed: line.epsilonEff,
        tolerance: 0.001,
      }),
    ];
  });
}

/** His closed forms are stated good to 1 %. */
function pozar(): Check[] {
  const row = { source: 'D. M. Pozar, Microwave Engineering, examples', sourceStatus: 'from memory' } as const;
  const microstrips = [
    [3.081, 2.2, 1.87],
    [0.9654, 9.9, 6.665],
  ] as const;
  const stripline = lineOf(thinStripline(2.66e-3 / SPACING_M, 2.2, 0.001));
  const wavelengthM = SPEED_OF_LIGHT_M_PER_S / (10e9 * Math.sqrt(stripline.epsilonEff));
  return [
    ...microstrips.flatMap(([u, epsilonR, expected]) => {
      const line = lineOf(thinMicrostrip(u, epsilonR));
      const what = `microstrip w/h ${u}, ε ${epsilonR}`;
      const id = `line-pozar-microstrip-e${epsilonR}`;
      return [
        check({
          ...row,
          id: `${id}-z0`,
          quantity: `Z0 ${what}`,
          unit: 'Ω',
          expected: 50,
          computed: line.z0Ohm,
          tolerance: 0.5,
        }),
        check({
          ...row,
          id: `${id}-epsilon`,
          quantity: `ε_eff ${what}`,
          unit: '',
          expected,
          computed: line.epsilonEff,
          tolerance: 0.01 * expected,
        }),
      ];
    }),
    check({
      ...row,
      id: 'line-pozar-stripline-z0',
      quantity: 'Z0 stripline 2.66 mm, b 3.2 mm, ε 2.2',
      unit: 'Ω',
      expected: 50,
      computed: stripline.z0Ohm,
      tolerance: 0.5,
    }),
    check({
      ...row,
      id: 'line-pozar-stripline-wavelength',
      quantity: 'wavelength in ε 2.2, 10 GHz',
      unit: 'm',
      expected: 2.02e-2,
      computed: wavelengthM,
      tolerance: 5e-5,
    }),
    check({
      ...row,
      id: 'line-pozar-stripline-loss',
      quantity: 'dielectric loss, ε 2.2, tan δ 0.001, 10 GHz',
      unit: 'Np/m',
      expected: 0.155,
      computed: stripline.alphaNpPerM(10e9),
      tolerance: 5e-4,
    }),
  ];
}

function exactStripline(): Check[] {
  const figures = [
    [0.25, 140.01],
    [0.5, 100.5],
    [1, 65.4],
    [1.5, 48.55],
  ] as const;
  return figures.map(([part, expected]) =>
    check({
      id: `line-stripline-w${part}b`,
      source: 'S. B. Cohn, IRE Trans. MTT-2(2), 1954 (exact)',
      sourceStatus: 'derived',
      quantity: `Z0 thin stripline w/b ${part}, ε 1`,
      unit: 'Ω',
      expected,
      computed: lineOf(thinStripline(part, 1)).z0Ohm,
      tolerance: 1e-3 * expected, // the figures use 30π Ω for η0/4
    }),
  );
}

/** IPC-2141 formulas at t = 0: shown beside the program's answer. */
function rulesOfThumb(): Check[] {
  const row = { source: 'IPC-2141 formula', sourceStatus: 'common practice', unit: 'Ω', isInformation: true } as const;
  const microstrips = [
    [1, 73.2],
    [2, 48],
  ] as const;
  return [
    ...microstrips.map(([u, expected]) =>
      check({
        ...row,
        id: `line-ipc-microstrip-u${u}`,
        quantity: `Z0 microstrip w/h ${u}, ε 4.3`,
        expected,
        computed: lineOf(thinMicrostrip(u, 4.3)).z0Ohm,
        tolerance: 0.03 * expected,
      }),
    ),
    check({
      ...row,
      id: 'line-ipc-stripline',
      quantity: 'Z0 thin stripline w/b 0.3, ε 4.3',
      expected: (60 / Math.sqrt(4.3)) * Math.log(1.9 / (0.8 * 0.3)),
      computed: lineOf(thinStripline(0.3, 4.3)).z0Ohm,
      tolerance: 3,
    }),
  ];
}

function copper(): Check[] {
  const row = { source: 'copper of 5.8e7 S/m', sourceStatus: 'derived' } as const;
  const depths = [
    [1e6, 66.1e-6],
    [30e6, 12.1e-6],
    [1e9, 2.09e-6],
  ] as const;
  const resistances = [
    [1e6, 0.261e-3],
    [100e6, 2.61e-3],
    [1e9, 8.25e-3],
  ] as const;
  // Figures of three digits.
  return [
    ...depths.map(([frequencyHz, expected]) =>
      check({
        ...row,
        id: `copper-skin-depth-${hzToMhz(frequencyHz)}mhz`,
        quantity: `skin depth, ${hzToMhz(frequencyHz)} MHz`,
        unit: 'm',
        expected,
        computed: skinDepthM(frequencyHz),
        tolerance: 4e-3 * expected,
      }),
    ),
    ...resistances.map(([frequencyHz, expected]) =>
      check({
        ...row,
        id: `copper-surface-resistance-${hzToMhz(frequencyHz)}mhz`,
        quantity: `surface resistance, ${hzToMhz(frequencyHz)} MHz`,
        unit: 'Ω',
        expected,
        computed: surfaceResistanceOhm(frequencyHz),
        tolerance: 3e-3 * expected,
      }),
    ),
  ];
}
