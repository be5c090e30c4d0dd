import type { PointM } from '../../app/board/board.ts';

/** Level of detail: the smaller the picture, the fewer corners a trace needs. */

/** Corners nearer to the one before than this are left out, finest level first. */
export const TOLERANCES_M: readonly number[] = [0, 0.05e-3, 0.2e-3, 0.8e-3];
/** What is left out moves a line by less than this. */
const UNSEEN_PX = 0.4;

/** The coarsest level whose error cannot be seen at a scale. */
export const levelOfDetail = (pxPerM: number): number =>
  TOLERANCES_M.findLastIndex((toleranceM) => toleranceM * pxPerM <= UNSEEN_PX);

/** A line without the corners nearer than the tolerance to the one kept before; both ends stay. */
export function thinned(pointsM: readonly PointM[], toleranceM: number): readonly PointM[] {
  if (toleranceM === 0 || pointsM.length < 3) return pointsM;
  const kept = [pointsM[0]!];
  for (const point of pointsM.slice(1, -1)) {
    const [xM, yM] = kept.at(-1)!;
    if (Math.hypot(point[0] - xM, point[1] - yM) >= toleranceM) kept.push(point);
  }
  kept.push(pointsM.at(-1)!);
  return kept;
}

/** Copper narrower than this is drawn as wide, so that it stays seen. */
const LEAST_STROKE_PX = 0.7;
/** Narrower strokes need no round ends and corners: nobody sees them, and they cost. */
const ROUND_FROM_PX = 2;

export const strokeWidthM = (widthM: number, pxPerM: number): number => Math.max(widthM, LEAST_STROKE_PX / pxPerM);
export const isRound = (widthM: number, pxPerM: number): boolean => widthM * pxPerM >= ROUND_FROM_PX;

/** Dots smaller than this are left out, and those that are drawn are at least so wide that they are seen. */
const LEAST_DOT_PX = 0.5;
const LEAST_DOT_WIDTH_PX = 2.4;
export const dotWidthM = (radiusM: number, pxPerM: number): number =>
  Math.max(2 * radiusM, LEAST_DOT_WIDTH_PX / pxPerM);
export const isSeen = (radiusM: number, pxPerM: number): boolean => radiusM * pxPerM >= LEAST_DOT_PX;

/** How many columns and rows of tiles keep about this many pieces in each. */
const PIECES_PER_TILE = 600;
export const tilesAcross = (pieces: number): number => Math.max(1, Math.ceil(Math.sqrt(pieces / PIECES_PER_TILE)));
