import { hzToMhz, mToMm } from '../units/convert.ts';

/** Numbers for people: rounded, with their unit. Nothing here is fit for reading back by a program. */

/** Fixed decimals; a value that rounds to zero has no sign; not finite: "—". */
/** A direction in whole degrees, 0 to 359. */
export const degreesText = (angleDeg: number): string => String(((Math.round(angleDeg) % 360) + 360) % 360);

export function fixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return value === -Infinity ? '-∞' : '—';
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text;
}

/** At most so many decimals, without trailing zeros. */
export function trimmed(value: number, decimals: number): string {
  const text = fixed(value, decimals);
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}

/** Lower levels are nothing to a receiver, and beneath what the arithmetic of a sum that cancels can tell from zero. */
const LOWEST_LEVEL_DB = -50;

/** Whether a level is too low for any receiver: no change from it can be told in dB. */
export const isNothing = (levelDb: number): boolean => levelDb < LOWEST_LEVEL_DB;

/** A level in dB, one decimal; "< -50" for anything lower, nothing at all included. */
export const levelText = (levelDb: number): string => (isNothing(levelDb) ? `< ${LOWEST_LEVEL_DB}` : fixed(levelDb, 1));

/** A margin in dB, one decimal. The sign stays even on "-0.0": over the limit by less than the rounding. */
export const marginText = (marginDb: number): string =>
  Number.isFinite(marginDb) ? marginDb.toFixed(1) : fixed(marginDb, 1);

/** An amount of dB that is known to be more than nothing. */
export const amountText = (amountDb: number): string =>
  amountDb < 0.05 ? 'less than 0.1 dB' : `${levelText(amountDb)} dB`;

/** MHz to the kilohertz, fixed decimals so that a column lines up. */
export const mhzText = (frequencyHz: number): string => fixed(hzToMhz(frequencyHz), 3);

/** A frequency in a sentence: "33.333 MHz", "1.25 GHz". */
export function frequencyText(frequencyHz: number): string {
  const mhz = Math.round(hzToMhz(frequencyHz) * 1e3) / 1e3;
  if (mhz >= 1000) return `${trimmed(mhz / 1000, 6)} GHz`;
  if (mhz >= 1) return `${trimmed(mhz, 3)} MHz`;
  return `${trimmed(frequencyHz / 1e3, 3)} kHz`;
}

/** A moment of a run, the same on every machine: "2026-12-01 14:05 UTC". */
export const dateText = (isoUtc: string): string => `${isoUtc.slice(0, 10)} ${isoUtc.slice(11, 16)} UTC`;

/** A caveat's range; 0 for both ends means every frequency. */
export function rangeText(fromHz: number, toHz: number): string {
  const hasEnd = toHz > 0 && Number.isFinite(toHz);
  if (fromHz <= 0) return hasEnd ? `up to ${frequencyText(toHz)}` : 'every frequency';
  if (!hasEnd) return `from ${frequencyText(fromHz)}`;
  return fromHz === toHz ? frequencyText(fromHz) : `${frequencyText(fromHz)}–${frequencyText(toHz)}`;
}

/** A band of the spectrum, its unit once where both ends share it: "30–210 MHz", "640 MHz–1 GHz". */
export function bandText(fromHz: number, toHz: number): string {
  const [from, to] = [frequencyText(fromHz), frequencyText(toHz)];
  if (from === to) return from;
  const [number, unit] = from.split(' ');
  return to.endsWith(` ${unit}`) ? `${number}–${to}` : `${from}–${to}`;
}

const PREFIXES: readonly (readonly [factor: number, prefix: string])[] = [
  [1e9, 'G'],
  [1e6, 'M'],
  [1e3, 'k'],
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'µ'],
  [1e-9, 'n'],
  [1e-12, 'p'],
  [1e-15, 'f'],
];

/** A quantity with an SI prefix and up to four significant digits: "3.3 ns", "4.7 kΩ", "0 pF". */
export function quantityText(value: number, unit: string): string {
  if (value === 0 || !Number.isFinite(value)) return `${value === 0 ? '0' : fixed(value, 0)} ${unit}`;
  const rounded = Number(value.toPrecision(4));
  const [factor, prefix] = PREFIXES.find(([step]) => Math.abs(rounded) >= step) ?? PREFIXES.at(-1)!;
  return `${Number((rounded / factor).toPrecision(4))} ${prefix}${unit}`;
}

/** A length on the board: "12.5 mm". */
export const mmText = (lengthM: number, decimals = 2): string => `${trimmed(mToMm(lengthM), decimals)} mm`;

/** A place on the board, mm. */
export const placeText = ([xM, yM]: readonly [number, number]): string =>
  `(${trimmed(mToMm(xM), 2)}, ${trimmed(mToMm(yM), 2)})`;

/** "1 line", "3 lines". */
export const countText = (count: number, one: string, many = `${one}s`): string =>
  `${count} ${count === 1 ? one : many}`;
