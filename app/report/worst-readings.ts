import type { ResultPoint } from '../estimate/result.ts';

/** Of every frequency the reading with the least margin (several detectors may judge one line), worst margin first. */
export function worstOfEachFrequency(points: readonly ResultPoint[]): ResultPoint[] {
  const first = new Map<number, ResultPoint>();
  for (const point of points) if (!first.has(point.frequencyHz)) first.set(point.frequencyHz, point);
  return [...first.values()];
}
