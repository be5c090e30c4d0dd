/**
 * Level that stands for no field at all, dBµV/m: JSON has no −∞. Far below any receiver, and about what rounding leaves of
 * 1 V/m that cancels (1e-16 of it is −200 dBµV/m).
 */
export const NO_FIELD_DBUV_PER_M = -200;

/** A level as a result holds it: never below `NO_FIELD_DBUV_PER_M`, so always finite. */
export const finiteLevelDbuvPerM = (levelDbuvPerM: number): number => Math.max(NO_FIELD_DBUV_PER_M, levelDbuvPerM);
