import { describe, expect, it } from 'vitest';
import {
  amountText,
  bandText,
  fixed,
  frequencyText,
  levelText,
  marginText,
  mhzText,
  quantityText,
  rangeText,
  trimmed,
} from '../../app/report/format.ts';

describe('numbers for people', () => {
  it('rounds to the decimals asked for, without a negative zero', () => {
    expect(fixed(12.349, 1)).toBe('12.3');
    expect(levelText(-0.04)).toBe('0.0');
    expect(fixed(-Infinity, 1)).toBe('-∞');
    expect(levelText(-Infinity)).toBe('< -50');
    expect(levelText(-215.1)).toBe('< -50');
    expect(levelText(-49.96)).toBe('-50.0');
    expect(levelText(Number.NaN)).toBe('—');
    expect(trimmed(6, 1)).toBe('6');
    expect(trimmed(100, 2)).toBe('100');
    expect(trimmed(4.5, 1)).toBe('4.5');
  });

  it('keeps the sign of a margin that is over by less than the rounding', () => {
    expect(marginText(-0.04)).toBe('-0.0');
    expect(marginText(0.04)).toBe('0.0');
    expect(amountText(0.04)).toBe('less than 0.1 dB');
    expect(amountText(3.14)).toBe('3.1 dB');
  });

  it('writes frequencies to the kilohertz, in MHz for columns and in the nearest unit for sentences', () => {
    expect(mhzText(125e6)).toBe('125.000');
    expect(mhzText(1.25e9)).toBe('1250.000');
    expect(frequencyText(125e6)).toBe('125 MHz');
    expect(frequencyText(1e9 / 30)).toBe('33.333 MHz');
    expect(frequencyText(999_999_900)).toBe('1 GHz');
    expect(frequencyText(1.0625e9)).toBe('1.0625 GHz');
    expect(frequencyText(9e3)).toBe('9 kHz');
  });

  it('names ranges as the caveat contract means them', () => {
    // "0 for both means: at every frequency" (app/errors.ts)
    expect(rangeText(0, 0)).toBe('every frequency');
    expect(rangeText(400e6, 1e9)).toBe('400 MHz–1 GHz');
    expect(rangeText(400e6, 0)).toBe('from 400 MHz');
    expect(rangeText(0, 1e9)).toBe('up to 1 GHz');
    expect(rangeText(75e6, 75e6)).toBe('75 MHz');
    expect(bandText(30e6, 210e6)).toBe('30–210 MHz');
    expect(bandText(640e6, 1e9)).toBe('640 MHz–1 GHz');
    expect(bandText(75e6, 75e6)).toBe('75 MHz');
  });

  it('chooses the SI prefix after rounding', () => {
    expect(quantityText(3.3e-9, 's')).toBe('3.3 ns');
    expect(quantityText(4700, 'Ω')).toBe('4.7 kΩ');
    expect(quantityText(0, 'F')).toBe('0 F');
    expect(quantityText(999.96e-12, 'F')).toBe('1 nF');
    expect(quantityText(-1.8, 'V')).toBe('-1.8 V');
    expect(quantityText(2e-18, 'F')).toBe('0.002 fF');
  });
});
