import { peakFieldToDbuvPerM } from '../units/convert.ts';

/**
 * Level that stands for no field at all, dBµV/m: JSON has no −∞. Far below any receiver, and about what rounding leaves of
 * 1 V/m that cancels (1e-16 of it is −200 dBµV/m).
 */
export const NO_FIELD_DBUV_PER_M = -200;

/** Level of a field's peak phasor as a result holds it, dBµV/m: finite, never below `NO_FIELD_DBUV_PER_M`. */
export const writtenLevelDbuvPerM = (fieldPeakVPerM: number): number =>
  Math.max(NO_FIELD_DBUV_PER_M, peakFieldToDbuvPerM(fieldPeakVPerM));
