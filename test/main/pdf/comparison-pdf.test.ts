import { describe, expect, it } from 'vitest';
import { compareRuns } from '../../../app/compare/compare-runs.ts';
import { trendOf } from '../../../app/compare/trend.ts';
import { trendRunOf } from '../../../app/compare/trend-run.ts';
import type { Trend } from '../../../app/compare/types.ts';
import { CAUTIONS } from '../../../app/report/cautions.ts';
import { comparisonDocument } from '../../../main/pdf/comparison-document.ts';
import { comparisonPdf, trendPdf } from '../../../main/pdf/comparison-pdf.ts';
import { trendDocument } from '../../../main/pdf/trend-document.ts';
import { orchardBoard } from '../../board/example-board.ts';
import { resultWith, sampleResult } from '../../support/sample-result.ts';
import { storedRun } from '../../support/stored-runs.ts';
import { bookmarksOf, picturesOf, textOf } from './definition.ts';
import { TITLE } from './reports.ts';

const title = { ...TITLE, runNumber: null };
const board = orchardBoard();

/** The sample with every contributor of every reading 4 dB weaker. */
function quieter() {
  const { points } = sampleResult();
  return resultWith(
    points.map((point) => ({
      ...point,
      levelDbuvPerM: point.levelDbuvPerM - 4,
      marginDb: point.marginDb + 4,
      contributors: point.contributors.map((each) => ({
        ...each,
        levelDbuvPerM: each.levelDbuvPerM - 4,
        viaDbuvPerM: Object.fromEntries(Object.entries(each.viaDbuvPerM).map(([path, db]) => [path, db - 4])),
      })),
    })),
  );
}

const before = storedRun({ ...board, revision: 'A' }, sampleResult(), { run: 1 });
const after = storedRun({ ...board, revision: 'B' }, quieter(), { run: 2, startedAt: '2031-04-06T06:07:08Z' });
const comparison = compareRuns(before, after);
const trend = trendOf([before, after].map(trendRunOf));

describe('printed comparison', () => {
  const definition = comparisonDocument(comparison, title, 'A4');

  it('says headline, both runs, every warning and caution, and has a place to sign', () => {
    const text = textOf(definition);
    expect(text).toContain(comparison.headline);
    expect(text).toContain('run 1, revision A, 2031-04-05 06:07 UTC');
    expect(text).toContain('run 2, revision B, 2031-04-06 06:07 UTC');
    for (const { message } of comparison.warnings) expect(text).toContain(message);
    for (const caution of CAUTIONS) expect(text).toContain(caution);
    expect(text).toContain('Approved');
    expect(bookmarksOf(definition)).toEqual([
      'Comparison of two runs',
      'What changed',
      'Line by line',
      'Worst margin by band',
      'Changed lines',
      'Cautions',
      'Sign-off',
    ]);
  });

  it('draws before and after without a class or a colour variable', () => {
    const pictures = picturesOf(definition).filter((source) => source.length > 1500);
    expect(pictures).toHaveLength(1);
    expect(pictures[0]).not.toMatch(/class=|var\(|NaN/);
    expect(pictures[0]).toMatch(/125 MHz, better by 4(\.0)? dB/);
  });

  it('gives the same bytes for the same input', async () => {
    const [one, other] = [
      await comparisonPdf(comparison, title, 'Letter'),
      await comparisonPdf(compareRuns(before, after), title, 'Letter'),
    ];
    expect(Buffer.compare(one, other)).toBe(0);
    expect(Buffer.from(one).toString('latin1')).toContain('/MediaBox [0 0 612 792]');
  });
});

describe('printed trend', () => {
  it('has a section for each set-up with its picture and revisions', () => {
    const definition = trendDocument(trend, title, 'A4');
    const text = textOf(definition);
    expect(text).toContain(trend.groups[0]!.headline);
    expect(text).toContain('2031-04-06 06:07');
    expect(picturesOf(definition).some((source) => source.includes('worst margin, dB'))).toBe(true);
    expect(bookmarksOf(definition)[0]).toBe('Trend of worst margins');
  });

  it('says when there is nothing, and when there is too much', () => {
    const nothing: Trend = { ...trend, groups: [] };
    expect(textOf(trendDocument(nothing, title, 'A4'))).toContain('The project holds no run.');
    const much: Trend = { ...trend, groups: Array.from({ length: 23 }, () => trend.groups[0]!) };
    expect(textOf(trendDocument(much, title, 'A4'))).toContain('3 more set-ups in the JSON.');
  });

  it('gives the same bytes for the same input', async () => {
    const [one, other] = [await trendPdf(trend, title, 'A4'), await trendPdf(trend, title, 'A4')];
    expect(Buffer.compare(one, other)).toBe(0);
  });
});
