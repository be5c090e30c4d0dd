import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { terminalWidth } from '../../app/report/safe-text.ts';
import { textReport } from '../../app/report/text-report.ts';
import { wrapText } from '../../app/report/wrap.ts';
import { HOSTILE_NAMES, hostileResult } from '../support/hostile-names.ts';
import { denseResult, emptyResult, sampleResult } from '../support/sample-result.ts';

const widthsOf = (text: string): number[] => text.split('\n').map(terminalWidth);

describe('textReport', () => {
  it('says verdict, set-up, worst lines, caveats, findings and who decides', () => {
    const text = textReport(sampleResult(), { top: 5, width: 80 });
    expect(text).toContain('CISPR 32 class B at 3 m: exceeds by 2.3 dB at 125 MHz');
    expect(text).toContain('39 lines: 1 over the limit, 3 short of the required 6 dB, 35 fine.');
    expect(text).toContain('34 more, with larger margins');
    expect(text).toMatch(/9 caveats of 4 kinds/);
    expect(text).toContain('net-without-drive ×6:');
    expect(text).toContain('and 2 more]');
    expect(text).toContain('CLK_25M at (56.75, 33.2) mm on L4 BOT');
    expect(text.replace(/\s+/g, ' ')).toContain('An estimate, not a measurement');
    expect(text.replace(/\s+/g, ' ')).toContain('Compliance is decided by the text of the standard in force');
  });

  it('says in one line which mechanism rules in which band, and whether planes and cables were solved', () => {
    const result = sampleResult();
    const lines = (each: EstimateResult) => textReport(each, { top: 5, width: 80 }).split('\n');
    expect(lines(result)).toContain('What rules: 50–160 MHz damper cable; 160 MHz–1 GHz plane');
    const points = result.points.map((point) => ({
      ...point,
      contributors: [{ kind: 'net' as const, name: 'CLK', levelDbuvPerM: 40, viaDbuvPerM: { pair: 40 } }],
    }));
    expect(lines({ ...result, points, structure: 'pair-only' })).toContain(
      'What rules: 50 MHz–1 GHz trace pairs (planes and cables not solved)',
    );
    expect(lines(emptyResult()).join(' ')).not.toContain('What rules');
  });

  it('prints the worst point first, rounded to 0.1 dB, in aligned columns', () => {
    const result = sampleResult();
    const rows = textReport(result, { top: 39, width: 80 })
      .split('\n')
      .filter((line) => /^ *\d+\.\d{3} QP /.test(line));
    expect(rows).toHaveLength(39);
    const worst = result.points[0]!;
    expect(rows[0]).toContain('OVER');
    expect(rows[0]).toMatch(/CLK_25M via damper cable$/);
    for (const [i, row] of rows.entries()) {
      const point = result.points[i]!;
      const [mhz, , level, limit, margin] = row.trim().split(/\s+/);
      expect(Number(mhz)).toBeCloseTo(point.frequencyHz / 1e6, 3);
      expect(Math.abs(Number(level) - point.levelDbuvPerM)).toBeLessThanOrEqual(0.0501);
      expect(Number(limit)).toBe(point.limitDbuvPerM);
      expect(Math.abs(Number(margin) - point.marginDb)).toBeLessThanOrEqual(0.0501);
      expect(row.indexOf('.')).toBe(rows[0]!.indexOf('.'));
    }
    expect(worst.frequencyHz).toBe(125e6);
  });

  it('stays inside its width from 40 to 80 columns, and inside 80 on a wider terminal', () => {
    for (const result of [sampleResult(), denseResult(600), emptyResult(), hostileResult()]) {
      for (const width of [40, 47, 60, 72, 80, 200]) {
        const widest = Math.max(...widthsOf(textReport(result, { top: 20, width })));
        expect(widest).toBeLessThanOrEqual(Math.min(width, 80));
      }
    }
  });

  it('lets no control or bidirectional character of a name through', () => {
    const text = textReport(hostileResult(), { top: 20, width: 80 });
    // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
    expect(text).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069\u200e\u200f]/);
    expect(text).toContain('\\x1b');
    expect(text.length).toBeLessThan(20_000);
    expect(HOSTILE_NAMES.some((name) => name.length >= 10_000)).toBe(true);
  });

  it('leaves out the table when there is no line', () => {
    const text = textReport(emptyResult(), { top: 5, width: 80 });
    expect(text).toContain('no line in the judged range');
    expect(text).not.toContain('main contributor');
    expect(text).toContain('No caveats.');
  });

  it('gives the same text for the same input', () => {
    expect(textReport(sampleResult(), { top: 9, width: 77 })).toBe(textReport(sampleResult(), { top: 9, width: 77 }));
  });
});

describe('wrapText', () => {
  it('keeps every word in order and every line inside the width', () => {
    const words = fc.array(fc.string({ unit: fc.constantFrom('a', 'b', 'µ', '電'), minLength: 1, maxLength: 30 }), {
      maxLength: 30,
    });
    fc.assert(
      fc.property(words, fc.integer({ min: 8, max: 60 }), (list, width) => {
        const lines = wrapText(list.join(' '), width, '- ', '  ');
        for (const line of lines) expect(terminalWidth(line)).toBeLessThanOrEqual(width);
        expect(
          lines
            .map((line) => line.slice(2))
            .join('')
            .replaceAll(' ', ''),
        ).toBe(list.join(''));
      }),
      { seed: 74 },
    );
  });
});
