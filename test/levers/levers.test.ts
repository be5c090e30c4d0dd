import { expect, test } from 'vitest';
import type { Board } from '../../app/board/board.ts';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { estimate } from '../../app/estimate/estimate.ts';
import { prepareLevers } from '../../app/levers/levers.ts';
import {
  boardFile,
  driveFile,
  drivenBoard,
  FLAT_LINES,
  limitSet,
  type Mm,
  netFile,
  requestOf,
} from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';
import { expectFresh, expectFreshWhenTurned, told } from './support.ts';

const clock = (name: string, frequencyMhz: number, more: object = {}) => ({
  name,
  kind: 'trapezoid' as const,
  frequencyMhz,
  lowV: 0,
  highV: 3.3,
  dutyPercent: 47,
  riseNs: 1,
  fallNs: 1.2,
  ...more,
});
const solved = requestOf({ request: { structure: 'solved' } });
const pairOnly = requestOf();

/** A trunk with two branches: two drivers and three loads on one net. */
const branched: BoardFileInput = boardFile({
  nets: [
    {
      name: 'T',
      traces: [
        {
          layer: 'TOP',
          widthMm: 0.4,
          pointsMm: [
            [9, 12],
            [60, 12],
          ],
        },
        {
          layer: 'TOP',
          widthMm: 0.3,
          pointsMm: [
            [25, 12],
            [25, 36],
          ],
        },
        {
          layer: 'TOP',
          widthMm: 0.3,
          pointsMm: [
            [44, 12],
            [44, 30],
            [55, 30],
          ],
        },
      ],
      pins: [
        { name: 'U1.1', atMm: [9, 12], layer: 'TOP' },
        { name: 'U2.1', atMm: [60, 12], layer: 'TOP' },
        { name: 'U3.1', atMm: [25, 36], layer: 'TOP' },
        { name: 'U4.1', atMm: [55, 30], layer: 'TOP' },
      ],
    },
  ],
  waveforms: [clock('a', 90), clock('b', 120)],
  drives: [
    { net: 'T', pin: 'U1.1', waveform: 'a', sourceOhm: 25 },
    { net: 'T', pin: 'U4.1', waveform: 'b', sourceOhm: 40 },
  ],
  loads: [
    { net: 'T', pin: 'U2.1', capacitancePf: 5 },
    { net: 'T', pin: 'U3.1', resistanceOhm: 1e5, capacitancePf: 3 },
    { net: 'T', pin: 'U1.1', capacitancePf: 2 },
  ],
});

const pair: [Mm[], Mm[]] = [
  [
    [8, 20],
    [60, 20],
  ],
  [
    [8, 21],
    [60, 21],
  ],
];
/** Two nets of one clock, one inverted, a loop and another clock that meets its harmonics. */
const differential = drivenBoard(
  [netFile('P', pair[0]), netFile('N', pair[1]), netFile('A')],
  [driveFile('P', 'd'), driveFile('N', 'd', { inverted: true }), driveFile('A', 'c')],
  [
    clock('d', 100),
    clock('c', 200),
    { ...clock('i', 100), lowV: undefined, highV: undefined, lowA: 0, highA: 0.3 } as never,
  ],
  {
    loops: [
      {
        name: 'converter',
        pointsMm: [
          [8, 32, 1.2],
          [16, 32, 1.2],
          [16, 38, 1.2],
          [8, 38, 1.2],
        ],
        waveform: 'i',
      },
    ],
  },
);

const cables: NonNullable<BoardFileInput['cables']> = [
  {
    name: 'open lead',
    pointsMm: [
      [70, 20, 0],
      [160, 20, 0],
      [160, 20, -500],
    ],
    radiusMm: 1,
    farEnd: 'open',
  },
  {
    name: 'supply',
    pointsMm: [
      [0, 12, 0],
      [-80, 12, 0],
      [-80, 12, -800],
    ],
    radiusMm: 1.5,
    farEnd: 'ground',
  },
];
/** A clamp's reading at one line of the clock and beside it. */
const stated: NonNullable<BoardFileInput['cables']> = [
  {
    name: 'clamp',
    pointsMm: [
      [70, 30, 0],
      [150, 30, 0],
    ],
    radiusMm: 1,
    farEnd: 'open',
    commonModeUa: [
      [90, 40],
      [500, 10],
    ],
  },
];

