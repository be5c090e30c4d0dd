import { describe, expect, it } from 'vitest';
import { CAUTIONS } from '../../app/report/cautions.ts';
import { htmlReport } from '../../app/report/html-report.ts';
import { verdictText } from '../../app/report/verdict.ts';
import { HOSTILE_NAMES, hostileBoard, hostileResult } from '../support/hostile-names.ts';
import { denseResult, emptyResult, resultWith, SAMPLE_LIMIT_LINES, sampleResult } from '../support/sample-result.ts';
import { sampleResultBoard } from '../support/sample-result-board.ts';
import { plainText, readPage } from './html-reader.ts';

const board = sampleResultBoard();
const quasiPeak = SAMPLE_LIMIT_LINES.slice(0, 1);
const samplePage = htmlReport(sampleResult(), board, quasiPeak);

/** Elements and attributes the report needs; everything else would be an intruder. */
const ALLOWED_ELEMENTS = new Set(
  'html head meta title style body header section h1 h2 h3 p strong span bdi dl div dt dd ul ol li br figure figcaption table thead tbody tr th td svg defs clipPath pattern g path rect circle text'.split(
    ' ',
  ),
);

describe('htmlReport', () => {
  it('is well-formed, with nothing that runs, loads or links', () => {
    const { elements } = readPage(samplePage);
    expect(elements.length).toBeGreaterThan(500);
    for (const { name, attributes } of elements) {
      expect(ALLOWED_ELEMENTS).toContain(name);
      for (const attribute of Object.keys(attributes)) {
        expect(attribute).not.toMatch(/^(on|href|src|xlink|action|formaction|srcset|data|style)/);
      }
    }
    expect(samplePage.search(/https?:|@import|javascript:/)).toBe(-1);
    expect(samplePage.match(/url\([^)]*\)/g)!.every((url) => /^url\(#[a-z-]+\)$/.test(url))).toBe(true);
  });

  it('forbids every source by its content policy, before anything else could load', () => {
    const { elements } = readPage(samplePage);
    const policy = elements.find(({ attributes }) => attributes['http-equiv'] === 'Content-Security-Policy')!;
    const parts = policy.attributes.content!.split(';').map((part) => part.trim());
    expect(parts).toEqual([
      "default-src 'none'",
      "style-src 'unsafe-inline'",
      'img-src data:',
      "base-uri 'none'",
      "form-action 'none'",
    ]);
    expect(samplePage.indexOf('Content-Security-Policy')).toBeLessThan(samplePage.indexOf('<style'));
  });

  it('names every fragment it refers to, once', () => {
    for (const page of [samplePage, htmlReport(denseResult(900), board, SAMPLE_LIMIT_LINES)]) {
      const ids = readPage(page).elements.flatMap(({ attributes }) => attributes.id ?? []);
      expect(new Set(ids).size).toBe(ids.length);
      for (const [, id] of page.matchAll(/url\(#([^)]+)\)/g)) expect(ids).toContain(id);
    }
  });

  it('says verdict, summary, limit with status, every caveat, finding, note and caution', () => {
    const result = sampleResult();
    const text = plainText(readPage(samplePage));
    expect(text).toContain(verdictText(result));
    expect(text).toContain('39 lines up to 1 GHz: 1 over the limit, 3 short of the required 6 dB, 35 fine.');
    expect(text).toContain('seen (secondary copy)');
    expect(text).toContain(result.limit.edition);
    for (const { message } of result.caveats) expect(text).toContain(message);
    for (const { message } of result.findings) expect(text).toContain(message);
    for (const note of result.notes) expect(text).toContain(note);
    for (const caution of CAUTIONS) expect(text).toContain(caution);
    expect(text).toContain('400 MHz–1 GHz');
    expect(text).toContain('every frequency');
    expect(text).toMatch(/add as phasors .* different domains add as powers/);
  });

  it('lists all lines when they are few, the worst sixty and a count when they are many', () => {
    const rowsOf = (page: string) => (page.match(/<td class="n strong">/g) ?? []).length;
    expect(rowsOf(samplePage)).toBe(39);
    const dense = denseResult(2000);
    const page = htmlReport(dense, board, SAMPLE_LIMIT_LINES);
    expect(rowsOf(page)).toBe(60);
    expect(plainText(readPage(page))).toContain(`The ${dense.points.length - 60} readings that follow`);
  });

  it('rounds the table to 0.1 dB with a true minus sign', () => {
    const margins = [...samplePage.matchAll(/<td class="n strong">([^<]*)<\/td>/g)].map(([, text]) => text!);
    const { points } = sampleResult();
    for (const [i, text] of margins.entries()) {
      expect(text).toMatch(/^−?\d+\.\d$/);
      expect(Math.abs(Number(text.replace('−', '-')) - points[i]!.marginDb)).toBeLessThanOrEqual(0.0501);
    }
    expect(margins[0]).toBe('−2.3');
  });

  it('has no clock: no date unless given one', () => {
    expect(plainText(readPage(samplePage))).not.toContain('Date');
    const dated = htmlReport(sampleResult(), board, quasiPeak, { dateText: '3 March 2031' });
    expect(plainText(readPage(dated))).toContain('Date 3 March 2031');
  });

  it('gives the same bytes for the same input', () => {
    expect(htmlReport(sampleResult(), sampleResultBoard(), quasiPeak)).toBe(samplePage);
  });

  it('stands without points, planes, sources, cables or limit lines, and with one point', () => {
    const bare = {
      ...board,
      planes: [],
      nets: [],
      waveforms: [],
      drives: [],
      loads: [],
      loops: [],
      cables: [],
      notes: '',
    };
    const empty = htmlReport(emptyResult(), bare, []);
    expect(plainText(readPage(empty))).toContain('no line in the judged range');
    expect(empty.search(/NaN|Infinity|undefined|null/)).toBe(-1);
    const one = htmlReport(resultWith(sampleResult().points.slice(0, 1)), board, quasiPeak);
    readPage(one);
    expect(one.search(/NaN|Infinity|undefined/)).toBe(-1);
    expect(htmlReport(emptyResult(), { ...bare, outlineM: [], stackup: [] }, [])).not.toMatch(/NaN|Infinity|undefined/);
  });

  it('shows levels of nothing without breaking a figure', () => {
    const sample = sampleResult();
    const points = sample.points.map((point) => ({ ...point, horizontalDbuvPerM: -Infinity }));
    const page = htmlReport({ ...sample, points }, board, quasiPeak);
    readPage(page);
    expect(page.search(/NaN|Infinity/)).toBe(-1);
    expect(page.includes('&lt; −50')).toBe(true);
  });

  it('keeps several thousand readings small', () => {
    const dense = denseResult(6000);
    const names = Array.from({ length: 40 }, (_, i) => `NET_${i}`);
    const points = dense.points.map((point) => ({
      ...point,
      contributors: names.map((name) => ({ ...point.contributors[0]!, name })),
    }));
    expect(htmlReport({ ...dense, points }, board, SAMPLE_LIMIT_LINES).length).toBeLessThan(400_000);
  });
});

describe('hostile names', () => {
  const page = htmlReport(hostileResult(), hostileBoard(), SAMPLE_LIMIT_LINES);

  it('add no element, attribute or section to the page', () => {
    const { elements } = readPage(page);
    for (const { name, attributes } of elements) {
      expect(ALLOWED_ELEMENTS).toContain(name);
      for (const attribute of Object.keys(attributes)) expect(attribute).not.toMatch(/^(on|src|href|style)/);
    }
    expect(elements.filter(({ name }) => name === 'style')).toHaveLength(1);
    for (const opening of ['<script', ']]>', '<!--']) expect(page.toLowerCase().includes(opening)).toBe(false);
  });

  it('are shown as the text they are', () => {
    const text = plainText(readPage(page));
    expect(text).toContain('</text></svg><script>alert(1)</script>');
    expect(text).toContain(']]><![CDATA[<b>&amp;&lt;');
    expect(text).toContain('\\u{202e}gnp\\u{2066}.exe\\u{2069}');
    expect(text).toContain('\\x1b[2J');
  });

  it('carry no invisible or reordering character, and are cut', () => {
    expect(page.search(/[\p{Cf}\p{Cs}]/u)).toBe(-1);
    // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
    expect(page.search(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/)).toBe(-1);
    expect(page.includes('N'.repeat(600))).toBe(false);
    expect(page.length).toBeLessThan(600_000);
    expect(HOSTILE_NAMES.some((name) => name.length >= 10_000)).toBe(true);
  });
});
