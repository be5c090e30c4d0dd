import { describe, expect, it } from 'vitest';
import type { Contributor, ResultPoint } from '../../../app/estimate/result.ts';
import { rankedSubjects } from '../../../renderer/levers/subjects.ts';
import { sampleResult } from '../../support/sample-result.ts';

/** Oracle: margins by hand, limit minus own level. */

const [example] = sampleResult().points;
const point = (frequencyHz: number, levels: Readonly<Record<string, number>>): ResultPoint => ({
  ...example!,
  frequencyHz,
  limitDbuvPerM: 40,
  contributors: Object.entries(levels).map(
    ([name, levelDbuvPerM]): Contributor => ({ kind: 'net', name, levelDbuvPerM, viaDbuvPerM: {} }),
  ),
});
const drive = (net: string) => ({ net, waveform: 'w', sourceOhm: 25, seriesOhm: 0, delayNs: 0, inverted: false });
const SOURCES = { drives: ['QUIET', 'A', 'B', 'C'].map(drive) };
const POINTS = [point(50e6, { A: 30, B: 20 }), point(100e6, { B: 35, C: 10, UNPLUGGED: 39 })];

const ranked = (lineHz: number | null) =>
  rankedSubjects(POINTS, lineHz, SOURCES).map(({ name, ownMarginDb, frequencyHz }) => [name, ownMarginDb, frequencyHz]);

describe('the nets that count', () => {
  it('come by their own margin over all lines, without those that are driven no more', () => {
    expect(ranked(null)).toEqual([
      ['B', 5, 100e6],
      ['A', 10, 50e6],
      ['C', 30, 100e6],
      ['QUIET', Infinity, null],
    ]);
  });

  it('at a chosen line come those of the line first, by their share of it', () => {
    expect(ranked(50e6)).toEqual([
      ['A', 10, 50e6],
      ['B', 20, 50e6],
      ['C', 30, 100e6],
      ['QUIET', Infinity, null],
    ]);
  });
});