const named = drivenBoard(
  [
    {
      ...netFile('R', [
        [10, 10],
        [60, 10],
      ]),
      returnPath: {
        layer: 'TOP',
        pointsMm: [
          [10, 14],
          [60, 14],
        ],
      },
    },
  ],
  [driveFile('R', 'a')],
  [clock('a', 130)],
  { planes: [] },
);

test.each<[string, BoardFileInput, number]>([
  ['branches, two drivers on one net', branched, 12],
  ['a pair of nets and a loop', differential, 12],
  ['a named return', named, 8],
  ['a cable with a stated current', { ...branched, cables: stated }, 6],
])('changed sources and loads read as a fresh estimate, trace pairs: %s', (_, file, runs) => {
  expectFreshWhenTurned(boardOf(file), pairOnly, runs);
});

test.each<[string, BoardFileInput, number]>([
  ['branches, two drivers on one net', branched, 5],
  ['a pair of nets and a loop', differential, 5],
  ['cables', { ...branched, cables }, 3],
])('changed sources and loads read as a fresh estimate, planes and cables solved: %s', (_, file, runs) => {
  expectFreshWhenTurned(boardOf(file), solved, runs);
});

test('above 1 GHz, in free space, upright', () => {
  const request = requestOf({ site: { orientation: 'upright' }, request: { maxHz: 2.2e9 } });
  expectFreshWhenTurned(boardOf(drivenBoard([netFile('A')], [driveFile('A', 'c')], [clock('c', 270)])), request, 6);
});

/** One net with an even waveform, another clock and a loop, for single changes. */
const plain = boardOf(
  drivenBoard(
    [netFile('A'), netFile('B', pair[0])],
    [driveFile('A', 'c'), driveFile('B', 'c')],
    [clock('c', 100, { dutyPercent: 50, fallNs: 1 }), clock('spare', 100)],
  ),
);
const levers = prepareLevers(plain, pairOnly);
const withDrive = (net: string, more: Partial<Board['drives'][number]>): Board => ({
  ...plain,
  drives: plain.drives.map((drive) => (drive.net === net ? { ...drive, ...more } : drive)),
});
const withLoad = (net: string, more: Partial<Board['loads'][number]>): Board => ({
  ...plain,
  loads: plain.loads.map((load) => (load.net === net ? { ...load, ...more } : load)),
});

test.each<[string, Board]>([
  ['an ideal source', withDrive('A', { sourceOhm: 0 })],
  ['a shorted load', withLoad('A', { resistanceOhm: 0 })],
  [
    'a load of a thousandth of an ohm and a millionth of a farad',
    withLoad('A', { resistanceOhm: 1e-3, capacitanceF: 1e-6 }),
  ],
  ['two loads on one pin', { ...plain, loads: [...plain.loads, { ...plain.loads[0]!, capacitanceF: 9e-12 }] }],
  [
    'driver and load changed about',
    { ...withDrive('A', { pin: 'U2.A' }), loads: withLoad('A', { pin: 'U1.A' }).loads },
  ],
  [
    'a second driver at the load, of another waveform',
    { ...plain, drives: [...plain.drives, { ...plain.drives[0]!, pin: 'U2.A', waveform: 'spare' }] },
  ],
  ['another waveform of the same frequency', withDrive('A', { waveform: 'spare' })],
  ['a net without its driver', { ...plain, drives: plain.drives.slice(0, 1), loads: plain.loads.slice(0, 1) }],
  [
    'the even harmonics of another duty cycle',
    { ...plain, waveforms: plain.waveforms.map((w) => (w.kind === 'trapezoid' ? { ...w, dutyRatio: 0.3 } : w)) },
  ],
])('reads as a fresh estimate: %s', (_, changed) => {
  expectFresh(levers, changed, pairOnly);
});

