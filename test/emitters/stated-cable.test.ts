import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cable, Point3M } from '../../app/board/board.ts';
import { buildStatedCable, statedCableCurrents, statedCurrentRmsA } from '../../app/emitters/stated-cable.ts';
import { fieldAtAntenna } from '../../app/site/scan.ts';
import { type SiteFrame, type SiteKind, TABLE_HEIGHT_M } from '../../app/site/site.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { appFailure } from '../support/app-failure.ts';
import { expectClose } from '../support/expect-close.ts';

const FLAT: SiteFrame = { orientation: 'flat', centreXM: 0, centreYM: 0, centreZM: 0, lowestYM: 0 };
const UPRIGHT: SiteFrame = { ...FLAT, orientation: 'upright', lowestYM: 0.013 };
const RMS_A = 7e-6;

const cable = (
  pointsM: Point3M[],
  farEnd: Cable['farEnd'],
  table: [number, number][] = [
    [1e6, RMS_A],
    [6e9, RMS_A],
  ],
): Cable => ({
  name: 'c',
  pointsM,
  radiusM: 1.5e-3,
  farEnd,
  seriesOhm: 0,
  commonModeRms: table.map(([frequencyHz, currentRmsA]) => ({ frequencyHz, currentRmsA })),
});
const build = (given: Cable, site: SiteKind = 'ground-plane', frame = FLAT) =>
  buildStatedCable(given, frame, site, 1e9);

/** Along x at table height, then down to the ground. */
const bent = (lengthM: number): Point3M[] => [
  [0.05, 0.01, 0.002],
  [0.05 + lengthM, 0.01, 0.002],
  [0.05 + lengthM, 0.01, -TABLE_HEIGHT_M],
];
const down: Point3M[] = [
  [0.2, -0.1, 0],
  [0.2, -0.1, -TABLE_HEIGHT_M],
];

/** Magnitude of every element's current, with its distance along the cable from the far end, found by its place, m. */
function profile(given: Cable, frequencyHz: number): { fromEndM: number; peakA: number }[] {
  const built = build(given);
  const currents = statedCableCurrents(built, frequencyHz);
  const { positionsM, count } = built.along.elements;
  return Array.from({ length: count }, (_, i) => ({
    fromEndM: distanceFromEnd(given.pointsM, [
      positionsM[3 * i]!,
      positionsM[3 * i + 1]!,
      positionsM[3 * i + 2]! - TABLE_HEIGHT_M,
    ]),
    peakA: Math.hypot(currents[2 * i]!, currents[2 * i + 1]!),
  }));
}

function distanceFromEnd(pointsM: readonly Point3M[], at: Point3M): number {
  const apart = (a: Point3M, b: Point3M) => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
  let pastM = 0;
  for (let leg = pointsM.length - 1; leg > 0; leg--) {
    const [from, to] = [pointsM[leg - 1]!, pointsM[leg]!];
    const [aheadM, behindM] = [apart(at, to), apart(at, from)];
    // On the leg when the way over the place is no detour.
    if (aheadM + behindM < apart(from, to) + 1e-9) return pastM + aheadM;
    pastM += apart(from, to);
  }
  throw new Error('a place off the cable');
}

describe('standing wave of a stated current', () => {
  const frequencies = fc.double({ min: 10e6, max: 1e9, noNaN: true });
  const lengths = fc.double({ min: 0.1, max: 2.5, noNaN: true });

  it.each([
    ['open', (x: number) => Math.abs(Math.sin(x)), Math.PI / 2],
    ['ground', (x: number) => Math.abs(Math.cos(x)), 0],
  ] as const)('%s end: the contract’s shape, its largest value √2 times the stated rms', (farEnd, shape, crest) => {
    fc.assert(
      fc.property(frequencies, lengths, (frequencyHz, lengthM) => {
        const k = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
        const totalM = lengthM + 0.002 + TABLE_HEIGHT_M;
        // Largest of the shape on 0…kL: 1 when the crest is on the cable, else at the connector.
        const largest = crest <= k * totalM ? 1 : shape(k * totalM);
        for (const { fromEndM, peakA } of profile(cable(bent(lengthM), farEnd), frequencyHz)) {
          expectClose(peakA, (Math.SQRT2 * RMS_A * shape(k * fromEndM)) / largest, {
            rel: 1e-9,
            floor: RMS_A,
            because: 'closed form of the contract, rounding of the lengths',
          });
        }
      }),
      { numRuns: 40, seed: 20261203 },
    );
  });

  it('is one standing wave: all elements are in phase or opposite for an end that loses nothing', () => {
    for (const farEnd of ['open', 'ground'] as const) {
      const built = build(cable(bent(1.3), farEnd));
      const currents = statedCableCurrents(built, 400e6);
      const [quiet, loud] = farEnd === 'open' ? [0, 1] : [1, 0];
      for (let i = 0; i < built.along.alongM.length; i++) expect(currents[2 * i + quiet]).toBeCloseTo(0, 20);
      // 2.1 m at 400 MHz are 2.8 waves: both signs appear.
      const signs = new Set([...built.along.alongM.keys()].map((i) => Math.sign(currents[2 * i + loud]!)));
      expect(signs.size).toBe(2);
    }
  });
});

