import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import type { EndTerm } from '../../app/emitters/element-currents.ts';
import { postsAt } from '../../app/emitters/posts.ts';
import type { Radiator } from '../../app/fields/element-set.ts';
import { boardFile, driveFile, linesVoltage, type Mm } from '../support/estimates.ts';
import { boardOf, radiatorsAt, totalMoment } from '../support/small-boards.ts';

const SEED = 20261209;

/** Value of a sum of end currents, each section end carrying an invented current. */
const currentOf = (terms: readonly EndTerm[]): number =>
  terms.reduce((sum, { section, isAtB, factor }) => sum + factor * (1 + 0.37 * section) * (isAtB ? -1.7 : 1), 0);

describe('vertical currents at a place', () => {
  /** What leaves on traces and planes at one of five heights; every trace current comes back on planes. */
  const leaving = fc
    .array(
      fc.record({
        traceLevel: fc.integer({ min: 0, max: 4 }),
        planeLevels: fc.tuple(fc.integer({ min: 0, max: 4 }), fc.integer({ min: 0, max: 4 })),
        share: fc.double({ min: 0, max: 1, noNaN: true }),
      }),
      { minLength: 1, maxLength: 6 },
    )
    .map((ends) =>
      ends.flatMap(({ traceLevel, planeLevels, share }, i) => {
        // Both ends of a section may come to one place: a loop.
        const [section, isAtB] = [Math.floor(i / 2), i % 2 === 1];
        const at = (level: number, factor: number) => ({ zM: 0.3e-3 * level ** 1.3, term: { section, isAtB, factor } });
        return [at(traceLevel, 1), at(planeLevels[0], -share), at(planeLevels[1], share - 1)];
      }),
    );

  it('obey Kirchhoff’s law at every height, and their moment is Σ z·(current leaving there)', () => {
    fc.assert(
      fc.property(leaving, (given) => {
        const posts = postsAt([0, 0], given);
        const heights = [...new Set(given.map(({ zM }) => zM))];
        for (const zM of heights) {
          const into = posts.filter((post) => Math.abs(post.highM - zM) < 1e-8).map(({ terms }) => currentOf(terms));
          const out = posts.filter((post) => Math.abs(post.lowM - zM) < 1e-8).map(({ terms }) => currentOf(terms));
          const away = given.filter((each) => each.zM === zM).map(({ term }) => currentOf([term]));
          const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0);
          expect(sum(into) - sum(out) - sum(away)).toBeCloseTo(0, 9);
        }
        // ∫ J dV = ∫ r (−div J) dV: summation by parts.
        const moment = posts.reduce((sum, { lowM, highM, terms }) => sum + (highM - lowM) * currentOf(terms), 0);
        const expected = given.reduce((sum, { zM, term }) => sum + zM * currentOf([term]), 0);
        expect(moment * 1e3).toBeCloseTo(expected * 1e3, 9);
      }),
      { numRuns: 200, seed: SEED },
    );
  });

  it('a driver pin over a plane: the current flows up from the plane into the trace', () => {
    const term = { section: 0, isAtB: false };
    const posts = postsAt(
      [0.01, 0.02],
      [
        { zM: 1e-3, term: { ...term, factor: 1 } },
        { zM: 0, term: { ...term, factor: -1 } },
      ],
    );
    expect(posts).toEqual([{ atM: [0.01, 0.02], lowM: 0, highM: 1e-3, terms: [{ ...term, factor: 1 }] }]);
  });
});

const LOW_MHZ = 0.01;
const box = (x1: number, y1: number, x2: number, y2: number): Mm[] => [
  [x1, y1],
  [x2, y1],
  [x2, y2],
  [x1, y2],
];