test('other limits and another required margin', () => {
  const lenient = limitSet(
    FLAT_LINES.map((line) => ({ ...line, points: line.points.map(([hz, db]) => [hz, db + 40] as const) })),
  );
  const request = { ...pairOnly, limits: lenient, requiredMarginDb: 60 };
  expectFresh(levers, plain, request);
  expect(told(levers.try(plain, pairOnly)).verdict).toBe('exceeds');
  expect(told(levers.try(plain, request)).verdict).toBe('falls-short');
  expect(told(levers.try(plain, { ...request, requiredMarginDb: 0 })).verdict).toBe('meets');
});

test.each<[string, Board, typeof pairOnly, RegExp]>([
  [
    'another frequency',
    { ...plain, waveforms: plain.waveforms.map((w) => ({ ...w, frequencyHz: 101e6 }) as typeof w) },
    pairOnly,
    /net A has a line at 101 MHz/,
  ],
  ['a load less', { ...plain, loads: plain.loads.slice(1) }, pairOnly, /pin U2\.A of net A has no driver or load/],
  [
    'a pin that had none',
    { ...plain, drives: [...plain.drives, { ...plain.drives[0]!, pin: 'U9.1' }] },
    pairOnly,
    /pin U9\.1 of net A had no driver/,
  ],
  ['another layout', { ...plain, nets: plain.nets.map((net) => ({ ...net, z0Ohm: 61 })) }, pairOnly, /layout/],
  ['another orientation', plain, requestOf({ site: { orientation: 'upright' } }), /site/],
  ['planes solved', plain, solved, /solved/],
  ['another range', plain, requestOf({ request: { maxHz: 900e6 } }), /range/],
  ['a cable', { ...plain, cables: boardOf({ ...branched, cables }).cables }, pairOnly, /cables/],
  [
    'a loop',
    { ...plain, loops: boardOf(differential).loops.map((loop) => ({ ...loop, waveform: 'c' })) },
    pairOnly,
    /loop converter/,
  ],
])('says why it must be solved: %s', (_, changed, request, reason) => {
  expect(levers.try(changed, request)).toEqual({ needsSolve: expect.stringMatching(reason) });
});

test('the first driver of a named return is where the return is laid from', () => {
  const board = boardOf(named);
  const kept = prepareLevers(board, pairOnly);
  const swapped = {
    ...board,
    drives: board.drives.map((drive) => ({ ...drive, pin: 'U2.R' })),
    loads: board.loads.map((load) => ({ ...load, pin: 'U1.R' })),
  };
  expect(kept.try(swapped, pairOnly)).toEqual({ needsSolve: expect.stringMatching(/return path/) });
});

test('what cannot be estimated is refused in the estimate’s own words', () => {
  const shorted = [
    {
      ...withDrive('A', { sourceOhm: 0 }),
      loads: withLoad('A', { pin: 'U1.A', resistanceOhm: 0 }).loads.concat(plain.loads),
    },
    { ...plain, drives: [], loads: [] },
    withDrive('A', { waveform: 'none' }),
  ];
  for (const changed of shorted) {
    const message = (step: () => unknown) => {
      try {
        step();
      } catch (error) {
        return (error as Error).message;
      }
      return 'nothing thrown';
    };
    const fresh = message(() => estimate(changed, pairOnly));
    expect(fresh).not.toBe('nothing thrown');
    expect(message(() => levers.try(changed, pairOnly))).toBe(fresh);
  }
});

test('memory is told and held to; stop ends the work; progress is told', () => {
  expect(levers.keptBytes).toBeGreaterThan(10_000);
  expect(() => prepareLevers(plain, pairOnly, {}, levers.keptBytes - 1)).toThrow(/memory|MB/);
  expect(prepareLevers(plain, pairOnly, {}, levers.keptBytes).keptBytes).toBe(levers.keptBytes);
  let asked = 0;
  expect(() => prepareLevers(plain, pairOnly, { stop: () => ++asked > 3 })).toThrow('stopped');
  const told: number[] = [];
  prepareLevers(plain, pairOnly, { onProgress: (done, total) => void told.push(done / total) });
  expect(told[0]).toBe(0);
  expect(told.at(-1)).toBe(1);
});
