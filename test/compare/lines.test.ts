import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { matchLines } from '../../app/compare/match-lines.ts';
import type { Contributor, ResultPoint } from '../../app/estimate/result.ts';
import { boardFile, driveFile, drivenBoard, linesVoltage, netFile } from '../support/estimates.ts';
import { expectClose } from '../support/expect-close.ts';
import { resultWith } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';

/** Levels chosen by hand: every expected number is a difference or a ratio of powers worked out beside it. */

const point = (
  frequencyHz: number,
  levelDbuvPerM: number,
  contributors: Contributor[] = [],
  limitDbuvPerM = 40,
): ResultPoint => ({
  frequencyHz,
  detector: 'quasi-peak',
  levelDbuvPerM,
  limitDbuvPerM,
  marginDb: limitDbuvPerM - levelDbuvPerM,
  polarization: 'vertical',
  antennaHeightM: 1.2,
  turntableDeg: 17,
  horizontalDbuvPerM: levelDbuvPerM - 3,
  verticalDbuvPerM: levelDbuvPerM,
  upperBoundDbuvPerM: levelDbuvPerM + 1,
  contributors,
});

const net = (name: string, via: Record<string, number>): Contributor => ({
  kind: 'net',
  name,
  levelDbuvPerM: 10 * Math.log10(Object.values(via).reduce((sum, db) => sum + 10 ** (db / 10), 0)),
  viaDbuvPerM: via,
});

const compared = (
  before: ResultPoint[],
  after: ResultPoint[],
  boards: [BoardFileInput, BoardFileInput] = [boardFile(), boardFile()],
) => compareRuns(storedRun(boards[0], resultWith(before)), storedRun(boards[1], resultWith(after), { run: 2 }));

describe('lines of two runs', () => {
  it('belong together within the rounding of a harmonic, and not half a receiver bandwidth apart', () => {
    // 3 · 41.666… MHz rounded at every step, against 125 MHz.
    const rounded = 3 * (125 / 3) * 1e6 * (1 + 4 * Number.EPSILON);
    expect(matchLines([point(rounded, 30)], [point(125e6, 30)])).toHaveLength(1);
    expect(matchLines([point(125e6 + 60e3, 30)], [point(125e6, 30)])).toHaveLength(2);
    expect(matchLines([point(125e6 + 10, 30)], [point(125e6, 30)])).toHaveLength(2);
  });

  it('are paired each once, whatever order they come in', () => {
    const before = [300e6, 50e6, 100e6].map((hz) => point(hz, 20));
    const after = [50e6, 75e6, 300e6].map((hz) => point(hz, 20));
    const pairs = matchLines(before, after).map((pair) => [
      pair.frequencyHz / 1e6,
      Boolean(pair.before),
      Boolean(pair.after),
    ]);
    expect(pairs).toEqual([
      [50, true, true],
      [75, false, true],
      [100, true, false],
      [300, true, true],
    ]);
  });

  it('are kept apart by detector', () => {
    const average: ResultPoint = { ...point(1.2e9, 30), detector: 'average' };
    const peak: ResultPoint = { ...point(1.2e9, 40), detector: 'peak' };
    expect(matchLines([average, peak], [peak])).toHaveLength(2);
  });

  it('say what became of each against the limit, worst margin of either run first', () => {
    const { lines, counts } = compared(
      [point(50e6, 45), point(75e6, 30), point(100e6, 47), point(125e6, 20), point(150e6, 41), point(175e6, 25)],
      [point(50e6, 38), point(75e6, 43), point(100e6, 42), point(125e6, 20.05), point(200e6, 44)],
    );
    expect(lines.map((line) => [line.frequencyHz / 1e6, line.status, line.crossing, line.marginChangeDb])).toEqual([
      [100, 'changed', 'still-over', 5],
      [50, 'changed', 'newly-under', 7],
      [200, 'new', 'newly-over', null],
      [75, 'changed', 'newly-over', -13],
      [150, 'gone', 'newly-under', null],
      [175, 'gone', 'under', null],
      [125, 'unchanged', 'under', expect.closeTo(-0.05, 9)],
    ]);
    expect(counts).toEqual({
      better: 2,
      worse: 1,
      unchanged: 1,
      new: 1,
      gone: 2,
      newlyOver: 2,
      newlyUnder: 2,
      stillOver: 1,
    });
  });

  it('tell a moved limit from a moved level', () => {
    const [line] = compared([point(50e6, 30)], [point(50e6, 32, [], 50)]).lines;
    expect(line).toMatchObject({ status: 'changed', levelChangeDb: 2, limitChangeDb: 10, marginChangeDb: 8 });
  });
});

describe('who made a line change', () => {
  it('is ranked by the change of own power through each path', () => {
    const before = [net('CLK', { pair: 10, cable: 40 }), net('BUS', { pair: 30 })];
    const after = [net('CLK', { pair: 13, cable: 20 }), net('BUS', { pair: 30 }), net('NEW', { plane: 27 })];
    const [line] = compared([point(50e6, 40.4, before)], [point(50e6, 31, after)]).lines;
    // Powers: 10⁴ − 10² = 9900; 10^2.7 = 501.19; 10^1.3 − 10 = 9.95, less than 1 %; BUS 0.
    const total = 9900 + 10 ** 2.7 + (10 ** 1.3 - 10);
    expect(line!.contributors.map(({ name, path, changeDb }) => [name, path, changeDb])).toEqual([
      ['CLK', 'cable', -20],
      ['NEW', 'plane', null],
    ]);
    expectClose(line!.contributors[0]!.share, 9900 / total, { rel: 1e-12, because: 'rounding' });
    expectClose(line!.contributors[1]!.share, 10 ** 2.7 / total, { rel: 1e-12, because: 'rounding' });
    expect(line!.contributors[1]).toMatchObject({ beforeDbuvPerM: null, afterDbuvPerM: 27 });
  });

  it('names at most eight, and nobody for an unchanged line', () => {
    const many = (db: number) => Array.from({ length: 30 }, (_, i) => net(`N${i}`, { pair: db + i / 10 }));
    const { lines } = compared(
      [point(50e6, 40, many(30)), point(75e6, 20, many(3))],
      [point(50e6, 30, many(20)), point(75e6, 20, many(3))],
    );
    expect(lines.map(({ contributors }) => contributors.length)).toEqual([8, 0]);
    expect(lines[0]!.contributors[0]!.name).toBe('N29');
  });
});