describe('an end through a resistance', () => {
  const heightM = TABLE_HEIGHT_M;
  /** Mean characteristic impedance of a monopole, 60 (ln(2h/a) − 1): S. A. Schelkunoff, Electromagnetic Waves, chapter 11 (from memory). */
  const meanOhm = 59.96 * (Math.log((2 * heightM) / 1.5e-3) - 1);

  it('of the mean impedance of the wire lets the wave pass: the same magnitude all along', () => {
    const peaks = profile(cable(down, { resistanceOhm: meanOhm }), 300e6).map(({ peakA }) => peakA);
    for (const peakA of peaks) expectClose(peakA, Math.SQRT2 * RMS_A, { rel: 1e-3, because: '59.96 for η0/2π' });
  });

  it('of 0 Ω is a grounded end, of a very large one an open end', () => {
    for (const frequencyHz of [40e6, 333e6]) {
      for (const [resistanceOhm, farEnd] of [
        [0, 'ground'],
        [1e12, 'open'],
      ] as const) {
        const expected = profile(cable(down, farEnd), frequencyHz);
        for (const [i, { peakA }] of profile(cable(down, { resistanceOhm }), frequencyHz).entries()) {
          expectClose(peakA, expected[i]!.peakA, { rel: 1e-7, floor: RMS_A, because: 'Γ = 1 − 2Z/R = 1 − 8e-10' });
        }
      }
    }
  });

  it.each([0.5, 3])(
    'of %f times that leaves the standing-wave ratio R/Z or Z/R, its crest where it must be',
    (ratio) => {
      // Standing-wave ratio of a resistive end: max(R/Z, Z/R) (D. M. Pozar, Microwave Engineering, 2.3).
      const frequencyHz = 900e6;
      const found = profile(cable(down, { resistanceOhm: ratio * meanOhm }), frequencyHz);
      const k = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
      const swr = Math.max(ratio, 1 / ratio);
      for (const { fromEndM, peakA } of found) {
        // A low resistance has the crest at the end, a high one a quarter wave before it.
        const x = k * fromEndM + (ratio < 1 ? 0 : Math.PI / 2);
        const expected = Math.SQRT2 * RMS_A * Math.hypot(Math.cos(x), Math.sin(x) / swr);
        expectClose(peakA, expected, { rel: 2e-3, because: '59.96 for η0/2π' });
      }
    },
  );

  it('a cable that lies on the ground has some impedance still', () => {
    const lying: Point3M[] = [
      [0, 0, -TABLE_HEIGHT_M + 0.0004],
      [1, 0, -TABLE_HEIGHT_M - 0.0005],
      [1, 0.5, -TABLE_HEIGHT_M - 0.0005],
    ];
    for (const { peakA } of profile(cable(lying, { resistanceOhm: 150 }), 100e6)) expect(peakA).toBeGreaterThan(0);
  });

  it('a level run counts with its height, 60·ln(2H/a), weighed by length', () => {
    // R. W. P. King, Transmission-Line Theory (wire over ground); here from memory: Z = (η0/2π) ln(2H/a).
    const runM = 1.1;
    const levelOhm = 59.96 * Math.log((2 * heightM) / 1.5e-3);
    const mixedOhm = (runM * levelOhm + heightM * meanOhm) / (runM + heightM);
    const points: Point3M[] = [
      [0, 0, 0],
      [runM, 0, 0],
      [runM, 0, -heightM],
    ];
    for (const { peakA } of profile(cable(points, { resistanceOhm: mixedOhm }), 300e6)) {
      expectClose(peakA, Math.SQRT2 * RMS_A, { rel: 1e-3, because: '59.96 for η0/2π' });
    }
  });
});

