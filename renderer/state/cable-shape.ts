import type { Board } from '../../app/board/board.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import { mToMm } from '../../app/units/convert.ts';

export type CableFile = NonNullable<SourcesPart['cables']>[number];
type Points = CableFile['pointsMm'];

/** Length along the cable, in the unit of its points, mm. */
export const cableLengthMm = (points: Points): number =>
  points.slice(1).reduce((sum, point, i) => sum + distance(points[i]!, point), 0);

const distance = (one: readonly number[], other: readonly number[]): number =>
  Math.hypot(...one.map((value, axis) => value - other[axis]!));

/** The cable cut, or made longer in the direction of its last piece, to a length. Bends within it stay. */
export function withLength(points: Points, length: number): Points {
  let left = length;
  const kept: Points = [points[0]!];
  for (const [i, to] of points.slice(1).entries()) {
    const from = points[i]!;
    const piece = distance(from, to);
    const isLast = i === points.length - 2;
    if (piece === 0 || (piece < left && !isLast)) {
      if (piece > 0) kept.push(to);
      left -= piece;
      continue;
    }
    const part = left / piece;
    const along = (axis: 0 | 1 | 2) => from[axis] + (to[axis] - from[axis]) * part;
    kept.push([along(0), along(1), along(2)]);
    return kept;
  }
  return kept;
}

/** A first guess to be changed: from the middle of the right edge, 0.3 m out, then down to 0.1 m above the ground. */
export function newCable(board: Board, names: readonly string[]): CableFile {
  const corners = board.outlineM.flat();
  const rightM = Math.max(...corners.map(([xM]) => xM));
  const ys = corners.map(([, yM]) => yM);
  const xMm = mToMm(rightM);
  const yMm = mToMm((Math.min(...ys) + Math.max(...ys)) / 2);
  let name = 'cable';
  for (let number = 2; names.includes(name); number++) name = `cable ${number}`;
  return {
    name,
    pointsMm: [
      [xMm, yMm, 0],
      [xMm + 300, yMm, 0],
      [xMm + 300, yMm, -700],
    ],
    radiusMm: 1,
    farEnd: 'open',
  };
}
