import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BandFinder, bandMargins, bandsOfLines, limitLinesOf } from '../../app/compare/bands.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import type { LimitLine } from '../../app/limits/limit-line.ts';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import { boardFile } from '../support/estimates.ts';
import { emptyResult, resultWith, sampleResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';

const settings = (more: object = {}) => runSettingsSchema.parse(more);
const CISPR_B = limitLinesOf(settings())!;
const bandNames = (lines: readonly LimitLine[]) =>
  bandsOfLines(lines).map(({ detector, fromHz, toHz }) => `${detector} ${fromHz / 1e6}-${toHz / 1e6}`);

const reading = (
  frequencyHz: number,
  marginDb: number,
  limitDb: number,
  detector: ResultPoint['detector'] = 'quasi-peak',
): ResultPoint => ({
  ...sampleResult().points[0]!,
  frequencyHz,
  detector,
  levelDbuvPerM: limitDb - marginDb,
  limitDbuvPerM: limitDb,
  marginDb,
});

describe('bands', () => {
  it('are the pieces between the break points of the limit lines, by detector', () => {
    // Break points as tabulated for CISPR 32 class B at 3 m: 230 MHz, and 3 GHz above 1 GHz.
    expect(bandNames(CISPR_B)).toEqual([
      'quasi-peak 30-230',
      'quasi-peak 230-1000',
      'average 1000-3000',
      'average 3000-6000',
      'peak 1000-3000',
      'peak 3000-6000',
    ]);
    // 47 CFR 15.109(a): 30, 88, 216, 960 MHz.
    const fcc = limitLinesOf(settings({ standard: 'FCC 15.109' }))!;
    expect(bandNames(fcc).slice(0, 4)).toEqual([
      'quasi-peak 30-88',
      'quasi-peak 88-216',
      'quasi-peak 216-960',
      'quasi-peak 960-1000',
    ]);
  });

  it('give the edge to the tighter side, as the judgement does', () => {
    const finder = new BandFinder(bandsOfLines(CISPR_B));
    const bandAt = (frequencyHz: number) => finder.indexOf({ detector: 'quasi-peak', frequencyHz });
    expect([30e6, 229e6, 230e6, 230e6 * (1 + 1e-12), 231e6, 1e9].map(bandAt)).toEqual([0, 0, 0, 0, 1, 1]);
    expect([29e6, 1.01e9].map(bandAt)).toEqual([-1, -1]);
    const falling: LimitLine = {
      ...CISPR_B[0]!,
      points: [
        [30e6, 50],
        [100e6, 50],
        [100e6, 40],
        [300e6, 40],
      ],
    };
    expect(new BandFinder(bandsOfLines([falling])).indexOf({ detector: 'quasi-peak', frequencyHz: 100e6 })).toBe(1);
  });

  it('hold every reading that the limits judge, at the limit the judgement took', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('CISPR 32', 'FCC 15.109', 'CISPR 11', 'CISPR 14-1'),
        fc.double({ min: Math.log(25e6), max: Math.log(7e9), noNaN: true }),
        (standard, logHz) => {
          const frequencyHz = Math.exp(logHz);
          const run = settings({ standard, class: 'B', distanceM: 3, convertDistance: true });
          const set = chooseLimits({ standard, class: 'B', distanceM: 3, convertDistance: true });
          const finder = new BandFinder(bandsOfLines(limitLinesOf(run)!));
          for (const detector of ['quasi-peak', 'average', 'peak'] as const) {
            const judged = set.limitsAt(frequencyHz).some((limit) => limit.detector === detector);
            expect(finder.indexOf({ detector, frequencyHz }) >= 0).toBe(judged);
          }
        },
      ),
      { seed: 5, numRuns: 200 },
    );
  });

  it('take a measured curve of a limit file as one', () => {
    const points = Array.from({ length: 500 }, (_, i): [number, number] => [30e6 + i * 1e6, 40 + (i % 3)]);
    expect(bandNames([{ ...CISPR_B[0]!, points }])).toEqual(['quasi-peak 30-529']);
  });

  it('are unknown for a standard that this version does not know', () => {
    expect(limitLinesOf(settings({ standard: 'CISPR 99' }))).toBeUndefined();
    const run = (standard: string) => storedRun(boardFile(), sampleResult(), { settings: { standard } });
    const { bands } = compareRuns(run('CISPR 99'), run('CISPR 32'));
    expect(bands.map(({ fromHz, toHz }) => [fromHz / 1e6, toHz / 1e6])).toEqual([
      [30, 100],
      [100, 300],
      [300, 1000],
    ]);
    expect(bands.reduce((sum, { after }) => sum + after.lines, 0)).toBe(sampleResult().points.length);
  });
});

describe('band margins', () => {
  it('are the worst of each band, leave out what was not judged', () => {
    const result = resultWith([reading(50e6, 7, 40), reading(200e6, -2, 40), reading(500e6, 11, 47)]);
    expect(bandMargins(CISPR_B, result)).toEqual([
      {
        detector: 'quasi-peak',
        fromHz: 30e6,
        toHz: 230e6,
        fromDbuvPerM: 40,
        toDbuvPerM: 40,
        worst: { frequencyHz: 200e6, marginDb: -2 },
      },
      {
        detector: 'quasi-peak',
        fromHz: 230e6,
        toHz: 1e9,
        fromDbuvPerM: 47,
        toDbuvPerM: 47,
        worst: { frequencyHz: 500e6, marginDb: 11 },
      },
    ]);
    const edge = resultWith([reading(1e9, 20, 50, 'average')]);
    expect(bandMargins(CISPR_B, edge).map(({ detector, worst }) => [detector, worst?.marginDb])).toEqual([
      ['quasi-peak', undefined],
      ['quasi-peak', undefined],
      ['average', 20],
    ]);
  });

  it('of two runs are compared over the break points of both where their limits differ', () => {
    const fcc = storedRun(boardFile(), resultWith([reading(50e6, 3, 40), reading(100e6, 5, 43.5)]), {
      settings: { standard: 'FCC 15.109' },
    });
    const cispr = storedRun(boardFile(), resultWith([reading(50e6, 1, 40), reading(225e6, 9, 40)]));
    const { bands } = compareRuns(fcc, cispr);
    expect(bands.map(({ fromHz, toHz, marginChangeDb }) => [fromHz / 1e6, toHz / 1e6, marginChangeDb])).toEqual([
      [30, 88, -2],
      [88, 216, null],
      [216, 230, null],
      [230, 960, null],
      [960, 1000, null],
    ]);
    expect(bands[1]!.before).toEqual({ worst: { frequencyHz: 100e6, marginDb: 5 }, lines: 1, over: 0 });
  });

  it('count readings over the limit', () => {
    const run = storedRun(
      boardFile(),
      resultWith([reading(50e6, -1, 40), reading(60e6, -3, 40), reading(70e6, 0, 40)]),
    );
    const none = storedRun(boardFile(), emptyResult());
    expect(compareRuns(run, none).bands[0]).toMatchObject({
      before: { lines: 3, over: 2, worst: { marginDb: -3 } },
      after: { lines: 0, worst: null },
    });
  });
});
