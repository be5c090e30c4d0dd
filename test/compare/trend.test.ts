import { describe, expect, expectTypeOf, it } from 'vitest';
import type { z } from 'zod';
import { directionOf, trendOf } from '../../app/compare/trend.ts';
import { type TrendPart, trendPartOf, trendRunOf } from '../../app/compare/trend-run.ts';
import type { trendPartSchema } from '../../app/compare/trend-schema.ts';
import { trendSchema } from '../../app/compare/trend-schema.ts';
import type { Trend, TrendRun } from '../../app/compare/types.ts';
import { boardFile } from '../support/estimates.ts';
import { sampleResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';

type Frozen<T> = T extends object ? { readonly [K in keyof T]: Frozen<T[K]> } : T;

const SAMPLE = trendRunOf(storedRun(boardFile({ name: 'Kiln', revision: 'A' }), sampleResult()));

const run = (number: number, revision: string, marginDb: number | null, more: Partial<TrendRun> = {}): TrendRun => ({
  ...SAMPLE,
  run: number,
  startedAt: `2031-01-${String(number).padStart(2, '0')}T00:00:00Z`,
  revision,
  worst: marginDb === null ? null : { frequencyHz: 125e6, marginDb },
  ...more,
});

const margins = (trend: Trend) =>
  trend.groups.map(({ points }) =>
    points.map(({ revision, run: number, runCount, worst }) => [revision, number, runCount, worst?.marginDb ?? null]),
  );

describe('a trend', () => {
  it('takes the latest run of every revision, in the order of first runs', () => {
    const trend = trendOf([run(4, 'A', -7), run(1, 'A', -9), run(3, 'C', 5), run(2, 'B', 1)]);
    expect(margins(trend)).toEqual([
      [
        ['A', 4, 2, -7],
        ['B', 2, 1, 1],
        ['C', 3, 1, 5],
      ],
    ]);
    expect(trend.groups[0]!.headline).toBe('better by 12.0 dB from A to C');
  });

  it('says each step in words', () => {
    const points = trendOf([
      run(1, 'A', -3.1),
      run(2, 'B', 2),
      run(3, 'C', 2.06),
      run(4, 'D', -1),
      run(5, 'E', null),
      run(6, 'F', 3),
    ]).groups[0]!.points;
    expect(points.map(({ direction, text }) => [direction, text])).toEqual([
      ['first', ''],
      ['better', 'better by 5.1 dB'],
      ['unchanged', 'unchanged within 0.1 dB'],
      ['worse', 'worse by 3.1 dB'],
      ['unknown', 'no line any more'],
      ['unknown', 'no line before'],
    ]);
    expect(directionOf(0.1).direction).toBe('better');
    expect(directionOf(-0.0999).direction).toBe('unchanged');
  });

  it.each<[string, Partial<TrendRun>]>([
    ['standard', { setup: { ...SAMPLE.setup, standard: 'FCC 15.109' } }],
    ['class', { setup: { ...SAMPLE.setup, class: 'A' } }],
    ['distance', { setup: { ...SAMPLE.setup, distanceM: 10 } }],
    ['where the distance starts', { setup: { ...SAMPLE.setup, measuredFrom: 'center' } }],
    ['site', { setup: { ...SAMPLE.setup, site: 'free-space' } }],
    ['orientation', { setup: { ...SAMPLE.setup, orientation: 'upright' } }],
    ['structure', { setup: { ...SAMPLE.setup, structure: 'pair-only' } }],
    ['board', { board: 'Oven' }],
    ['limit values', { bands: SAMPLE.bands.map((band) => ({ ...band, toDbuvPerM: band.toDbuvPerM + 1 })) }],
  ])('never puts runs that differ by %s on one line', (_what, more) => {
    const trend = trendOf([run(1, 'A', 1), run(2, 'B', 2, more), run(3, 'C', 3)]);
    expect(margins(trend)).toEqual([
      [
        ['A', 1, 1, 1],
        ['C', 3, 1, 3],
      ],
      [['B', 2, 1, 2]],
    ]);
  });

  it('keeps one line when only the required margin, the program or the upper end follows a faster clock', () => {
    const high = {
      detector: 'average' as const,
      fromHz: 1e9,
      toHz: 3e9,
      fromDbuvPerM: 50,
      toDbuvPerM: 50,
      worst: null,
    };
    const trend = trendOf([
      run(1, 'A', 1),
      run(2, 'B', 2, { requiredMarginDb: 3, programVersion: '9', bands: [...SAMPLE.bands, high] }),
    ]);
    expect(trend.groups).toHaveLength(1);
    expect(
      trend.groups[0]!.points.map(({ isOtherProgram, requiredMarginDb }) => [isOtherProgram, requiredMarginDb]),
    ).toEqual([
      [false, 6],
      [true, 3],
    ]);
    expect(trend.groups[0]!.requiredMarginDb).toBe(3);
    expect(trend.groups[0]!.bands.at(-1)).toMatchObject({ detector: 'average', fromHz: 1e9 });
  });

  it('follows every band', () => {
    const low = { detector: 'quasi-peak' as const, fromHz: 30e6, toHz: 230e6, fromDbuvPerM: 40, toDbuvPerM: 40 };
    const band = (marginDb: number | null) => ({
      bands: [{ ...low, worst: marginDb === null ? null : { frequencyHz: 50e6, marginDb } }],
    });
    const { bands } = trendOf([run(1, 'A', 1, band(4)), run(2, 'B', 2, band(1.5)), run(3, 'C', 2, band(null))])
      .groups[0]!;
    expect(bands).toHaveLength(1);
    expect(bands[0]!.steps.map(({ worst, text }) => [worst?.marginDb, text])).toEqual([
      [4, ''],
      [1.5, 'worse by 2.5 dB'],
      [undefined, 'no line any more'],
    ]);
  });

  it('has the shape of its schema, key by key (checked by the compiler), and survives JSON', () => {
    expectTypeOf<Frozen<z.output<typeof trendSchema>>>().toEqualTypeOf<Frozen<Trend>>();
    expectTypeOf<Frozen<z.output<typeof trendPartSchema>>>().toEqualTypeOf<Frozen<TrendPart>>();
    const trend = trendOf([run(1, 'A', 1), run(2, '', null), run(3, '__proto__', 3)]);
    expect(trendSchema.parse(JSON.parse(JSON.stringify(trend)))).toEqual(trend);
    expect(margins(trend)[0]!.map(([revision]) => revision)).toEqual(['A', '', '__proto__']);
    expect(trendOf([]).groups).toEqual([]);
  });

  it('needs of a run what a database can keep beside it: a thousand runs are nothing', () => {
    const part = trendPartOf(storedRun(boardFile(), sampleResult()));
    expect(JSON.stringify(part).length).toBeLessThan(1500);
    const runs = Array.from({ length: 1000 }, (_, i) =>
      run(i, `R${Math.floor(i / 20)}`, i / 100, { startedAt: String(10_000 + i) }),
    );
    const startMs = performance.now();
    const trend = trendOf(runs);
    // A few milliseconds here.
    expect(performance.now() - startMs).toBeLessThan(2000);
    expect(trend.groups[0]!.points).toHaveLength(50);
    expect(trend.groups[0]!.points.at(-1)).toMatchObject({ run: 999, runCount: 20 });
  });
});
