import type { ResultPoint } from '../../app/estimate/result.ts';
import { clipLine, type ReportLimitLine } from '../../app/report/figures/limit-lines.ts';

const STEP_DB = 10;
/** Lines further below the limits are not worth the room. */
const BELOW_DB = 50;
/** Room below the limits while there is no line yet. */
const EMPTY_BELOW_DB = 30;
const EMPTY = [0, 70] as const;

/** Lowest and highest level of the axis: the limits, everything above them, and what matters below. */
export function levelRange(
  points: readonly ResultPoint[],
  limitLines: readonly ReportLimitLine[],
  ghosts: readonly ResultPoint[],
  range: readonly [fromHz: number, toHz: number],
): readonly [lowDbuvPerM: number, highDbuvPerM: number] {
  let lowestLimit = Infinity;
  let highest = -Infinity;
  for (const { points: corners } of limitLines) {
    for (const [, level] of clipLine(corners, ...range)) {
      lowestLimit = Math.min(lowestLimit, level);
      highest = Math.max(highest, level);
    }
  }
  let lowest = Infinity;
  for (const list of [points, ghosts]) {
    for (const { levelDbuvPerM } of list) {
      highest = Math.max(highest, levelDbuvPerM);
      lowest = Math.min(lowest, levelDbuvPerM);
    }
  }
  if (!Number.isFinite(highest)) return EMPTY;
  // Before the first estimate the limits stand where they will stand.
  if (!Number.isFinite(lowest)) lowest = lowestLimit - EMPTY_BELOW_DB;
  const bottom = Number.isFinite(lowestLimit)
    ? Math.max(lowestLimit - BELOW_DB, Math.min(lowest, lowestLimit))
    : lowest;
  return [Math.floor(bottom / STEP_DB) * STEP_DB, Math.ceil((highest + 2) / STEP_DB) * STEP_DB];
}
