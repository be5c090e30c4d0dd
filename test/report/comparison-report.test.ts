import { describe, expect, it } from 'vitest';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { trendOf } from '../../app/compare/trend.ts';
import { trendRunOf } from '../../app/compare/trend-run.ts';
import type { Comparison } from '../../app/compare/types.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { changeGroups, effectText } from '../../app/report/comparison/change-groups.ts';
import { comparisonCsv } from '../../app/report/comparison/comparison-csv.ts';
import { comparisonHtml } from '../../app/report/comparison/comparison-html.ts';
import { comparisonText } from '../../app/report/comparison/comparison-text.ts';
import type { ReportTitle } from '../../app/report/report-title.ts';
import { terminalWidth } from '../../app/report/safe-text.ts';
import { trendCsv } from '../../app/report/trend/trend-csv.ts';
import { trendHtml } from '../../app/report/trend/trend-html.ts';
import { trendText } from '../../app/report/trend/trend-text.ts';
import { boardFile, driveFile, drivenBoard, linesVoltage, netFile } from '../support/estimates.ts';
import { HOSTILE_NAMES, hostileResult } from '../support/hostile-names.ts';
import { denseResult, emptyResult, resultWith, sampleResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';
import { plainText, readPage } from './html-reader.ts';

/** Everything lower by so many dB. */
const quieter = (result: EstimateResult, changeDb: number): EstimateResult =>
  resultWith(
    result.points.map((point) => ({
      ...point,
      levelDbuvPerM: point.levelDbuvPerM - changeDb,
      marginDb: point.marginDb + changeDb,
      contributors: point.contributors.map((each) => ({
        ...each,
        levelDbuvPerM: each.levelDbuvPerM - changeDb,
        viaDbuvPerM: Object.fromEntries(Object.entries(each.viaDbuvPerM).map(([path, db]) => [path, db - changeDb])),
      })),
    })),
  );

const TITLE: ReportTitle = {
  project: HOSTILE_NAMES[2]!,
  author: HOSTILE_NAMES[4]!,
  dateText: '2031-05-06',
  runNumber: 2,
  note: HOSTILE_NAMES[5]!,
};

const boardOf = (amplitudeV: number, name = 'CLK_25M') =>
  drivenBoard([netFile(name)], [driveFile(name, 'w')], [linesVoltage('w', [[25, amplitudeV]])], {
    name: 'Kiln',
    revision: `R${amplitudeV}`,
  });

const usual = compareRuns(
  storedRun(boardOf(3), sampleResult()),
  storedRun(boardOf(1), quieter(sampleResult(), 4), { run: 2 }),
);
const dense = compareRuns(
  storedRun(boardOf(3), denseResult(4000)),
  storedRun(boardOf(1), quieter(denseResult(3000), 4), { run: 2 }),
);
const hostile = compareRuns(
  storedRun(
    boardFile({ name: HOSTILE_NAMES[0]!, nets: HOSTILE_NAMES.slice(0, 8).map((name) => ({ name })) }),
    hostileResult(),
    { note: HOSTILE_NAMES[5]! },
  ),
  storedRun(boardFile({ name: HOSTILE_NAMES[5]!, revision: HOSTILE_NAMES[4]! }), sampleResult(), { run: 2 }),
);
const nothing = compareRuns(storedRun(boardOf(3), emptyResult()), storedRun(boardOf(3), emptyResult()));
const CASES: [string, Comparison][] = [
  ['usual', usual],
  ['thousands of lines', dense],
  ['hostile names', hostile],
  ['nothing', nothing],
];

const trendRuns = (revisions: readonly string[], more = {}) =>
  revisions.map((revision, i) => ({
    ...trendRunOf(storedRun(boardFile({ name: 'Kiln' }), quieter(sampleResult(), i))),
    revision,
    run: i + 1,
    startedAt: `2031-01-01T00:${String(i % 60).padStart(2, '0')}:00Z`,
    ...more,
  }));
const trend = trendOf([...trendRuns(['A', 'B', 'C']), ...trendRuns(['A'], { board: 'Oven' })]);
const TRENDS: [string, ReturnType<typeof trendOf>][] = [
  ['usual', trend],
  ['many', trendOf(trendRuns(Array.from({ length: 60 }, (_, i) => `rev ${i}`)))],
  ['hostile names', trendOf(trendRuns(HOSTILE_NAMES, { board: HOSTILE_NAMES[0] }))],
  ['without lines', trendOf(trendRuns(['A', 'B'], { worst: null, bands: [] }))],
  ['nothing', trendOf([])],
];

const checkTerminal = (text: string, width: number) => {
  expect(text.endsWith('\n')).toBe(true);
  for (const line of text.split('\n')) {
    expect(line).not.toMatch(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/u);
    expect(terminalWidth(line), line).toBeLessThanOrEqual(width);
  }
};

describe('in a terminal', () => {
  it.each(CASES)('a comparison stays in its width, without control characters: %s', (_name, comparison) => {
    for (const width of [40, 60, 80]) checkTerminal(comparisonText(comparison, { top: 30, width }), width);
    checkTerminal(comparisonText(comparison, { top: 5, width: 200 }), 80);
  });

  it.each(TRENDS)('a trend stays in its width, without control characters: %s', (_name, each) => {
    for (const width of [40, 60, 80]) checkTerminal(trendText(each, { width }), width);
  });

  it('says headline, change and effect, bands and counts', () => {
    const text = comparisonText(usual, { top: 3, width: 80 });
    expect(text.replace(/\s+/g, ' ')).toContain(usual.headline);
    expect(text).toContain('  - CLK_25M: amplitude at 25 MHz 3 → 1 V');
    expect(text).toMatch(/QP 30–230 MHz +−?[\d.]+ at \d+ MHz +−?[\d.]+ at \d+ MHz +\+4\.0/);
    expect(text).toContain('39 readings: 39 better, 0 worse, 0 unchanged.');
    expect(text).toContain('36 more, with larger margins');
    expect(comparisonText(nothing, { top: 3, width: 80 })).toContain(
      'What changed: nothing in board, sources and set-up.',
    );
  });

  it('says margins, steps and sets of a trend', () => {
    const text = trendText(trend, { width: 80 });
    expect(text).toContain('3 revisions: better by 2.0 dB from A to C.');
    expect(text).toMatch(/^C +3 +1 +\S+ .*better by 1\.0 dB$/m);
    expect(text).toContain('Oven');
    expect(trendText(trendOf([]), { width: 80 })).toBe('No runs.\n');
  });
});

describe('as a page', () => {
  it.each(CASES)(
    'a comparison is well-formed, holds no script and no reference to elsewhere: %s',
    (_name, comparison) => {
      checkPage(comparisonHtml(comparison, TITLE));
    },
  );

  it.each(TRENDS)('a trend too: %s', (_name, each) => checkPage(trendHtml(each, TITLE)));

  it('says the same as the terminal', () => {
    const text = plainText(readPage(comparisonHtml(usual)));
    expect(text).toContain(usual.headline);
    expect(text).toContain('CLK_25M: amplitude at 25 MHz 3 → 1 V');
    expect(text).toContain('39 readings: 39 better, 0 worse, 0 unchanged');
    expect(comparisonHtml(usual)).toBe(comparisonHtml(usual));
    expect(plainText(readPage(trendHtml(trend)))).toContain('Worst margin better by 2.0 dB from A to C.');
  });

  it('keeps thousands of lines small', () => {
    expect(comparisonHtml(dense).length).toBeLessThan(200_000);
  });

  it('draws a mark for what is over and short, and a ghost where something was', () => {
    const page = readPage(comparisonHtml(usual));
    const ghost = page.elements.find(({ name, attributes }) => name === 'path' && attributes.class === 'ghost')!;
    expect(ghost.attributes.d!.split('M').length - 1).toBeGreaterThan(20);
    const same = readPage(
      comparisonHtml(compareRuns(storedRun(boardOf(3), sampleResult()), storedRun(boardOf(3), sampleResult()))),
    );
    expect(same.elements.find(({ attributes }) => attributes.class === 'ghost')!.attributes.d).toBe('');
  });
});

function checkPage(source: string): void {
  const { elements } = readPage(source);
  const names = new Set(elements.map(({ name }) => name));
  for (const name of ['script', 'img', 'iframe', 'object', 'link', 'a']) expect(names).not.toContain(name);
  const ids = elements.flatMap(({ attributes }) => (attributes.id === undefined ? [] : [attributes.id]));
  expect(new Set(ids).size).toBe(ids.length);
  for (const { attributes } of elements) {
    for (const [name, value] of Object.entries(attributes)) {
      expect(name.startsWith('on')).toBe(false);
      const fragment = /^url\(#(.*)\)$/.exec(value)?.[1];
      if (fragment !== undefined) expect(ids).toContain(fragment);
      expect(value).not.toMatch(/NaN|Infinity|undefined/);
    }
  }
}

describe('in a spreadsheet', () => {
  const rowsOf = (text: string) => text.trimEnd().split('\r\n');

  it('has a row a line, unrounded, and one a revision and band', () => {
    const rows = rowsOf(comparisonCsv(usual));
    expect(rows).toHaveLength(1 + usual.lines.length);
    expect(rows[1]).toContain(String(usual.lines[0]!.after!.levelDbuvPerM));
    const [group] = trend.groups;
    const count = trend.groups.reduce((sum, { points, bands }) => sum + points.length * (1 + bands.length), 0);
    expect(rowsOf(trendCsv(trend))).toHaveLength(1 + count);
    expect(trendCsv(trend)).toContain(String(group!.points[1]!.worst!.marginDb));
  });

  it('runs no name as a formula', () => {
    const formula = '=HYPERLINK("http://x.invalid","y")';
    const board = (amplitudeV: number) => boardOf(amplitudeV, formula);
    const named = (result: EstimateResult) =>
      resultWith(
        result.points.map((point) => ({
          ...point,
          contributors: point.contributors.map((each) => ({ ...each, name: formula })),
        })),
      );
    const text = comparisonCsv(
      compareRuns(storedRun(board(3), named(sampleResult())), storedRun(board(1), quieter(named(sampleResult()), 4))),
    );
    expect(text).toContain(`"'=HYPERLINK`);
    expect(text).not.toMatch(/(^|,|\n)"?=HYPERLINK/);
    expect(trendCsv(trendOf(trendRuns([formula])))).not.toMatch(/(^|,|\n)"?=HYPERLINK/);
  });
});

describe('effects in words', () => {
  const effect = {
    frequencyHz: 125e6,
    detector: 'quasi-peak' as const,
    name: 'CLK',
    beforeDbuvPerM: 31.2,
    afterDbuvPerM: 22.2,
    changeDb: -9,
    isAlone: true,
  };
  it.each([
    [effect, 'level of CLK −9.0 dB at 125 MHz'],
    [{ ...effect, isAlone: false }, 'all changes together: level of CLK −9.0 dB at 125 MHz'],
    [{ ...effect, beforeDbuvPerM: null, changeDb: null }, 'level of CLK now 22.2 dBµV/m at 125 MHz'],
    [{ ...effect, afterDbuvPerM: null, changeDb: null }, 'level of CLK gone at 125 MHz (was 31.2 dBµV/m)'],
  ])('%#', (each, text) => expect(effectText(each)).toBe(text));

  it('stand once for changes of one subject that follow each other', () => {
    const change = (text: string, own: typeof effect | null) => ({
      kind: 'drive' as const,
      nets: [],
      loops: [],
      cables: [],
      text,
      effect: own,
    });
    const groups = changeGroups([
      change('a', null),
      change('b', null),
      change('c', effect),
      change('d', effect),
      change('e', { ...effect, name: 'BUS' }),
    ]);
    expect(groups.map(({ changes }) => changes.map(({ text }) => text).join(''))).toEqual(['a', 'b', 'cd', 'e']);
  });
});
