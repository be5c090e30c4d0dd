import type { PointM } from '../board/board.ts';

/** Part of a straight piece inside one square of a grid; arc length from the piece's start, m. */
export interface GridStretch {
  readonly column: number;
  readonly row: number;
  readonly fromM: number;
  readonly toM: number;
}

/**
 * Squares (origin, side) that the straight piece from→to passes through, in order. Columns and rows may lie outside the sheet.
 * Where the piece runs along a line between squares, the square on the side of larger column or row is taken.
 */
export function walkGrid(
  [ax, ay]: PointM,
  [bx, by]: PointM,
  originXM: number,
  originYM: number,
  sideM: number,
): GridStretch[] {
  const lengthM = Math.hypot(bx - ax, by - ay);
  const cuts = [0, 1];
  addCuts(ax, bx, originXM, sideM, cuts);
  addCuts(ay, by, originYM, sideM, cuts);
  cuts.sort((one, other) => one - other);
  const stretches: GridStretch[] = [];
  for (let i = 0; i + 1 < cuts.length; i++) {
    const from = cuts[i]!;
    const to = cuts[i + 1]!;
    if (to - from < 1e-9) continue;
    const middle = (from + to) / 2;
    const column = Math.floor((ax + middle * (bx - ax) - originXM) / sideM);
    const row = Math.floor((ay + middle * (by - ay) - originYM) / sideM);
    stretches.push({ column, row, fromM: from * lengthM, toM: to * lengthM });
  }
  return stretches;
}

function addCuts(a: number, b: number, originM: number, sideM: number, cuts: number[]): void {
  const first = (a - originM) / sideM;
  const last = (b - originM) / sideM;
  // Nearly parallel to the lines: at most a rounding error is crossed.
  if (Math.abs(last - first) < 1e-9) return;
  const low = Math.ceil(Math.min(first, last));
  const high = Math.floor(Math.max(first, last));
  for (let line = low; line <= high; line++) {
    const t = (line - first) / (last - first);
    if (t > 0 && t < 1) cuts.push(t);
  }
}
