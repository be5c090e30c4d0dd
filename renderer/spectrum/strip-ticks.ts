import type { ResultPoint } from '../../app/estimate/result.ts';

/** What one column of pixels of the range strip shows: its reading with the smallest margin. */
export interface StripTick {
  readonly xPx: number;
  readonly point: ResultPoint;
}

/** The worst reading of every column, from left to right. `at`: frequency to pixels. */
export function stripTicks(points: readonly ResultPoint[], at: (frequencyHz: number) => number): StripTick[] {
  const worst = new Map<number, StripTick>();
  for (const point of points) {
    const xPx = at(point.frequencyHz);
    const column = Math.round(xPx);
    const known = worst.get(column);
    if (known === undefined || point.marginDb < known.point.marginDb) worst.set(column, { xPx, point });
  }
  return [...worst.values()].sort((one, other) => one.xPx - other.xPx);
}

/** The tick nearest to a place, within reach; of those within reach the worst. */
export function tickNear(ticks: readonly StripTick[], xPx: number, reachPx: number): StripTick | null {
  let best: StripTick | null = null;
  for (const tick of ticks) {
    if (Math.abs(tick.xPx - xPx) > reachPx) continue;
    if (best === null || tick.point.marginDb < best.point.marginDb) best = tick;
  }
  return best;
}