/** A trace on L1 over a plane on L2 that ends at x = 30.8; a via to L2; a trace there over the plane on L3. */
function ontoPlaneLayer(copperMm: number, stitchAt: Mm): BoardFileInput {
  const copper = (name: string) => ({ name, kind: 'copper' as const, thicknessMm: copperMm });
  return boardFile({
    stackup: [
      copper('L1'),
      { name: 'D1', kind: 'dielectric', thicknessMm: 0.4, epsilonR: 1 },
      copper('L2'),
      { name: 'D2', kind: 'dielectric', thicknessMm: 0.9, epsilonR: 1 },
      copper('L3'),
    ],
    planes: [
      { layer: 'L2', net: 'GND', pointsMm: box(0, 0, 30.8, 44) },
      { layer: 'L3', net: 'GND' },
    ],
    nets: [
      {
        name: 'S',
        traces: [
          {
            layer: 'L1',
            widthMm: 0.3,
            pointsMm: [
              [10, 20],
              [31, 20],
            ],
          },
          {
            layer: 'L2',
            widthMm: 0.3,
            pointsMm: [
              [31, 20],
              [50, 24],
            ],
          },
        ],
        vias: [{ atMm: [31, 20], fromLayer: 'L1', toLayer: 'L2', drillMm: 0.3 }],
        pins: [
          { name: 'U1.S', atMm: [10, 20], layer: 'L1' },
          { name: 'U2.S', atMm: [50, 24], layer: 'L2' },
        ],
      },
      { name: 'GND', vias: [{ atMm: stitchAt, fromLayer: 'L1', toLayer: 'L3', drillMm: 0.3 }] },
    ],
    waveforms: [linesVoltage('w', [[LOW_MHZ, 2]])],
    drives: [driveFile('S', 'w')],
    loads: [{ net: 'S', pin: 'U2.S', resistanceOhm: 50 }],
  });
}

/** y component of the magnetic moment ½ Σ r × I dl, real part, A·m². */
function magneticY(radiators: readonly Radiator[]): number {
  let sum = 0;
  for (const { elements, currentsA } of radiators) {
    const { positionsM: p, vectorsM: v } = elements;
    for (let e = 0; e < elements.count; e++) {
      sum += (currentsA[2 * e]! / 2) * (p[3 * e + 2]! * v[3 * e]! - p[3 * e]! * v[3 * e + 2]!);
    }
  }
  return sum;
}

describe('a layer change with its return', () => {
  it.each([0.03, 0])('onto the layer of the plane it leaves, copper %f mm thick: every loop closes', (copperMm) => {
    const { radiators, scene } = radiatorsAt(boardOf(ontoPlaneLayer(copperMm, [27, 23])), LOW_MHZ * 1e6);
    const { sum, size } = totalMoment(radiators);
    for (const part of sum) expect(Math.abs(part)).toBeLessThan(2e-4 * size);
    // The trace runs 0.2 mm past the plane's edge to its via.
    expect(scene.nets.get('S')!.findings.map(({ code }) => code)).toEqual(['plane-gap']);
  });

  it.each([
    ['10 mm away serves', [21.1, 20] as Mm, 0],
    ['farther does not', [20.9, 20] as Mm, 1],
  ])('a stitching via %s', (_, at, count) => {
    const { scene, radiators } = radiatorsAt(boardOf(ontoPlaneLayer(0.03, at)), LOW_MHZ * 1e6);
    const findings = scene.nets.get('S')!.findings.filter(({ code }) => code === 'return-changes-plane');
    expect(findings).toHaveLength(count);
    if (count > 0) expect(findings[0]!.message).toMatch(/nearest stitching via is 10\.1 mm away/);
    const { sum, size } = totalMoment(radiators);
    for (const part of sum) expect(Math.abs(part)).toBeLessThan(2e-4 * size);
  });

  it('a stitching via must join both planes, and planes of two nets have none', () => {
    const file = ontoPlaneLayer(0.03, [27, 23]);
    const messages = (changed: BoardFileInput) =>
      radiatorsAt(boardOf(changed), LOW_MHZ * 1e6)
        .scene.nets.get('S')!
        .findings.filter(({ code }) => code === 'return-changes-plane')
        .map(({ message }) => message);
    const short = { atMm: [27, 23] as Mm, fromLayer: 'L1', toLayer: 'L2', drillMm: 0.3 };
    expect(messages({ ...file, nets: [file.nets[0]!, { name: 'GND', vias: [short] }] })[0]).toMatch(
      /no stitching via joins them/,
    );
    const planes = [file.planes![0]!, { layer: 'L3', net: 'VCC' }];
    expect(messages({ ...file, planes })[0]).toMatch(/planes of different nets/);
  });
});

