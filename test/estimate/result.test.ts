import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { resultSchema } from '../../app/estimate/result-schema.ts';
import {
  boardFile,
  type Choices,
  driveFile,
  drivenBoard,
  estimateOf,
  limitSet,
  linesVoltage,
  netFile,
  pointAt,
} from '../support/estimates.ts';

const cable = (pointsMm: [number, number, number][], farEnd: 'open' | 'ground', name = 'c') => ({
  name,
  pointsMm,
  farEnd,
  commonModeUa: [
    [30, 5],
    [300, 4],
  ] as [number, number][],
});
const tones = (...linesMhz: number[]) => [
  linesVoltage(
    'w',
    linesMhz.map((mhz) => [mhz, 1]),
  ),
];
const one = (linesMhz: number[], more: Partial<BoardFileInput> = {}) =>
  drivenBoard([netFile('A')], [driveFile('A', 'w')], tones(...linesMhz), more);

describe('every result is the JSON its schema says', () => {
  const hostile = ['__proto__', 'constructor', 'a "b" <c> \u0000'];
  const boards: [what: string, file: BoardFileInput, choices?: Choices][] = [
    ['one net', one([100, 250])],
    ['solved', one([100, 250]), { request: { structure: 'solved' } }],
    [
      'solved with a cable',
      one([100], {
        cables: [
          {
            name: 'c',
            pointsMm: [
              [70, 20, 0],
              [370, 20, 0],
            ],
          },
        ],
      }),
      { request: { structure: 'solved' } },
    ],
    ['upright in free space', one([100, 250]), { site: { kind: 'free-space', orientation: 'upright' } }],
    ['no line in the range', one([10])],
    ['a drive of 0 V', drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[100, 0]])])],
    [
      'twins that cancel',
      drivenBoard(
        [netFile('A'), netFile('B')],
        [driveFile('A', 'w'), driveFile('B', 'w', { inverted: true })],
        tones(100),
      ),
    ],
    [
      'a vertical cable on the axis: no horizontal field',
      boardFile({
        cables: [
          cable(
            [
              [35, 22, 0],
              [35, 22, -800],
            ],
            'ground',
          ),
        ],
      }),
    ],
    [
      'a cable at its own points alone',
      boardFile({
        cables: [
          cable(
            [
              [70, 22, 0],
              [500, 22, 0],
            ],
            'open',
          ),
        ],
      }),
    ],
    ['above 1 GHz', one([900, 1100]), { request: { maxHz: 2e9 } }],
    [
      'hostile names',
      drivenBoard(
        hostile.map((name) => netFile(name)),
        hostile.map((name) => driveFile(name, 'w')),
        tones(100),
        {
          cables: [
            cable(
              [
                [70, 22, 0],
                [500, 22, 0],
              ],
              'open',
              '__proto__',
            ),
          ],
        },
      ),
    ],
  ];

  it.each(boards)('%s', (_, file, choices) => {
    const result = estimateOf(file, choices);
    const text = JSON.stringify(result);
    const parsed = resultSchema.safeParse(JSON.parse(text));
    expect(parsed.error?.issues ?? []).toEqual([]);
    // −∞, ∞ and NaN would come back as null.
    expect(JSON.parse(text)).toEqual(result);
    for (const point of result.points) {
      expect(point.turntableDeg).toBeGreaterThanOrEqual(0);
      expect(point.turntableDeg).toBeLessThan(360);
      expect(point.antennaHeightM).toBeGreaterThanOrEqual(1);
      expect(point.antennaHeightM).toBeLessThanOrEqual(4);
      expect(point.marginDb).toBe(point.limitDbuvPerM - point.levelDbuvPerM);
      expect(point.upperBoundDbuvPerM).toBeGreaterThanOrEqual(point.levelDbuvPerM - 1e-9);
    }
  });

  it('paths of hostile names are kept apart', () => {
    const result = estimateOf(boards.at(-1)![1]);
    const point = pointAt(result, 100e6);
    const [contributor] = point.contributors.filter(({ kind }) => kind === 'cable');
    expect(Object.keys(JSON.parse(JSON.stringify(contributor)).viaDbuvPerM)).toEqual(['__proto__']);
    expect(point.contributors.map(({ name }) => name).sort()).toEqual(['__proto__', ...hostile].sort());
  });
});

