import { solveRealSymmetric } from './real-solve.ts';

/** Wider runs are treated like this one: the edges no longer see each other. */
const WIDEST_CELLS = 48;

/** A conducting strip of uniform cells, seen in two dimensions (kernel −ln distance, means over cells). */
interface DiscreteStrip {
  /** What must be taken off the kernel of an outermost cell with itself, times the cell side, for each open side. */
  readonly edgeCorrection: number;
  /** Density of the cells for a total of 1, per cell width; mirror symmetric. */
  readonly densities: Float64Array;
}

const known = new Map<number, DiscreteStrip>();

/** Mean of ln|x − x'| over two unit cells `distance` apart: second difference of x² ln|x|/2 − 3x²/4. */
export function meanLogOfCells(distance: number): number {
  const twice = (x: number): number => (x === 0 ? 0 : (x * x * Math.log(Math.abs(x))) / 2 - (3 * x * x) / 4);
  return twice(distance + 1) - 2 * twice(distance) + twice(distance - 1);
}

/**
 * Correction for the copper's edges. Current along an edge and charge at it crowd with 1/√(distance); uniform cells make a
 * strip behave as if each edge lay 0.14 cell further in, at every cell size. Lowering the kernel of the outermost cell with itself by
 * δ/a (0.24/a for wide strips) gives a strip of `count` cells its exact potential, −ln(width/4) for charge 1
 * (W. R. Smythe, Static and Dynamic Electricity, 3rd ed., section 4.22, from memory).
 */
export const edgeCorrection = (count: number): number => discreteStrip(count).edgeCorrection;

/** Density that the corrected cells have across a strip `count` cells wide carrying 1 in all, in cell `index`, per cell width. */
export function stripDensity(count: number, index: number): number {
  if (count <= WIDEST_CELLS) return discreteStrip(count).densities[index]!;
  // Near an edge as in the widest strip, elsewhere exact: both follow 1/(π √(w² − u²)).
  const fromEdge = Math.min(index, count - 1 - index);
  const exact = exactDensity(count, fromEdge);
  if (fromEdge >= WIDEST_CELLS / 2) return exact;
  return (discreteStrip(count).densities[fromEdge]! / exactDensity(WIDEST_CELLS, fromEdge)) * exact;
}

/** Mean of 1/(π √(w² − u²)) over one cell. */
function exactDensity(count: number, index: number): number {
  const w = count / 2;
  return (Math.asin((index + 1 - w) / w) - Math.asin((index - w) / w)) / Math.PI;
}

function discreteStrip(count: number): DiscreteStrip {
  const cells = Math.min(count, WIDEST_CELLS);
  const found = known.get(cells);
  if (found) return found;
  const target = -Math.log(cells / 4);
  let low = -1;
  let high = 1;
  for (let step = 0; step < 50; step++) {
    const middle = (low + high) / 2;
    // A lower kernel at the edges lowers the potential.
    if (solveStrip(cells, middle).potential > target) low = middle;
    else high = middle;
  }
  const edge = (low + high) / 2;
  const strip = { edgeCorrection: edge, densities: solveStrip(cells, edge).densities };
  known.set(cells, strip);
  return strip;
}

function solveStrip(count: number, edge: number): { readonly potential: number; readonly densities: Float64Array } {
  const matrix = new Float64Array(count * count);
  // A constant in the kernel shifts the potential only; this one keeps the matrix positive.
  const constant = Math.log(10 * count);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) matrix[i * count + j] = constant - meanLogOfCells(i - j);
  }
  matrix[0]! -= edge;
  matrix[count * count - 1]! -= edge;
  const densities = new Float64Array(count).fill(1);
  solveRealSymmetric(matrix, densities);
  const total = densities.reduce((sum, value) => sum + value, 0);
  for (let i = 0; i < count; i++) densities[i]! /= total;
  return { potential: 1 / total - constant, densities };
}
