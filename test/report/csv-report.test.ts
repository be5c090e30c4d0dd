import { describe, expect, it } from 'vitest';
import { csvReport } from '../../app/report/csv-report.ts';
import { hostileResult } from '../support/hostile-names.ts';
import { denseResult, emptyResult, sampleResult } from '../support/sample-result.ts';

/** A reader by the grammar of RFC 4180, section 2, independent of the writer. */
function parseCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let at = 0;
  while (at < text.length) {
    let field = '';
    if (text[at] === '"') {
      at++;
      for (;;) {
        if (at >= text.length) throw new Error('quoted field without an end');
        if (text[at] === '"' && text[at + 1] === '"') {
          field += '"';
          at += 2;
        } else if (text[at] === '"') {
          at++;
          break;
        } else field += text[at++];
      }
    } else {
      while (at < text.length && !',\r\n'.includes(text[at]!)) {
        if (text[at] === '"') throw new Error('quote inside a plain field');
        field += text[at++];
      }
    }
    row.push(field);
    if (text[at] === ',') at++;
    else if (text.startsWith('\r\n', at)) {
      at += 2;
      rows.push(row);
      row = [];
    } else throw new Error(`neither comma nor CRLF after a field, at ${at}`);
  }
  return rows;
}

describe('csvReport', () => {
  it('holds one row a point, with the unrounded numbers of the result, worst first', () => {
    const result = sampleResult();
    const [head, ...rows] = parseCsv(csvReport(result));
    expect(rows).toHaveLength(result.points.length);
    const column = (title: string) => head!.indexOf(title);
    for (const [i, row] of rows.entries()) {
      const point = result.points[i]!;
      expect(row).toHaveLength(head!.length);
      expect(Number(row[column('frequency (Hz)')])).toBe(point.frequencyHz);
      expect(Number(row[column('level (dBuV/m)')])).toBe(point.levelDbuvPerM);
      expect(Number(row[column('margin (dB)')])).toBe(point.marginDb);
      expect(Number(row[column('vertical (dBuV/m)')])).toBe(point.verticalDbuvPerM);
      expect(row[column('polarization')]).toBe(point.polarization);
      for (const { kind, name, levelDbuvPerM } of point.contributors) {
        expect(Number(row[column(`${kind} ${name} (dBuV/m)`)])).toBe(levelDbuvPerM);
      }
    }
  });

  it('has a column for each mechanism: the contributors’ shares of it added as powers', () => {
    const result = sampleResult();
    const [head, ...rows] = parseCsv(csvReport(result));
    const heads = head!.filter((title) => title.startsWith('via '));
    expect(heads).toEqual([
      'via trace pairs (dBuV/m)',
      'via current loops (dBuV/m)',
      'via plane (dBuV/m)',
      'via cable damper cable (dBuV/m)',
      'via cable sensor cable (stated current) (dBuV/m)',
    ]);
    const column = head!.indexOf('via plane (dBuV/m)');
    for (const [i, row] of rows.entries()) {
      const power = result.points[i]!.contributors.reduce(
        (sum, { viaDbuvPerM }) => sum + 10 ** ((viaDbuvPerM.plane ?? -Infinity) / 10),
        0,
      );
      expect(Number(row[column])).toBeCloseTo(10 * Math.log10(power), 9);
      expect(row[head!.indexOf(heads[4]!)] === '').toBe(result.points[i]!.frequencyHz > 300e6);
    }
  });

  it('leaves a contributor that a point does not have empty', () => {
    const result = sampleResult();
    const [head, ...rows] = parseCsv(csvReport(result));
    const column = head!.indexOf('cable sensor cable (dBuV/m)');
    expect(column).toBeGreaterThan(0);
    for (const [i, row] of rows.entries()) {
      expect(row[column] === '').toBe(result.points[i]!.frequencyHz > 300e6);
    }
  });

  it('writes no number for a level of nothing', () => {
    const sample = sampleResult();
    const points = [{ ...sample.points[0]!, verticalDbuvPerM: -Infinity }];
    const [head, row] = parseCsv(csvReport({ ...sample, points }));
    expect(row![head!.indexOf('vertical (dBuV/m)')]).toBe('');
  });

  it('guards every text that a spreadsheet would run as a formula, and stays readable', () => {
    const result = hostileResult();
    const [head, ...rows] = parseCsv(csvReport(result));
    const main = head!.indexOf('main contributor');
    const texts = rows.map((row) => row[main]!);
    expect(texts).toContain(`'=HYPERLINK("http://x.invalid","y")`);
    expect(texts).toContain(`'@SUM(1+1),2`);
    for (const cell of [head!, ...rows].flat()) {
      if (!/^-?\d+(\.\d+)?(e[+-]?\d+)?$/.test(cell)) expect(cell).not.toMatch(/^[=+\-@\t\r]/);
    }
    for (const row of rows) expect(row).toHaveLength(head!.length);
  });

  it('has a head and nothing else without points, and gives the same bytes again', () => {
    expect(parseCsv(csvReport(emptyResult()))).toHaveLength(1);
    expect(csvReport(denseResult(500))).toBe(csvReport(denseResult(500)));
  });
});