describe('nothing radiates', () => {
  it.each([
    ['below the range', one([10])],
    ['0 V', drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[100, 0]])])],
    [
      'a stated current of 0',
      boardFile({
        cables: [
          {
            ...cable(
              [
                [70, 22, 0],
                [500, 22, 0],
              ],
              'open',
            ),
            commonModeUa: [[100, 0]],
          },
        ],
      }),
    ],
  ])('%s: no point, nothing worst, and that is said with the range', (_, file) => {
    const { points, worst, verdict, caveats } = estimateOf(file);
    expect({ points, worst, verdict }).toEqual({ points: [], worst: null, verdict: 'meets' });
    const said = caveats.find(({ code }) => code === 'no-line-in-range')!;
    expect(said).toMatchObject({ fromHz: 30e6, toHz: 1e9 });
    expect(said.message).toMatch(/between 30 and 1000 MHz/);
  });
});

describe('a range that begins above the lines', () => {
  it('is said as it is', () => {
    const lines = limitSet().lines.slice(1);
    const { caveats } = estimateOf(one([100]), { request: { limits: limitSet(lines), maxHz: 2e9 } });
    expect(caveats.find(({ code }) => code === 'no-line-in-range')).toMatchObject({ fromHz: 1e9, toHz: 2e9 });
  });
});

describe('verdict', () => {
  const level = pointAt(estimateOf(one([100])), 100e6).levelDbuvPerM;
  /** The limit so that the margin is as asked. */
  const judged = (marginDb: number, requiredMarginDb: number, site: Choices['site'] = {}): EstimateResult => {
    const atDb = level + marginDb;
    const [first] = limitSet().lines;
    const limits = limitSet([
      {
        ...first!,
        points: [
          [30e6, atDb],
          [1e9, atDb],
        ],
      },
    ]);
    return estimateOf(one([100]), { request: { limits, requiredMarginDb }, site });
  };

  // U_cispr over a ground plane to 1 GHz: 6.3 dB (CISPR 16-4-2:2011, from memory).
  it.each([
    [-0.01, 0, 'exceeds'],
    [-0.01, 6, 'exceeds'],
    [0, 0, 'within-uncertainty'],
    [0, 6, 'falls-short'],
    [0.01, 0, 'within-uncertainty'],
    [0.01, 6, 'falls-short'],
    [5.99, 6, 'falls-short'],
    [6.01, 6, 'within-uncertainty'],
    [6.29, 0, 'within-uncertainty'],
    [6.31, 0, 'meets'],
    [6.31, 10, 'falls-short'],
    [10.01, 10, 'meets'],
  ])('margin %f dB, %f dB required: %s', (marginDb, requiredDb, verdict) => {
    const result = judged(marginDb, requiredDb);
    expect(result.verdict).toBe(verdict);
    expect(result.worst!.frequencyHz).toBe(100e6);
    expect(result.worst!.marginDb).toBeCloseTo(marginDb, 9);
    const isWithin = result.caveats.some(({ code }) => code === 'within-uncertainty');
    expect(isWithin).toBe(marginDb >= 0 && marginDb < 6.3);
    expect(result.limit.labUncertaintyDb).toBe(6.3);
  });

  it('is that of the worst point, whatever its frequency', () => {
    const result = estimateOf(one([100, 300, 700, 900]));
    const margins = result.points.map(({ marginDb }) => marginDb);
    expect(margins).toEqual([...margins].sort((a, b) => a - b));
    expect(result.worst).toEqual({ frequencyHz: result.points[0]!.frequencyHz, marginDb: margins[0] });
  });
});

describe('what was asked comes back in the result', () => {
  it('site, limit, program and notes', () => {
    const result = estimateOf(one([100], { revision: 'B' }), {
      site: { distanceM: 5, measuredFrom: 'center', orientation: 'upright' },
      request: { requiredMarginDb: 4, boardSha256: 'abc', programVersion: '9.9', notes: ['n'], maxHz: 500e6 },
    });
    expect(result).toMatchObject({
      format: 'quietboard-result',
      version: 1,
      board: { name: 'test board', revision: 'B', sha256: 'abc' },
      program: { version: '9.9' },
      site: { kind: 'ground-plane', distanceM: 5, measuredFrom: 'center', orientation: 'upright', tableHeightM: 0.8 },
      limit: { standard: 'Test lines', class: 'B', distanceM: 3, requiredMarginDb: 4, maxHz: 500e6 },
      structure: 'pair-only',
      notes: ['n'],
    });
    expect(result.site.boundaryRadiusM).toBeCloseTo(Math.hypot(0.035, 0.0006), 9);
    expect(result.cautions.length).toBeGreaterThan(0);
  });
});