describe('the loop of a layer change', () => {
  it.each([27, 31, 35.5])('takes in the way to the stitching via at x = %f mm', (stitchMm) => {
    const file = ontoPlaneLayer(0.03, [stitchMm, 20]);
    const straight = {
      ...file,
      nets: file.nets.map((net) => ({
        ...net,
        ...(net.traces && {
          traces: net.traces.map((trace, i) =>
            i === 1
              ? {
                  ...trace,
                  pointsMm: [
                    [31, 20],
                    [50, 20],
                  ] as Mm[],
                }
              : trace,
          ),
        }),
        ...(net.pins && { pins: net.pins.map((pin, i) => (i === 1 ? { ...pin, atMm: [50, 20] as Mm } : pin)) }),
      })),
    };
    const { radiators } = radiatorsAt(boardOf(straight), LOW_MHZ * 1e6);
    // The way of the current in the x–z plane, mm: z of L3 top 0.03, L2 0.93 to 0.96, L1 bottom 1.36.
    const way: Mm[] = [
      [10, 0.96],
      [10, 1.36],
      [31, 1.36],
      [31, 0.93],
      [50, 0.93],
      [50, 0.03],
      [stitchMm, 0.03],
      [stitchMm, 0.96],
    ];
    const areaMm2 = way.reduce((sum, [x1, z1], i) => {
      const [x2, z2] = way[(i + 1) % way.length]!;
      return sum + (z1 * x2 - x1 * z2) / 2;
    }, 0);
    const currentA = 2 / (30 + 50);
    // 40 mm of 0.3 × 0.03 mm copper have 77 mΩ, 0.1 % of the circuit.
    expect(Math.abs(magneticY(radiators) / (currentA * areaMm2 * 1e-6) - 1)).toBeLessThan(1e-3);
  });
});

describe('a reference that changes without a via', () => {
  it('past the edge of the nearer plane the return goes down beside the trace: every loop closes', () => {
    const file = ontoPlaneLayer(0.03, [27, 23]);
    const net = file.nets[0]!;
    const straight: BoardFileInput = {
      ...file,
      nets: [
        {
          ...net,
          traces: [
            {
              layer: 'L1',
              widthMm: 0.3,
              pointsMm: [
                [10, 20],
                [30.8, 20],
                [50, 24],
              ],
            },
          ],
          vias: [],
          pins: net.pins!.map((pin) => ({ ...pin, layer: 'L1' })),
        },
      ],
    };
    const { radiators } = radiatorsAt(boardOf(straight), LOW_MHZ * 1e6);
    const { sum, size } = totalMoment(radiators);
    for (const part of sum) expect(Math.abs(part)).toBeLessThan(2e-4 * size);
  });
});

describe('a trace that goes over to another plane without a via', () => {
  const L1_TRACE: Mm[] = [
    [10, 20],
    [50, 20],
  ];
  /** Trace on L1, planes on L2 from x = 0 to `splitMm` (GND) and beyond (VCC), or none beyond; a full GND on L3. */
  const over = (pointsMm: Mm[], splitMm: number, beyond: string | null, stitchAt: Mm): BoardFileInput => {
    const file = ontoPlaneLayer(0.03, stitchAt);
    const half = (x1: number, x2: number): Mm[] => [
      [x1, 0],
      [x2, 0],
      [x2, 40],
      [x1, 40],
    ];
    return {
      ...file,
      planes: [
        { layer: 'L2', net: 'GND', pointsMm: half(0, splitMm) },
        ...(beyond === null ? [] : [{ layer: 'L2', net: beyond, pointsMm: half(splitMm + 0.5, 60) }]),
        { layer: 'L3', net: 'GND' },
      ],
      nets: [
        {
          name: 'S',
          traces: [{ layer: 'L1', widthMm: 0.3, pointsMm }],
          pins: [
            { name: 'U1.S', atMm: pointsMm[0]!, layer: 'L1' },
            { name: 'U2.S', atMm: pointsMm.at(-1)!, layer: 'L1' },
          ],
        },
        file.nets[1]!,
      ],
    };
  };
  const found = (file: BoardFileInput) =>
    radiatorsAt(boardOf(file), LOW_MHZ * 1e6)
      .scene.nets.get('S')!
      .findings.filter(({ code }) => code === 'return-changes-plane');

  it('another net’s plane on the same layer: found where it begins, in a straight run and at a bend', () => {
    const [finding, ...more] = found(over(L1_TRACE, 30, 'VCC', [27, 23]));
    expect(more).toEqual([]);
    expect(finding!.message).toBe(
      'the trace moves the return from GND on L2 to VCC on L2; planes of different nets: the return must cross through a capacitor',
    );
    expect(finding!.atM![0]).toBeCloseTo(30.25e-3, 9);
    const bent: Mm[] = [
      [10, 20],
      [30.2, 20],
      [50, 24],
    ];
    const atBend = found(over(bent, 30, 'VCC', [27, 23]));
    expect(atBend.map(({ atM }) => [atM![0], atM![1]])).toEqual([[0.0302, 0.02]]);
    expect(found(over(L1_TRACE, 30, 'GND', [27, 23]))).toEqual([]);
    // The trace ends 0.4 mm past the split.
    expect(
      found(
        over(
          [
            [10, 20],
            [30.9, 20],
          ],
          30,
          'VCC',
          [27, 23],
        ),
      ),
    ).toEqual([]);
  });

  it('a plane of another layer: found unless a stitching via is near', () => {
    const bent: Mm[] = [
      [10, 20],
      [30.8, 20],
      [50, 24],
    ];
    expect(found(over(bent, 31, null, [27, 23]))).toEqual([]);
    const [finding] = found(over(bent, 31, null, [10, 30]));
    expect(finding!.message).toMatch(
      /^the trace moves the return from GND on L2 to GND on L3; the nearest stitching via is 2\d\.\d mm away$/,
    );
  });
});

