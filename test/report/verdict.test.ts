import { describe, expect, it } from 'vitest';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { NO_CLASS } from '../../app/limits/limit-line.ts';
import { countStandings, limitName, readingsText, standingsText, verdictText } from '../../app/report/verdict.ts';
import { denseResult, emptyResult, resultWith, sampleResult } from '../support/sample-result.ts';

/** The sample with one point whose margin is set. */
function withMargin(marginDb: number, requiredMarginDb: number): EstimateResult {
  const sample = sampleResult();
  const point = sample.points.find(({ frequencyHz }) => frequencyHz === 125e6)!;
  return resultWith([{ ...point, marginDb, levelDbuvPerM: point.limitDbuvPerM - marginDb }], {
    limit: { ...sample.limit, requiredMarginDb },
  });
}

describe('verdictText', () => {
  // Wordings: the interface brief, "Language", and the verdict rule of the file contract.
  it('uses the agreed words', () => {
    expect(verdictText(withMargin(6.4, 0))).toBe('meets with 6.4 dB');
    expect(verdictText(withMargin(6.2, 0))).toBe('within uncertainty (±6.3 dB)');
    expect(verdictText(withMargin(-3.1, 6))).toBe('exceeds by 3.1 dB at 125 MHz');
    expect(verdictText(withMargin(3.9, 6))).toBe('falls short of the required 6 dB by 2.1 dB at 125 MHz');
  });

  it('never says "by 0.0 dB"', () => {
    expect(verdictText(withMargin(-0.01, 0))).toBe('exceeds by less than 0.1 dB at 125 MHz');
    expect(verdictText(withMargin(5.98, 6))).toBe('falls short of the required 6 dB by less than 0.1 dB at 125 MHz');
  });

  it('does not claim that a board without lines meets anything', () => {
    expect(verdictText(emptyResult())).toBe('no line in the judged range');
  });
});

describe('limitName', () => {
  it('leaves out the class where the standard has none', () => {
    const sample = sampleResult();
    expect(limitName(sample)).toBe('CISPR 32 class B at 3 m');
    expect(limitName({ ...sample, limit: { ...sample.limit, standard: 'FCC 15.209', class: NO_CLASS } })).toBe(
      'FCC 15.209 at 3 m',
    );
  });
});

describe('standings', () => {
  it('count what is over, short and fine; a margin of exactly the required one is fine', () => {
    const { points, limit } = sampleResult();
    const margins = [-2, -0.001, 0, 5.999, 6, 20];
    const result = resultWith(
      margins.map((marginDb, i) => ({ ...points[i]!, marginDb })),
      { limit },
    );
    expect(countStandings(result)).toEqual({ over: 2, short: 2, fine: 2 });
    expect(standingsText(result)).toBe('2 over the limit, 2 short of the required 6 dB, 2 fine');
  });

  it('tells readings from lines where two detectors judge one frequency', () => {
    expect(readingsText(sampleResult().points)).toBe('39 lines');
    const { points } = denseResult(600);
    const frequencies = new Set(points.map(({ frequencyHz }) => frequencyHz));
    expect(frequencies.size).toBeLessThan(points.length);
    expect(readingsText(points)).toBe(`${points.length} readings of ${frequencies.size} lines`);
  });
});
