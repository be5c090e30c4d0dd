import type { PointM, RingM } from '../board/board.ts';

/** An area with holes. */
export interface Region {
  readonly ringM: RingM;
  readonly cutoutsM: readonly RingM[];
}

/** Even-odd test of a point against one ring; slits (coincident opposite edges) do no harm. */
export function isInsideRing(ringM: RingM, xM: number, yM: number): boolean {
  let isInside = false;
  for (let i = 0, j = ringM.length - 1; i < ringM.length; j = i++) {
    const [x1, y1] = ringM[j]!;
    const [x2, y2] = ringM[i]!;
    if (y1 > yM !== y2 > yM && xM < x1 + ((yM - y1) / (y2 - y1)) * (x2 - x1)) isInside = !isInside;
  }
  return isInside;
}

/** Is the point on the area (inside the ring and in no cutout)? */
export function isInsideRegion(region: Region, xM: number, yM: number): boolean {
  return isInsideRing(region.ringM, xM, yM) && !region.cutoutsM.some((ring) => isInsideRing(ring, xM, yM));
}

/** Signed area of a ring by the shoelace formula, m²; positive when it runs counter-clockwise. */
export function ringAreaM2(ringM: RingM): number {
  let sum = 0;
  for (let i = 0, j = ringM.length - 1; i < ringM.length; j = i++) {
    sum += ringM[j]![0] * ringM[i]![1] - ringM[i]![0] * ringM[j]![1];
  }
  return sum / 2;
}

/** A stretch of a straight piece, as fractions of its length. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
}

/**
 * Stretches of the straight piece a→b that lie on the union of the regions, in order, merged; fractions of its length.
 * Exact: the piece is cut at every crossing with a ring, and the middle of each part is tested.
 */
export function coveredStretches([ax, ay]: PointM, [bx, by]: PointM, regions: readonly Region[]): Stretch[] {
  const near = regions.filter((region) => boxesMeet(region.ringM, ax, ay, bx, by));
  const cuts = [0, 1];
  for (const region of near) {
    for (const ring of [region.ringM, ...region.cutoutsM]) addCrossings(ring, ax, ay, bx, by, cuts);
  }
  cuts.sort((one, other) => one - other);
  const stretches: { from: number; to: number }[] = [];
  for (let i = 0; i + 1 < cuts.length; i++) {
    const from = cuts[i]!;
    const to = cuts[i + 1]!;
    if (to - from < 1e-9) continue;
    const middle = (from + to) / 2;
    const x = ax + middle * (bx - ax);
    const y = ay + middle * (by - ay);
    if (!near.some((region) => isInsideRegion(region, x, y))) continue;
    const last = stretches.at(-1);
    if (last && from - last.to < 1e-9) last.to = to;
    else stretches.push({ from, to });
  }
  return stretches;
}

/** The parts of 0…1 that the (ordered, separate) stretches leave out. */
export function uncoveredStretches(covered: readonly Stretch[]): Stretch[] {
  const gaps: Stretch[] = [];
  let at = 0;
  for (const { from, to } of covered) {
    if (from - at > 1e-9) gaps.push({ from: at, to: from });
    at = to;
  }
  if (1 - at > 1e-9) gaps.push({ from: at, to: 1 });
  return gaps;
}

function boxesMeet(ringM: RingM, ax: number, ay: number, bx: number, by: number): boolean {
  let lowX = Infinity;
  let highX = -Infinity;
  let lowY = Infinity;
  let highY = -Infinity;
  for (const [x, y] of ringM) {
    if (x < lowX) lowX = x;
    if (x > highX) highX = x;
    if (y < lowY) lowY = y;
    if (y > highY) highY = y;
  }
  return Math.min(ax, bx) <= highX && Math.max(ax, bx) >= lowX && Math.min(ay, by) <= highY && Math.max(ay, by) >= lowY;
}

function addCrossings(ringM: RingM, ax: number, ay: number, bx: number, by: number, cuts: number[]): void {
  const dx = bx - ax;
  const dy = by - ay;
  for (let i = 0, j = ringM.length - 1; i < ringM.length; j = i++) {
    const [x1, y1] = ringM[j]!;
    const [x2, y2] = ringM[i]!;
    const ex = x2 - x1;
    const ey = y2 - y1;
    const denominator = dx * ey - dy * ex;
    if (denominator === 0) continue;
    const t = ((x1 - ax) * ey - (y1 - ay) * ex) / denominator;
    const u = ((x1 - ax) * dy - (y1 - ay) * dx) / denominator;
    if (t > 0 && t < 1 && u >= -1e-12 && u <= 1 + 1e-12) cuts.push(t);
  }
}
