import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import type { Radiator } from '../../app/fields/element-set.ts';
import { appFailure } from '../support/app-failure.ts';
import { boardFile, driveFile, estimateOf, linesVoltage, type Mm, netFile } from '../support/estimates.ts';
import { boardOf, radiatorsAt, totalMoment } from '../support/small-boards.ts';

/** Low enough for one current all the way: displacement over conduction current is 1e-5. */
const LOW_MHZ = 0.002;

/** A net in air with a named return; both lines stated, so that any shape is allowed. */
function namedBoard(trace: Mm[], back: Mm[], parts: Partial<BoardFileInput> = {}, cutAt?: number): BoardFileInput {
  const net = netFile('S', trace);
  const traces =
    cutAt === undefined
      ? net.traces
      : // Drawn in two traces, the second from its end backwards.
        [
          { ...net.traces![0]!, pointsMm: trace.slice(0, cutAt + 1) },
          { ...net.traces![0]!, pointsMm: trace.slice(cutAt).reverse() },
        ];
  return boardFile({
    planes: [],
    nets: [{ ...net, traces: traces!, z0Ohm: 200, epsilonEff: 1, returnPath: { layer: 'TOP', pointsMm: back } }],
    waveforms: [linesVoltage('w', [[LOW_MHZ, 3]])],
    drives: [driveFile('S', 'w', { sourceOhm: 40 })],
    loads: [{ net: 'S', pin: 'U2.S', resistanceOhm: 60 }],
    ...parts,
  });
}

/** Magnetic moment ½ Σ r × I dl of radiators, real part, A·m². */
function magneticMoment(radiators: readonly Radiator[]): [number, number, number] {
  const sum: [number, number, number] = [0, 0, 0];
  for (const { elements, currentsA } of radiators) {
    const { positionsM: p, vectorsM: v } = elements;
    for (let e = 0; e < elements.count; e++) {
      const [x, y, z, u, w, t] = [p[3 * e]!, p[3 * e + 1]!, p[3 * e + 2]!, v[3 * e]!, v[3 * e + 1]!, v[3 * e + 2]!];
      const half = currentsA[2 * e]! / 2;
      sum[0] += half * (y * t - z * w);
      sum[1] += half * (z * u - x * t);
      sum[2] += half * (x * w - y * u);
    }
  }
  return sum;
}

/** Shoelace area, m². */
const areaM2 = (ring: readonly Mm[]): number =>
  ring.reduce((sum, [x1, y1], i) => {
    const [x2, y2] = ring[(i + 1) % ring.length]!;
    return sum + (x1 * y2 - x2 * y1) / 2e6;
  }, 0);

const currentA = 3 / (40 + 60);
const moments = (file: BoardFileInput) => {
  const { radiators } = radiatorsAt(boardOf(file), LOW_MHZ * 1e6);
  return { magnetic: magneticMoment(radiators), ...totalMoment(radiators) };
};

describe('a net over its named return', () => {
  it('is a closed loop of V/R around the area between both lines (any shape, drawn in any direction)', () => {
    const steps = fc.array(
      fc.tuple(fc.double({ min: 3, max: 9, noNaN: true }), fc.double({ min: -2, max: 2, noNaN: true })),
      {
        minLength: 2,
        maxLength: 5,
      },
    );
    const walk = (start: Mm, moves: readonly (readonly [number, number])[]) => {
      const path = [start];
      for (const [dx, dy] of moves) path.push([path.at(-1)![0] + dx, path.at(-1)![1] + dy]);
      return path;
    };
    fc.assert(
      fc.property(steps, steps, fc.boolean(), (there, beside, isCut) => {
        const trace = walk([5, 14], there);
        const back = walk([6, 33], beside);
        const { magnetic, sum, size } = moments(namedBoard(trace, back, {}, isCut ? 1 : undefined));
        const expected = currentA * areaM2([...trace, ...[...back].reverse()]);
        // Quadrature is exact for a current without waves; C·ω·R is 1e-6.
        expect(Math.abs(magnetic[2] - expected)).toBeLessThan(1e-5 * Math.abs(expected));
        for (const part of sum) expect(Math.abs(part)).toBeLessThan(2e-5 * size);
      }),
      { numRuns: 30, seed: 20261207 },
    );
  });

  it('turns its sign with the drive and with the side of the return', () => {
    const trace: Mm[] = [
      [10, 20],
      [50, 20],
    ];
    const above: Mm[] = [
      [10, 23],
      [50, 23],
    ];
    const below: Mm[] = [
      [10, 17],
      [50, 17],
    ];
    const [plus, minus] = [above, below].map((back) => moments(namedBoard(trace, back)).magnetic[2]);
    // Current runs along +x below the return: clockwise seen from the top is negative, so with the return above, positive.
    expect(plus).toBeGreaterThan(0);
    expect(minus! / plus!).toBeCloseTo(-1, 5);
    const inverted = moments(
      namedBoard(trace, above, { drives: [driveFile('S', 'w', { sourceOhm: 40, inverted: true })] }),
    ).magnetic[2];
    expect(inverted / plus!).toBeCloseTo(-1, 9);
  });

  it('a return on the other side of the board closes through the thickness', () => {
    const trace: Mm[] = [
      [10, 20],
      [50, 20],
    ];
    const file = namedBoard(trace, trace);
    const nets = file.nets.map((net) => ({ ...net, returnPath: { layer: 'BOT', pointsMm: trace } }));
    const { magnetic, sum, size } = moments({ ...file, nets });
    // 1.2 mm high, 40 mm long, normal along −y (current along +x on top, back below): m = I·A.
    expect(magnetic[1] / (currentA * 1.2e-3 * 40e-3)).toBeCloseTo(1, 4);
    for (const part of sum) expect(Math.abs(part)).toBeLessThan(2e-5 * size);
  });
});

