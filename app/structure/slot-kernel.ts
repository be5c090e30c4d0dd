import { solveRealSymmetric } from './real-solve.ts';
import { meanLogOfCells } from './strip-density.ts';

/** Columns on either side of the slot in the two-dimensional problem: more change the result by the slow logarithm only. */
const COLUMNS = 8;
/** Narrower slots count as this wide (in cells): the correction must leave the matrix positive. */
const NARROWEST = 0.01;

const known = new Map<string, number>();

/**
 * What a slot's true width adds to the kernel between the cells that face each other across it, times the cell side.
 *
 * Cells whose link is cut behave like strips with a slot of 0.28 cell between them, whatever the slot's width; the slot's inductance and
 * capacitance go with the logarithm of the width, so a 0.2 mm slot between 5 mm cells would radiate 3 dB too much. The
 * correction δ lowers the kernel of each of the two cells with itself by δ/a and raises the one between them by δ/a; it is
 * chosen so that two strips of eight such columns have the inductance of coplanar strips with the true slot,
 *   L' = µ0 K(k)/K(k'),  k = w/(w + 2W)   (W. Hilberg, Electrical Characteristics of Transmission Lines, from memory).
 * `missing`: cells without copper between the two; `width`: true width in cells.
 */
export function slotCorrection(missing: number, width: number): number {
  const effective = Math.max(NARROWEST, width);
  const key = `${missing} ${effective.toPrecision(6)}`;
  const found = known.get(key);
  if (found !== undefined) return found;
  const target = coplanarInductance(COLUMNS, effective);
  let low = -2;
  let high = 1;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (discreteInductance(missing, middle) > target) low = middle;
    else high = middle;
  }
  const delta = (low + high) / 2;
  known.set(key, delta);
  return delta;
}

/** L'/µ0 of two strips of `w` cells with a slot of `slot` cells between them. */
function coplanarInductance(w: number, slot: number): number {
  const k = slot / (slot + 2 * w);
  // K(k)/K(k') by the arithmetic-geometric mean: K(k) = π/(2 agm(1, k')).
  return agm(1, k) / agm(1, Math.sqrt(1 - k * k));
}

function agm(a: number, b: number): number {
  let x = a;
  let y = b;
  for (let step = 0; step < 40 && Math.abs(x - y) > 1e-15 * x; step++) [x, y] = [(x + y) / 2, Math.sqrt(x * y)];
  return x;
}

/** L'/µ0 of the same two strips as uniform columns with opposite currents, the innermost pair's kernel lowered by δ. */
function discreteInductance(missing: number, delta: number): number {
  const n = COLUMNS;
  const matrix = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) matrix[i * n + j] = meanLogOfCells(i + j + 1 + missing) - meanLogOfCells(i - j);
  }
  matrix[0]! -= delta;
  const current = new Float64Array(n).fill(1);
  solveRealSymmetric(matrix, current);
  return 1 / (Math.PI * current.reduce((sum, value) => sum + value, 0));
}
