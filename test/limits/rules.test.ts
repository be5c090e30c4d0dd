import { describe, expect, it } from 'vitest';
import { LAB_UNCERTAINTY_SOURCE, labUncertaintyDb } from '../../app/limits/lab-uncertainty.ts';
import { upperFrequency } from '../../app/limits/upper-frequency.ts';

describe('highest measured frequency', () => {
  // MHz clock → MHz range; CISPR 32 table 1 (from memory) and 47 CFR 15.33(b)(1) (seen).
  it.each([
    ['CISPR 32', 0.5, 1000],
    ['CISPR 32', 108, 1000],
    ['CISPR 32', 108.1, 2000],
    ['CISPR 32', 500, 2000],
    ['CISPR 32', 501, 5000],
    ['CISPR 32', 1000, 5000],
    ['CISPR 32', 1100, 5500],
    ['CISPR 32', 1500, 6000],
    ['EN 55032', 250, 2000],
    ['VCCI', 250, 2000],
    ['IEC 61000-6-3', 250, 2000],
    ['EN IEC 61000-6-4', 250, 2000],
    ['FCC', 1.7, 30],
    ['FCC', 1.705, 1000],
    ['FCC', 108, 1000],
    ['FCC', 109, 2000],
    ['FCC', 500, 2000],
    ['FCC', 500.1, 5000],
    ['FCC', 1000, 5000],
    ['FCC', 2000, 10000],
    ['FCC', 9000, 40000],
    ['ICES-003', 1, 30],
    ['ICES-003', 2000, 10000],
    ['CISPR 11', 2000, 1000],
    ['EN 55014-1', 2000, 1000],
    ['House rule', 250, 2000],
  ])('%s, clock %f MHz: %i MHz', (standard, clockMhz, maxMhz) => {
    const { maxHz, rule } = upperFrequency(standard, clockMhz * 1e6);
    expect(maxHz).toBeCloseTo(maxMhz * 1e6, 0);
    expect(rule.length).toBeGreaterThan(20);
  });

  it('a clock that is not known: the widest range of the table', () => {
    expect(upperFrequency('CISPR 32', 0)).toEqual({ maxHz: 6e9, rule: expect.stringContaining('not known') });
    expect(upperFrequency('FCC', 0).maxHz).toBe(40e9);
    expect(() => upperFrequency('FCC', -1)).toThrow(/clock/);
    expect(() => upperFrequency('FCC', Number.NaN)).toThrow(/clock/);
  });

  it('names its rule, with the clock', () => {
    expect(upperFrequency('FCC', 25e6).rule).toBe('47 CFR 15.33(b)(1): highest clock 25 MHz up to 108 MHz, to 1 GHz');
    expect(upperFrequency('CISPR 32', 25e6).rule).toContain('from memory');
    expect(upperFrequency('House rule', 25e6).rule).toContain('no rule known');
  });
});

describe('laboratory uncertainty (CISPR 16-4-2:2011 + A1:2014, from memory)', () => {
  it.each([
    [30e6, 'ground-plane', 6.3],
    [1e9, 'ground-plane', 6.3],
    [30e6, 'free-space', 5.3],
    [1e9, 'free-space', 5.3],
    [1.001e9, 'ground-plane', 5.2],
    [6e9, 'free-space', 5.2],
    [6.1e9, 'free-space', 5.5],
    [18e9, 'free-space', 5.5],
  ] as const)('%f Hz, %s: %f dB', (frequencyHz, siteKind, expectedDb) => {
    expect(labUncertaintyDb(frequencyHz, siteKind)).toBe(expectedDb);
    expect(LAB_UNCERTAINTY_SOURCE.sourceStatus).toBe('from memory');
  });
});