describe('lines of a named return', () => {
  const trace: Mm[] = [
    [10, 20],
    [50, 20],
  ];
  const back: Mm[] = [
    [10, 23],
    [50, 23],
  ];
  const unstated = (from: BoardFileInput, changes: object = {}) => ({
    ...from,
    nets: from.nets.map(({ z0Ohm: _z0, epsilonEff: _eff, ...net }) => ({ ...net, ...changes })),
  });

  it('without stated values count as coplanar strips when they are such; else the values are asked for', () => {
    expect(
      estimateOf({ ...unstated(namedBoard(trace, back)), waveforms: [linesVoltage('w', [[80, 1]])] }).points,
    ).toHaveLength(1);
    const spread: Mm[] = [
      [10, 23],
      [50, 30],
    ];
    expect(appFailure(() => estimateOf(unstated(namedBoard(trace, spread)))).message).toMatch(
      /net S: z0Ohm and epsilonEff must be given.*4\.75 to 8\.25 mm/,
    );
    const below = { returnPath: { layer: 'BOT', pointsMm: back } };
    expect(appFailure(() => estimateOf(unstated(namedBoard(trace, back), below))).message).toMatch(/z0Ohm/);
  });

  it('wide apart are no line at the upper end, and that is said', () => {
    const notTem = (apartMm: number) =>
      estimateOf({
        ...namedBoard(
          [
            [10, 2],
            [50, 2],
          ],
          [
            [10, 2 + apartMm],
            [50, 2 + apartMm],
          ],
        ),
        waveforms: [linesVoltage('w', [[80, 1]])],
      }).caveats.filter(({ code }) => code === 'line-not-tem');
    // c/(10·(40 mm + 0.4 mm)) = 742 MHz, a tenth of a wave across; 22.4 mm is that at 1338 MHz, above the range.
    expect(notTem(40)).toMatchObject([{ where: 'net S', toHz: 1e9 }]);
    expect(notTem(40)[0]!.fromHz / 1e6).toBeCloseTo(742, 0);
    expect(notTem(22)).toEqual([]);
  });

  it('branches, vias, a driver in the middle and separate parts are refused', () => {
    const base = namedBoard(trace, back);
    const net = base.nets[0]!;
    const refused = (changes: object, more: Partial<BoardFileInput> = {}) =>
      appFailure(() => estimateOf({ ...base, nets: [{ ...net, ...changes }], ...more })).message;
    const branch = {
      layer: 'TOP',
      widthMm: 0.4,
      pointsMm: [
        [30, 20],
        [30, 30],
      ] as Mm[],
    };
    expect(refused({ traces: [...net.traces!, branch] })).toMatch(/unbranched/);
    const apart = {
      ...branch,
      pointsMm: [
        [30, 5],
        [40, 5],
      ] as Mm[],
    };
    expect(refused({ traces: [...net.traces!, apart] })).toMatch(/unbranched/);
    const pins = [...net.pins!, { name: 'U9.M', atMm: [30, 20] as Mm, layer: 'TOP' }];
    expect(refused({ pins }, { drives: [{ net: 'S', pin: 'U9.M', waveform: 'w' }] })).toMatch(
      /a driver that is not at its end/,
    );
  });
});

describe('without plane and return path', () => {
  it('a net is refused in words, never guessed', () => {
    const { returnPath: _, ...net } = namedBoard(
      [
        [10, 20],
        [50, 20],
      ],
      [
        [10, 23],
        [50, 23],
      ],
    ).nets[0]!;
    const file = {
      ...namedBoard(
        [
          [10, 20],
          [50, 20],
        ],
        [
          [10, 23],
          [50, 23],
        ],
      ),
      nets: [net],
    };
    expect(appFailure(() => estimateOf(file)).message).toMatch(
      /net S must be over a plane, or given a returnPath.*100 %/,
    );
  });
});
