import { amplitudeToDb } from '../../app/units/convert.ts';

/** Colours of levels: this many decibels below the strongest are told apart; what is weaker stays without colour. */
export const SPAN_DB = 30;

/** Index of a level's colour among `steps`, weakest first; null when it lies more than the span below the top. */
export function levelStep(levelDb: number, topDb: number, steps: number): number | null {
  const share = 1 - (topDb - levelDb) / SPAN_DB;
  if (!(share >= 0)) return null;
  return Math.min(steps - 1, Math.floor(share * steps));
}

/** The same for amplitudes (currents): 20·log10 of their ratio to the largest. */
export const amplitudeStep = (value: number, top: number, steps: number): number | null =>
  value > 0 ? levelStep(amplitudeToDb(value / top), 0, steps) : null;

export const largestOf = (values: Iterable<number>): number => {
  let largest = 0;
  for (const value of values) largest = Math.max(largest, value);
  return largest;
};
