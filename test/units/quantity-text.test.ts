import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatQuantity, parseQuantity, type QuantityForm } from '../../app/units/quantity-text.ts';

/** Oracle: the number a person means, written out; IEC 60062 for signs in place of the point. */

const SECONDS: QuantityForm = { unit: 's', barePrefix: 'n' };
const HERTZ: QuantityForm = { unit: 'Hz' };
const OHM: QuantityForm = { unit: 'Ω' };
const FARAD: QuantityForm = { unit: 'F', barePrefix: 'p' };
const DB: QuantityForm = { unit: 'dB', hasNoPrefix: true };

const meaningOf = (text: string, form: QuantityForm) => {
  const parsed = parseQuantity(text, form);
  return parsed.ok ? parsed.value : parsed.message;
};

describe('quantities as typed', () => {
  it.each([
    ['3n3', SECONDS, 3.3e-9],
    ['3.3 ns', SECONDS, 3.3e-9],
    ['3,3ns', SECONDS, 3.3e-9],
    ['3.3n', SECONDS, 3.3e-9],
    ['3.3', SECONDS, 3.3e-9],
    ['1e-9', SECONDS, 1e-9],
    ['0', SECONDS, 0],
    ['.5', SECONDS, 0.5e-9],
    ['25M', HERTZ, 25e6],
    ['25 MHz', HERTZ, 25e6],
    ['25meg', HERTZ, 25e6],
    ['1e6', HERTZ, 1e6],
    ['1.25 GHz', HERTZ, 1.25e9],
    ['33,333 MHz', HERTZ, 'without thousands separators: 33333 or 33.333'],
    ['4k7', OHM, 4700],
    ['4K7', OHM, 4700],
    ['4R7', OHM, 4.7],
    ['100R', OHM, 100],
    ['33 ohm', OHM, 33],
    ['33 Ω', OHM, 33],
    ['2M2', OHM, 2.2e6],
    ['2 mΩ', OHM, 2e-3],
    ['10u', FARAD, 10e-6],
    ['10 µF', FARAD, 10e-6],
    ['10 μF', FARAD, 10e-6],
    ['12', FARAD, 12e-12],
    ['-3', DB, -3],
    ['−3 dB', DB, -3],
    ['+6', DB, 6],
  ] as const)('%s', (text, form, expected) => {
    expect(meaningOf(text, form)).toBe(expected);
  });

  it.each([
    ['', HERTZ],
    ['fast', HERTZ],
    ['25 MHz MHz', HERTZ],
    ['3 V', SECONDS],
    ['1.2.3', HERTZ],
    ['5k', DB],
    ['--3', DB],
    ['1e', OHM],
  ])('refuses %j and says what to type', (text, form) => {
    const parsed = parseQuantity(text, form);
    expect(parsed.ok).toBe(false);
    expect(!parsed.ok && parsed.message).toContain('for example');
  });

  it.each([
    [3.3e-9, SECONDS, '3.3 ns'],
    [25e6, HERTZ, '25 MHz'],
    [999.9999999999999e3, HERTZ, '1 MHz'],
    [4700, OHM, '4.7 kΩ'],
    [0, SECONDS, '0 ns'],
    [-3, DB, '−3 dB'],
    [1500, { unit: '%', hasNoPrefix: true }, '1500 %'],
    [1 / 3e9, SECONDS, '333.333333333 ps'],
  ])('%d reads', (value, form, expected) => {
    expect(formatQuantity(value, form)).toBe(expected);
  });

  it('writes the decimal sign of the reader', () => {
    expect(formatQuantity(3.3e-9, SECONDS, { decimal: ',' })).toBe('3,3 ns');
  });

  it('reads back what it wrote', () => {
    const mantissa = fc.double({ min: 1, max: 999, noNaN: true });
    fc.assert(
      fc.property(mantissa, fc.integer({ min: -14, max: 11 }), fc.boolean(), (digits, power, isNegative) => {
        const value = Number((digits * 10 ** power * (isNegative ? -1 : 1)).toPrecision(6));
        const parsed = parseQuantity(formatQuantity(value, HERTZ), HERTZ);
        // Twelve digits are written, so six come back exactly.
        return parsed.ok && parsed.value === value;
      }),
      { seed: 5, numRuns: 2000 },
    );
  });
});