describe('field of a stated current against handbook formulas', () => {
  /** rms field, far away and level with the ground or broadside. */
  const farFieldRms = (given: Cable, frequencyHz: number, site: SiteKind, heightM: number, rM: number) => {
    const built = build(given, site);
    const radiator = { elements: built.along.elements, currentsA: statedCableCurrents(built, frequencyHz) };
    const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
    const request = { kPerM, scanRadiusM: rM, site, box: null };
    return Math.hypot(...fieldAtAntenna([radiator], 'vertical', 0.3, heightM, request)) / Math.SQRT2;
  };
  const standing = (lengthM: number): Point3M[] => [
    [0, 0, -TABLE_HEIGHT_M + lengthM],
    [0, 0, -TABLE_HEIGHT_M],
  ];

  it('short grounded cable: E = 12.6e-7 f I L / r over ground (H. W. Ott, from memory; image counted)', () => {
    const frequencyHz = 4e6;
    const fieldRms = farFieldRms(cable(standing(0.9), 'ground'), frequencyHz, 'ground-plane', 0, 5000);
    // cos k(L − s) is 1 − (kL)²/6 on average: 0.1 %; the constant has three digits.
    expectClose(fieldRms, (12.57e-7 * frequencyHz * RMS_A * 0.9) / 5000, { rel: 2e-3, because: 'rounded constant' });
  });

  it('short open cable in free space: half the short-wire formula 6.283e-7 f I L / r (triangular current)', () => {
    const frequencyHz = 4e6;
    const lengthM = 1.4;
    const middleM = lengthM / 2;
    const fieldRms = farFieldRms(cable(standing(lengthM), 'open'), frequencyHz, 'free-space', middleM, 5000);
    expectClose(fieldRms, (0.5 * 6.283e-7 * frequencyHz * RMS_A * lengthM) / 5000, {
      rel: 3e-3,
      because: '(kL)²/12 = 0.1 %, near terms 1/(kr)² = 6e-6',
    });
  });

  it('half-wave cable: E = 60 I/r broadside (Balanis, Antenna Theory, 4.6)', () => {
    const frequencyHz = 150e6;
    const lengthM = SPEED_OF_LIGHT_M_PER_S / frequencyHz / 2;
    const fieldRms = farFieldRms(cable(standing(lengthM), 'open'), frequencyHz, 'free-space', lengthM / 2, 3000);
    expectClose(fieldRms, (60 * RMS_A) / 3000, { rel: 1e-3, because: '60 for η0/2π = 59.96' });
  });

  it('quarter-wave grounded cable over ground: E = 60 I/r at the ground', () => {
    const frequencyHz = 150e6;
    const lengthM = SPEED_OF_LIGHT_M_PER_S / frequencyHz / 4;
    const fieldRms = farFieldRms(cable(standing(lengthM), 'ground'), frequencyHz, 'ground-plane', 0, 3000);
    expectClose(fieldRms, (60 * RMS_A) / 3000, { rel: 1e-3, because: '60 for η0/2π = 59.96' });
  });
});

describe('stated current between its points', () => {
  const table = [
    { frequencyHz: 30e6, currentRmsA: 5e-6 },
    { frequencyHz: 300e6, currentRmsA: 2e-6 },
    { frequencyHz: 1000e6, currentRmsA: 4e-6 },
  ];

  it.each([
    [30e6, 5e-6],
    [Math.sqrt(30e6 * 300e6), 3.5e-6],
    [30e6 * 10 ** 0.25, 4.25e-6],
    [300e6, 2e-6],
    [Math.sqrt(300e6 * 1000e6), 3e-6],
    [1000e6, 4e-6],
    [1000e6 * (1 + 1e-12), 4e-6],
    [30e6 * (1 - 1e-12), 5e-6],
    [29.9e6, 0],
    [1001e6, 0],
  ])('%f Hz: linear over the logarithm of frequency, none outside', (frequencyHz, expectedA) => {
    expect(Math.abs(statedCurrentRmsA(table, frequencyHz) - expectedA)).toBeLessThan(1e-12 * 5e-6);
  });

  it('a single point holds at its frequency only', () => {
    const single = table.slice(0, 1);
    expect(statedCurrentRmsA(single, 30e6)).toBe(5e-6);
    expect(statedCurrentRmsA(single, 30.1e6)).toBe(0);
    expect(statedCurrentRmsA([], 30e6)).toBe(0);
  });
});

describe('what a stated cable may not be', () => {
  const bound: Cable['farEnd'][] = ['ground', { resistanceOhm: 150 }];

  it.each(bound)('joined (%j) to a ground that is not there', (farEnd) => {
    expect(appFailure(() => build(cable(down, farEnd), 'free-space')).message).toMatch(
      /farEnd must be open in free space/,
    );
  });

  it.each(bound)('joined (%j) to the ground from above it', (farEnd) => {
    const tooHigh: Point3M[] = [down[0]!, [0.2, -0.1, -TABLE_HEIGHT_M + 0.0011]];
    expect(appFailure(() => build(cable(tooHigh, farEnd))).message).toMatch(
      /within 1 mm of the ground plane.*1\.1 mm above it/,
    );
    const near: Point3M[] = [down[0]!, [0.2, -0.1, -TABLE_HEIGHT_M + 0.0009]];
    expect(build(cable(near, farEnd)).along.lengthM).toBeCloseTo(TABLE_HEIGHT_M - 0.0009, 9);
  });

  it('below the ground plane; in free space there is none', () => {
    const below: Point3M[] = [
      [0, 0, 0],
      [0, 0, -TABLE_HEIGHT_M - 0.002],
    ];
    expect(appFailure(() => build(cable(below, 'open'))).message).toMatch(/above the ground plane.*2\.0 mm below it/);
    expect(build(cable(below, 'open'), 'free-space').along.lengthM).toBeCloseTo(0.802, 9);
  });

  it('upright the ground lies at y = y_min − 800 mm', () => {
    const yM = UPRIGHT.lowestYM - TABLE_HEIGHT_M;
    const points: Point3M[] = [
      [0, 0.05, 0],
      [0, 0.05, 0.3],
      [0, yM, 0.3],
    ];
    expect(build(cable(points, 'ground'), 'ground-plane', UPRIGHT).along.lengthM).toBeCloseTo(0.3 + 0.05 - yM, 9);
    expect(() => build(cable(down, 'ground'), 'ground-plane', UPRIGHT)).toThrow(/within 1 mm/);
  });
});
