import { BLOCK, PANEL_IM, PANEL_ROW, subtractLanes } from './layout';

/**
 * A = L D Lᵀ of a complex symmetric matrix, in place; see `SymmetricSystem` (app/kernel/symmetric-system.ts).
 *
 * `re`, `im`: lower triangle, row-major, `size` × `size`. `w`, `l`: panels of `size` + 2 rows. `corner`: BLOCK rows of a
 * panel. All are addresses. Returns the column of a pivot that is zero or not finite, −1 when there is none.
 */
export function factor(re: usize, im: usize, size: i32, w: usize, l: usize, corner: usize): i32 {
  for (let start = 0; start < size; start += BLOCK) {
    const width = min(BLOCK, size - start);
    const failed = factorColumns(re, im, size, start, width, w, l, corner);
    if (failed >= 0) return failed;
    updateTrailing(re, im, size, start + width, w, l);
  }
  return -1;
}

/**
 * Eliminates `width` columns for all rows from `start` on. Panel w: rows of L·D, panel l: rows of L. `corner`: the block's own
 * L, transposed (row m: L[j][m] of the block's rows j), zero where j ≤ m.
 */
function factorColumns(
  re: usize,
  im: usize,
  size: i32,
  start: i32,
  width: i32,
  w: usize,
  l: usize,
  corner: usize,
): i32 {
  memory.fill(corner, 0, <usize>BLOCK * PANEL_ROW);
  const diagonalStep = (<usize>size + 1) << 3;
  const firstDiagonal = (<usize>start * <usize>size + <usize>start) << 3;
  for (let i = start; i < size; i++) {
    const inBlock = i - start;
    const columns = min(width, inBlock);
    const row = (<usize>i * <usize>size + <usize>start) << 3;
    const wRow = w + <usize>i * PANEL_ROW;
    const lRow = l + <usize>i * PANEL_ROW;
    memory.copy(wRow, re + row, (<usize>columns) << 3);
    memory.copy(wRow + PANEL_IM, im + row, (<usize>columns) << 3);
    eliminateRow(wRow, columns, corner);
    // L = W/D; the diagonal holds 1/D.
    let diagonal = firstDiagonal;
    for (let m = 0; m < columns; m++) {
      const at = (<usize>m) << 3;
      const wRe = load<f64>(wRow + at);
      const wIm = load<f64>(wRow + PANEL_IM + at);
      const dRe = load<f64>(re + diagonal);
      const dIm = load<f64>(im + diagonal);
      const lRe = wRe * dRe - wIm * dIm;
      const lIm = wRe * dIm + wIm * dRe;
      store<f64>(lRow + at, lRe);
      store<f64>(lRow + PANEL_IM + at, lIm);
      store<f64>(re + row + at, lRe);
      store<f64>(im + row + at, lIm);
      diagonal += diagonalStep;
    }
    if (inBlock >= width) continue;
    let pivotRe = load<f64>(re + diagonal);
    let pivotIm = load<f64>(im + diagonal);
    for (let m = 0; m < inBlock; m++) {
      const at = (<usize>m) << 3;
      const wRe = load<f64>(wRow + at);
      const wIm = load<f64>(wRow + PANEL_IM + at);
      const lRe = load<f64>(lRow + at);
      const lIm = load<f64>(lRow + PANEL_IM + at);
      pivotRe -= wRe * lRe - wIm * lIm;
      pivotIm -= wRe * lIm + wIm * lRe;
      const target = corner + <usize>m * PANEL_ROW + ((<usize>inBlock) << 3);
      store<f64>(target, lRe);
      store<f64>(target + PANEL_IM, lIm);
    }
    const norm = pivotRe * pivotRe + pivotIm * pivotIm;
    if (!(norm > 0 && norm <= f64.MAX_VALUE)) return i;
    store<f64>(re + diagonal, pivotRe / norm);
    store<f64>(im + diagonal, -pivotIm / norm);
  }
  return -1;
}

