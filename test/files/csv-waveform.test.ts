import { existsSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { parseCsvWaveform, readCsvWaveform } from '../../main/files/csv-waveform.ts';
import { appFailure } from '../support/app-failure.ts';

describe('parseCsvWaveform', () => {
  it.each([
    ['comma', 'Second,Volt\n0,1.5\n1e-9,-2\n'],
    ['semicolon', 'Second;Volt\r\n0;1.5\r\n1e-9;-2\r\n'],
    ['tab', '# t\tv\n0\t1.5\n1e-9\t-2'],
    ['spaces', 'time value\n  0   1.5\n 1e-9  -2\n\n'],
    ['more columns', 'Second,CH1,CH2\n0,1.5,9\n1e-9,-2,9\n'],
  ])('reads columns split by %s, past the header', (_what, text) => {
    expect(parseCsvWaveform('x.csv', text)).toEqual({ timesS: [0, 1e-9], values: [1.5, -2] });
  });

  it('counts samples by start and increment where the header says "Sequence"', () => {
    const text = 'X,CH1,Start,Increment,\nSequence,Volt,-3e-07,5e-10\n0,3.28,\n2,3.2,\n';
    const { timesS, values } = parseCsvWaveform('x.csv', text);
    expect(timesS[0]).toBe(-3e-7);
    expect(timesS[1]).toBeCloseTo(-2.99e-7, 16);
    expect(values).toEqual([3.28, 3.2]);
    const noScale = 'X,CH1\nSequence,Volt\n0,1\n1,2\n';
    expect(appFailure(() => parseCsvWaveform('x.csv', noScale)).message).toContain('sample numbers');
  });

  it('names the line that breaks the table', () => {
    const error = appFailure(() => parseCsvWaveform('x.csv', 't,v\n0,1\n1,oops\n'));
    expect(error.code).toBe('file');
    expect(error.message).toContain('line 3');
    expect(appFailure(() => parseCsvWaveform('x.csv', 't,v\n0,1\n')).message).toContain('at least two rows');
  });
});

const scope = new URL('../../../shared/data/boards/scope/', import.meta.url);
const hasScope = existsSync(scope);
if (!hasScope) console.log('skipped: the oscilloscope files of ../shared/data/boards are absent');

describe.runIf(hasScope)('oscilloscope files', () => {
  // Counts, times and extremes as listed in the data folder's README.
  it('reads both header styles', async () => {
    const one = await readCsvWaveform(new URL('DS1102E-B.csv', scope).pathname);
    expect(one.timesS).toHaveLength(600);
    expect([one.timesS[0], one.timesS.at(-1)].map((timeS) => timeS!.toExponential(2))).toEqual(['-6.00e-6', '5.98e-6']);
    expect([Math.min(...one.values), Math.max(...one.values)]).toEqual([-1.36, 4.48]);
    const other = await readCsvWaveform(new URL('DS1054Z-A.csv', scope).pathname);
    expect(other.timesS).toHaveLength(1200);
    expect(other.timesS[0]).toBe(-3e-7);
    expect(other.timesS[1]! - other.timesS[0]!).toBeCloseTo(5e-10, 18);
    expect([Math.min(...other.values), Math.max(...other.values)]).toEqual([2, 4.08]);
  });
});
