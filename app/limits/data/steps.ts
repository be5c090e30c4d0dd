import { mhzToHz } from '../../units/convert.ts';
import type { LimitLine } from '../limit-line.ts';

/** Rows of a limit table [from MHz, to MHz, dBµV/m] as points with a step at every change. */
export const steps = (...rows: readonly (readonly [fromMhz: number, toMhz: number, limitDbuvPerM: number])[]) =>
  rows.flatMap(([fromMhz, toMhz, levelDb]): LimitLine['points'] => [
    [mhzToHz(fromMhz), levelDb],
    [mhzToHz(toMhz), levelDb],
  ]);
