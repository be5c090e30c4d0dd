import { describe, expect, it } from 'vitest';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { mechanismStrip, stripRangeDb, undrawnMechanisms } from '../../app/report/figures/mechanism-strip.ts';
import { sectionMarkup } from '../../app/report/html/section-markup.ts';
import { htmlReport } from '../../app/report/html-report.ts';
import { radiationOf } from '../../app/report/radiation.ts';
import { rulingBands } from '../../app/report/ruling-bands.ts';
import { radiationSection } from '../../app/report/sections/radiation-section.ts';
import { emptyResult, resultWith, SAMPLE_LIMIT_LINES, sampleResult } from '../support/sample-result.ts';
import { sampleResultBoard } from '../support/sample-result-board.ts';
import { plainText, readPage } from './html-reader.ts';

const quasiPeak = SAMPLE_LIMIT_LINES.slice(0, 1);
const sectionText = (result: EstimateResult) =>
  plainText(readPage(`<div>${sectionMarkup(radiationSection(result, quasiPeak)).source}</div>`));

/** The sample with nothing but trace pairs, loops and stated cables. */
function pairOnly(): EstimateResult {
  const { points } = sampleResult();
  return resultWith(
    points.map((point) => ({
      ...point,
      contributors: point.contributors.map((each) => ({
        ...each,
        viaDbuvPerM: each.kind === 'net' ? { pair: each.levelDbuvPerM } : each.viaDbuvPerM,
      })),
    })),
    { structure: 'pair-only' },
  );
}

describe('strip of mechanisms', () => {
  const result = sampleResult();
  const radiation = radiationOf(result);
  const strip = mechanismStrip(radiation, rulingBands(radiation), result, quasiPeak).source;
  const barsOf = (className: string) =>
    [...strip.matchAll(new RegExp(`class="stack ${className}" d="([^"]*)"`, 'g'))].map(([, d]) =>
      [...d!.matchAll(/M([\d.]+) ([\d.]+)V([\d.]+)/g)].map((bar) => bar.slice(1).map(Number)),
    );

  it('has one dark bar a line, in the row of the strongest mechanism', () => {
    const dark = barsOf('ruling');
    expect(dark.flat()).toHaveLength(39);
    const names = readPage(strip)
      .texts.filter(({ className }) => className === 'label')
      .map(({ text }) => text);
    expect(names).toEqual(['trace pairs', 'current loops', 'plane', 'damper cable', 'sensor cable']);
    // Main contributors of the sample: the plane above 160 MHz, the damper cable below, the stated cable at 50 MHz.
    expect(dark.map((bars) => bars.length)).toEqual([0, 0, 34, 4, 1]);
  });

  it('draws a bar as long as its level against the limit', () => {
    const worst = result.points[0]!;
    const powers = worst.contributors.map(({ viaDbuvPerM }) => 10 ** ((viaDbuvPerM['damper cable'] ?? -Infinity) / 10));
    const excessDb = 10 * Math.log10(powers.reduce((sum, power) => sum + power, 0)) - worst.limitDbuvPerM;
    const [lowDb, highDb] = stripRangeDb(radiation);
    expect([lowDb, highDb]).toEqual([-30, 10]);
    const x = (mhz: number) => 46 + (Math.log(mhz / 30) / Math.log(1000 / 30)) * (664 - 46);
    const bar = barsOf('ruling')[3]!.find(([at]) => Math.abs(at! - x(125)) < 0.01)!;
    // A row is 40 px for the whole range.
    expect(bar[1]! - bar[2]!).toBeCloseTo(((excessDb - lowDb) / (highDb - lowDb)) * 40, 1);
  });

  it('underlines the band in which a mechanism rules', () => {
    const marks = [...strip.matchAll(/class="ruling-band" d="M([\d.]+) ([\d.]+)H([\d.]+)"/g)].map((mark) =>
      mark.slice(1).map(Number),
    );
    expect(marks).toHaveLength(2);
    // Plane's row comes first; it begins where the cable's band ends.
    expect(marks[0]![0]).toBe(marks[1]![2]);
    expect(marks[0]![2]).toBeCloseTo(664, 1);
  });

  it('draws the eight strongest of many and none that stays below the range', () => {
    const point = result.points[0]!;
    const via = Object.fromEntries(Array.from({ length: 12 }, (_, i) => [`C${i}`, 40 - i]));
    const many = radiationOf(
      resultWith([
        {
          ...point,
          contributors: [{ kind: 'net', name: 'N', levelDbuvPerM: 42, viaDbuvPerM: { ...via, faint: -70 } }],
        },
      ]),
    );
    expect(undrawnMechanisms(many)).toBe(5);
    const rows = mechanismStrip(many, rulingBands(many), result, quasiPeak).source.match(/class="label"[^>]*>C\d</g)!;
    expect(rows.map((row) => row.slice(-3, -1))).toEqual(['C0', 'C1', 'C2', 'C3', 'C4', 'C5', 'C6', 'C7']);
  });

  it('hatches where nothing was solved', () => {
    const solved = result.points.map((each) =>
      each.frequencyHz < 800e6
        ? each
        : {
            ...each,
            contributors: [{ kind: 'net' as const, name: 'N', levelDbuvPerM: 40, viaDbuvPerM: { pair: 40 } }],
          },
    );
    const partly = radiationOf(resultWith(solved));
    const source = mechanismStrip(partly, rulingBands(partly), result, quasiPeak).source;
    // Plane and the driven cable; not pairs, loops, or the stated cable.
    expect(source.match(/>not solved</g)).toHaveLength(2);
    expect(sectionText(resultWith(solved))).toContain('solved below 800 MHz only');
    expect(strip).not.toContain('not solved');
  });
});

describe('What radiates', () => {
  it('says the bands in a sentence and a table, and the laws of the sums', () => {
    const text = sectionText(sampleResult());
    expect(text).toContain('What rules: 50–160 MHz damper cable ; 160 MHz–1 GHz plane');
    expect(text).toMatch(/50–160 MHz damper cable 4 of 5 lines 125 MHz −2\.3 plane , 14\.7 dB weaker/);
    expect(text).toMatch(/34 of 34 lines 675 MHz 4\.1 trace pairs/);
    expect(text).toMatch(/added as powers.* add as phasors and may cancel/);
    expect(text).not.toContain('not solved');
  });

  it('says what is missing when planes and cables were not solved', () => {
    const text = sectionText(pairOnly());
    expect(text).toContain('Planes and cables were not solved: the currents');
    expect(text).toContain('trace pairs');
    expect(text).not.toContain('damper cable');
  });

  it('is not there without lines or contributors', () => {
    expect(sectionMarkup(radiationSection(emptyResult(), quasiPeak)).source).toBe('');
    const bare = resultWith(sampleResult().points.map((point) => ({ ...point, contributors: [] })));
    expect(sectionMarkup(radiationSection(bare, quasiPeak)).source).toBe('');
    expect(htmlReport(bare, sampleResultBoard(), quasiPeak)).not.toMatch(/NaN|Infinity|undefined/);
  });
});
