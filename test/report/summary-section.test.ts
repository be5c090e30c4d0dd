import { describe, expect, it } from 'vitest';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { Section } from '../../app/report/blocks.ts';
import { sectionMarkup } from '../../app/report/html/section-markup.ts';
import { emittersSection } from '../../app/report/sections/emitters-section.ts';
import { bandsSection, causesSection, suretySection } from '../../app/report/sections/summary-section.ts';
import { validationSection } from '../../app/report/sections/validation-section.ts';
import { summarizeChecks } from '../../app/report/validation-summary.ts';
import { check } from '../../app/validate/check.ts';
import { limitChecks } from '../../app/validate/limits.ts';
import { denseResult, emptyResult, SAMPLE_LIMIT_LINES, sampleResult } from '../support/sample-result.ts';
import { sampleResultBoard } from '../support/sample-result-board.ts';
import { plainText, readPage } from './html-reader.ts';

const textOf = (section: Section): string => plainText(readPage(`<div>${sectionMarkup(section).source}</div>`));

/** Cells of the section's first table. */
function rowsOf(section: Section): string[][] {
  const { source } = sectionMarkup(section);
  return [...source.matchAll(/<tr>(.*?)<\/tr>/gs)]
    .slice(1)
    .map(([, row]) => [...row!.matchAll(/<td[^>]*>(.*?)<\/td>/gs)].map(([, cell]) => cell!.replace(/<[^>]*>/g, '')));
}

describe('worst margin in each band', () => {
  it('is the least of the readings of each piece of each line', () => {
    const result = denseResult(900);
    const least = (test: (point: EstimateResult['points'][number]) => boolean) =>
      result.points.filter(test).reduce((worst, { marginDb }) => Math.min(worst, marginDb), Infinity);
    const expected = [
      least(({ detector, frequencyHz }) => detector === 'quasi-peak' && frequencyHz <= 230e6),
      least(({ detector, frequencyHz }) => detector === 'quasi-peak' && frequencyHz > 230e6),
      least(({ detector }) => detector === 'average'),
      least(({ detector }) => detector === 'peak'),
    ];
    const rows = rowsOf(bandsSection(result, SAMPLE_LIMIT_LINES));
    expect(rows.map((row) => row[4]!.replace('−', '-'))).toEqual(expected.map((marginDb) => marginDb.toFixed(1)));
    expect(rows.map((row) => row[1])).toEqual(['30–230 MHz', '230 MHz–1 GHz', '1–2 GHz', '1–2 GHz']);
  });

  it('says where no line lies', () => {
    const rows = rowsOf(bandsSection(emptyResult(), SAMPLE_LIMIT_LINES));
    expect(rows.map((row) => [row[4], row[5]])).toEqual([
      ['—', 'no line'],
      ['—', 'no line'],
    ]);
  });
});

describe('strongest causes', () => {
  it('name contributor and path, what each must lose and its findings', () => {
    const result = sampleResult();
    const text = textOf(causesSection(result));
    expect(rowsOf(causesSection(result))).toHaveLength(3);
    expect(text).toContain('CLK_25M through the damper cable');
    expect(text).toContain('Findings on the board: CLK_25M No. 1, 2.');
    expect(text).toContain('keeps the limit with 6 dB of margin');
    // What must be lost: required margin minus own margin, both rounded.
    for (const row of rowsOf(causesSection(result))) {
      const [, , , margin, loss] = row.map((cell) => Number(cell.replace('−', '-')));
      if (margin! < 6) expect(loss!).toBeCloseTo(6 - margin!, 0);
    }
  });

  it('are not there without contributors', () => {
    expect(causesSection(emptyResult()).blocks).toEqual([]);
    expect(emittersSection(sampleResultBoard(), emptyResult()).blocks).toEqual([]);
  });
});

describe('contributors', () => {
  it('come with layers, findings and what they radiate from', () => {
    const text = textOf(emittersSection(sampleResultBoard(), sampleResult()));
    expect(text).toContain('CLK_25M L1 TOP , L4 BOT');
    expect(text).toContain('converter loop (current loop)');
    expect(text).toContain('sensor cable (stated current)');
  });
});

describe('how sure', () => {
  it('says laboratory, model, status of the limit and caveats', () => {
    const text = textOf(suretySection(sampleResult()));
    expect(text).toContain('±6.3 dB');
    expect(text).toContain('10 dB and more');
    expect(text).toContain('seen (secondary copy)');
    expect(text).toContain('9 caveats of 4 kinds');
    expect(textOf(suretySection({ ...sampleResult(), structure: 'pair-only' }))).toContain('they usually decide');
  });
});

describe('validation', () => {
  it('counts every row once, by topic', () => {
    const checks = limitChecks();
    const summary = summarizeChecks(checks, '0.1.0');
    const sum = summary.groups.reduce((total, { pass, fail, info }) => total + pass + fail + info, 0);
    expect(sum).toBe(checks.length);
    expect(summary.groups.map(({ topic }) => topic)).toEqual(['Limit lines', 'Upper frequency of the judged range']);
  });

  it('shows failures and takes a topic it does not know by its name', () => {
    const row = {
      source: 's',
      quantity: 'q',
      unit: '1',
      expected: 1,
      tolerance: 0.1,
      sourceStatus: 'derived' as const,
    };
    const rows = [
      check({ ...row, id: 'novel-1', computed: 1 }),
      check({ ...row, id: 'novel-2', computed: 2 }),
      check({ ...row, id: 'novel-3', computed: 2, isInformation: true, sourceStatus: 'seen' }),
    ];
    const text = textOf(validationSection(summarizeChecks(rows, '9.9')));
    expect(text).toContain('quietboard 9.9: 1 check passes, 1 fail , 1 are for information');
    expect(text).toContain('novel derived, seen 1 1 1');
    for (const nothing of [null, summarizeChecks([], '9.9')]) {
      expect(textOf(validationSection(nothing))).toContain('Not run for this report');
    }
  });
});
