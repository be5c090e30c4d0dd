import {
  frequencyText as plainFrequencyText,
  levelText as plainLevelText,
  marginText as plainMarginText,
} from '../../app/report/format.ts';
import { formatQuantity, type QuantityForm } from '../../app/units/quantity-text.ts';

/** Numbers and dates in the form of the reader's locale; the words are English. */

export const LOCALE = navigator.language;

export const DECIMAL_SIGN =
  new Intl.NumberFormat(LOCALE).formatToParts(1.5).find(({ type }) => type === 'decimal')?.value ?? '.';

/** A text that the core made of numbers and words, with the reader's decimal sign. Not for names of standards: "15.109". */
export const inLocale = (text: string): string =>
  DECIMAL_SIGN === '.' ? text : text.replaceAll(/(\d)\.(?=\d)/g, `$1${DECIMAL_SIGN}`);

/** "33.333 MHz". */
export const frequencyText = (frequencyHz: number): string => inLocale(plainFrequencyText(frequencyHz));
/** A level's number, one decimal, without unit. */
export const levelText = (levelDb: number): string => inLocale(plainLevelText(levelDb)).replace('-', '−');
/** A margin's number, one decimal, without unit. */
export const marginText = (marginDb: number): string => inLocale(plainMarginText(marginDb)).replace('-', '−');
/** "3.3 ns", "4.7 kΩ": at most four significant digits. */
export const quantityText = (value: number, unit: string): string =>
  formatQuantity(value, { unit } satisfies QuantityForm, { digits: 4, decimal: DECIMAL_SIGN });

const number = new Intl.NumberFormat(LOCALE, { maximumFractionDigits: 6 });
const dateTime = new Intl.DateTimeFormat(LOCALE, { dateStyle: 'medium', timeStyle: 'short' });
const date = new Intl.DateTimeFormat(LOCALE, { dateStyle: 'long' });

/** Counts and plain numbers, digits grouped. */
export const numberText = (value: number): string => number.format(value);
/** ISO 8601 → "12 Mar 2025, 14:05"; what is no date stays as it is. */
export const dateTimeText = (iso: string): string => {
  const moment = new Date(iso);
  return Number.isNaN(moment.valueOf()) ? iso : dateTime.format(moment);
};
/** Today as it is printed on a report. */
export const dateText = (moment: Date): string => date.format(moment);