describe('what a change did', () => {
  const wave = (amplitudeV: number) => linesVoltage('w', [[50, amplitudeV]]);
  const board = (amplitudeV: number, sourceOhm = 30, more: Partial<BoardFileInput> = {}): BoardFileInput =>
    drivenBoard(
      [
        netFile('CLK'),
        netFile('BUS', [
          [5, 5],
          [30, 5],
        ]),
      ],
      [driveFile('CLK', 'w', { sourceOhm }), driveFile('BUS', 'v')],
      [wave(amplitudeV), linesVoltage('v', [[50, 1]])],
      more,
    );
  const at = (hz: number, clkDb: number, busDb: number, limitDb: number) =>
    point(hz, clkDb, [net('CLK', { pair: clkDb }), net('BUS', { pair: busDb })], limitDb);

  it('is told at the line where it moves most towards or away from the limit', () => {
    // Over the limit by 2 dB and then under it by 7; the other line falls by 20 dB, far below.
    const before = [at(50e6, 42, 20, 40), at(75e6, 10, 20, 40)];
    const after = [at(50e6, 33, 20, 40), at(75e6, -10, 20, 40)];
    const { changes, lines } = compared(before, after, [board(1), board(0.35)]);
    expect(changes).toHaveLength(1);
    expect(changes[0]!.effect).toMatchObject({
      frequencyHz: 50e6,
      name: 'CLK',
      changeDb: expect.closeTo(-9, 9),
      isAlone: true,
    });
    expect(lines.map(({ causes }) => causes)).toEqual([[0], [0]]);
  });

  it('is not told as its own where other changes act on the same net, or on the whole board', () => {
    const before = [at(50e6, 42, 20, 40)];
    const after = [at(50e6, 33, 20, 40)];
    const two = compared(before, after, [board(1), board(0.5, 50)]).changes;
    expect(two.map(({ effect }) => effect?.isAlone)).toEqual([false, false]);
    const outline = [
      {
        pointsMm: [
          [0, 0],
          [60, 0],
          [60, 44],
          [0, 44],
        ] as [number, number][],
      },
    ];
    const wide = compared(before, after, [board(1), board(0.5, 30, { outline })]).changes;
    expect(wide.map(({ kind, effect }) => [kind, effect?.isAlone])).toEqual([
      ['outline', undefined],
      ['waveform', false],
    ]);
  });

  it('orders changes by it, the set-up first', () => {
    const before = [at(50e6, 42, 41.9, 40)];
    const after = [at(50e6, 41, 30, 40)];
    const other = board(0.9);
    const changed = {
      ...other,
      drives: other.drives!.map((drive) => (drive.net === 'BUS' ? { ...drive, seriesOhm: 33 } : drive)),
    };
    const texts = compareRuns(
      storedRun(board(1), resultWith(before)),
      storedRun(changed, resultWith(after), { settings: { distanceM: 10 } }),
    ).changes.map(({ text }) => text);
    expect(texts).toEqual([
      'distance 3 → 10 m',
      'BUS: series resistor none → 33 Ω',
      'CLK: amplitude at 50 MHz 1 → 0.9 V',
    ]);
  });

  it('gives a cable the power of all that radiates through it', () => {
    const through = (clkDb: number, busDb: number) =>
      point(50e6, 40, [net('CLK', { lead: clkDb }), net('BUS', { lead: busDb, pair: 35 })]);
    const cables = (lengthMm: number) => ({
      cables: [
        {
          name: 'lead',
          pointsMm: [
            [70, 10, 0],
            [70 + lengthMm, 10, 0],
          ] as [number, number, number][],
        },
      ],
    });
    const { changes } = compared(
      [through(30, 30)],
      [through(20, 20)],
      [board(1, 30, cables(700)), board(1, 30, cables(300))],
    );
    expect(changes).toHaveLength(1);
    expect(changes[0]!.effect).toMatchObject({ name: 'lead', isAlone: true, changeDb: expect.closeTo(-10, 9) });
    // Two equal powers: 3.0103 dB more than one.
    expectClose(changes[0]!.effect!.beforeDbuvPerM!, 33.0103, { rel: 1e-6, because: '10·log10(2)' });
  });

  it('follows a net that changed its name', () => {
    const renamed = JSON.parse(JSON.stringify(board(1)).replaceAll('"CLK"', '"CLOCK"')) as BoardFileInput;
    const { lines } = compared(
      [at(50e6, 42, 20, 40)],
      [point(50e6, 32, [net('CLOCK', { pair: 32 }), net('BUS', { pair: 20 })])],
      [board(1), renamed],
    );
    expect(lines[0]!.contributors.map(({ name, changeDb }) => [name, changeDb])).toEqual([['CLOCK', -10]]);
  });
});