/** W[j] −= W[m] L[j][m] for m < j < `columns`, two columns at a time (columns up to m meet zeros of the corner). */
function eliminateRow(wRow: usize, columns: i32, corner: usize): void {
  const end = (<usize>columns) << 3;
  for (let m = 0; m + 1 < columns; m++) {
    const from = (<usize>m) << 3;
    const wRe = f64x2.splat(load<f64>(wRow + from));
    const wIm = f64x2.splat(load<f64>(wRow + PANEL_IM + from));
    const line = corner + <usize>m * PANEL_ROW;
    for (let at = from & ~15; at < end; at += 16) {
      const lRe = v128.load(line + at);
      const lIm = v128.load(line + at, PANEL_IM);
      const re = v128.load(wRow + at);
      const im = v128.load(wRow + at, PANEL_IM);
      v128.store(wRow + at, f64x2.add(f64x2.sub(re, f64x2.mul(wRe, lRe)), f64x2.mul(wIm, lIm)));
      v128.store(wRow + at, f64x2.sub(f64x2.sub(im, f64x2.mul(wRe, lIm)), f64x2.mul(wIm, lRe)), PANEL_IM);
    }
  }
}

/** Rows of panel l that stay in the first cache while all rows of panel w pass by. */
const ROWS_AT_ONCE: i32 = 64;

/** A[i][j] −= Σ W[i][m] L[j][m] for first ≤ j ≤ i, in tiles of 2 × 2 whose sums stay in registers. */
function updateTrailing(re: usize, im: usize, size: i32, first: i32, w: usize, l: usize): void {
  for (let start = first; start < size; start += ROWS_AT_ONCE) {
    const end = min(size, start + ROWS_AT_ONCE);
    for (let i = start; i < size; i += 2) {
      const jEnd = min(end, i + 2);
      for (let j = start; j < jEnd; j += 2) updateTile(re, im, size, i, j, jEnd, w, l);
    }
  }
}

/** The tile may reach one row or column beyond the matrix: its sums are then not stored. */
function updateTile(re: usize, im: usize, size: i32, i: i32, j: i32, jEnd: i32, w: usize, l: usize): void {
  let p = w + <usize>i * PANEL_ROW;
  let q = l + <usize>j * PANEL_ROW;
  let s00r = f64x2.splat(0);
  let s00i = f64x2.splat(0);
  let s01r = f64x2.splat(0);
  let s01i = f64x2.splat(0);
  let s10r = f64x2.splat(0);
  let s10i = f64x2.splat(0);
  let s11r = f64x2.splat(0);
  let s11i = f64x2.splat(0);
  const end = p + PANEL_IM;
  while (p < end) {
    const a0r = v128.load(p);
    const a0i = v128.load(p, PANEL_IM);
    const b0r = v128.load(q);
    const b0i = v128.load(q, PANEL_IM);
    s00r = f64x2.sub(f64x2.add(s00r, f64x2.mul(a0r, b0r)), f64x2.mul(a0i, b0i));
    s00i = f64x2.add(f64x2.add(s00i, f64x2.mul(a0r, b0i)), f64x2.mul(a0i, b0r));
    const b1r = v128.load(q, PANEL_ROW);
    const b1i = v128.load(q, PANEL_ROW + PANEL_IM);
    s01r = f64x2.sub(f64x2.add(s01r, f64x2.mul(a0r, b1r)), f64x2.mul(a0i, b1i));
    s01i = f64x2.add(f64x2.add(s01i, f64x2.mul(a0r, b1i)), f64x2.mul(a0i, b1r));
    const a1r = v128.load(p, PANEL_ROW);
    const a1i = v128.load(p, PANEL_ROW + PANEL_IM);
    s11r = f64x2.sub(f64x2.add(s11r, f64x2.mul(a1r, b1r)), f64x2.mul(a1i, b1i));
    s11i = f64x2.add(f64x2.add(s11i, f64x2.mul(a1r, b1i)), f64x2.mul(a1i, b1r));
    s10r = f64x2.sub(f64x2.add(s10r, f64x2.mul(a1r, b0r)), f64x2.mul(a1i, b0i));
    s10i = f64x2.add(f64x2.add(s10i, f64x2.mul(a1r, b0i)), f64x2.mul(a1i, b0r));
    p += 16;
    q += 16;
  }
  const hasSecondColumn = j + 1 < jEnd;
  let at = (<usize>i * <usize>size + <usize>j) << 3;
  subtractLanes(re + at, s00r);
  subtractLanes(im + at, s00i);
  if (hasSecondColumn && j < i) {
    subtractLanes(re + at + 8, s01r);
    subtractLanes(im + at + 8, s01i);
  }
  if (i + 1 < size) {
    at += (<usize>size) << 3;
    subtractLanes(re + at, s10r);
    subtractLanes(im + at, s10i);
    if (hasSecondColumn) {
      subtractLanes(re + at + 8, s11r);
      subtractLanes(im + at + 8, s11i);
    }
  }
}