describe('a trace between two planes', () => {
  /** L2 trace; planes above and below at these distances; or below only. */
  const moments = (aboveMm: number, belowMm: number, hasAbove: boolean, loadOhm?: number) => {
    const file = boardFile({
      stackup: [
        { name: 'L1', kind: 'copper', thicknessMm: 0 },
        { name: 'D1', kind: 'dielectric', thicknessMm: aboveMm, epsilonR: 3.9 },
        { name: 'L2', kind: 'copper', thicknessMm: 0 },
        { name: 'D2', kind: 'dielectric', thicknessMm: belowMm, epsilonR: 3.9 },
        { name: 'L3', kind: 'copper', thicknessMm: 0 },
      ],
      planes: [{ layer: 'L3', net: 'GND' }, ...(hasAbove ? [{ layer: 'L1', net: 'GND' }] : [])],
      nets: [
        {
          name: 'S',
          traces: [
            {
              layer: 'L2',
              widthMm: 0.3,
              pointsMm: [
                [10, 20],
                [50, 20],
              ],
            },
          ],
          pins: [
            { name: 'U1.S', atMm: [10, 20], layer: 'L2' },
            { name: 'U2.S', atMm: [50, 20], layer: 'L2' },
          ],
        },
      ],
      waveforms: [linesVoltage('w', [[30, 2]])],
      drives: [driveFile('S', 'w')],
      loads: [{ net: 'S', pin: 'U2.S', ...(loadOhm !== undefined && { resistanceOhm: loadOhm }) }],
    });
    const { radiators } = radiatorsAt(boardOf(file), 30e6);
    const { sum } = totalMoment(radiators);
    return { magneticY: magneticY(radiators), electricZ: Math.hypot(sum[4]!, sum[5]!) };
  };

  it.each([
    [0.4, 0.4],
    [0.25, 0.7],
  ])('%f and %f mm from them: its two loops, and its two columns of polarisation, cancel', (aboveMm, belowMm) => {
    // s_above h_above = s_below h_below for shares in inverse proportion to the distances.
    const loaded = moments(aboveMm, belowMm, true, 50);
    const open = moments(aboveMm, belowMm, true);
    const micro = { loaded: moments(aboveMm, belowMm, false, 50), open: moments(aboveMm, belowMm, false) };
    expect(Math.abs(loaded.magneticY)).toBeLessThan(1e-9 * Math.abs(micro.loaded.magneticY));
    expect(open.electricZ).toBeLessThan(1e-9 * micro.open.electricZ);
    // The single pair has the moment I·h·L, not twice that (physics 5.7).
    const currentA = 2 / (30 + 50);
    expect(Math.abs(micro.loaded.magneticY) / (currentA * belowMm * 1e-3 * 40e-3)).toBeCloseTo(1, 1);
  });
});
