import { chebyshevNodes, chebyshevWeights, trigonometricWeights } from './sampling.ts';

/** Samples on 2·order + 1 equally spaced angles and `heightCount` Chebyshev heights. */
export interface Sampling {
  readonly angleCount: number;
  readonly heightCount: number;
}

const angleTables = new Map<string, Float64Array>();
const heightTables = new Map<string, Float64Array>();

/** Trigonometric interpolation from 2N + 1 equally spaced angles to any number of them: [to][from]. */
export function angleTable(from: number, to: number): Float64Array {
  const key = `${from} ${to}`;
  let table = angleTables.get(key);
  if (!table) {
    table = new Float64Array(to * from);
    for (let a = 0; a < to; a++) trigonometricWeights((from - 1) / 2, (2 * Math.PI * a) / to, table, a * from);
    angleTables.set(key, table);
  }
  return table;
}

/** Interpolation between two numbers of Chebyshev points of the same interval: [to][from]. */
function heightTable(from: number, to: number): Float64Array {
  const key = `${from} ${to}`;
  let table = heightTables.get(key);
  if (!table) {
    table = new Float64Array(to * from);
    const nodes = chebyshevNodes(from, -1, 1);
    for (const [h, height] of chebyshevNodes(to, -1, 1).entries()) chebyshevWeights(nodes, height, table, h * from);
    heightTables.set(key, table);
  }
  return table;
}

/**
 * Samples ([angle][height][`stride`], from index `start` on) interpolated to another sampling: exact for what both samplings can
 * hold.
 */
export function resample(
  samples: Float64Array,
  start: number,
  stride: number,
  from: Sampling,
  to: Sampling,
): Float64Array {
  const heights = heightTable(from.heightCount, to.heightCount);
  const angles = angleTable(from.angleCount, to.angleCount);
  const rowLength = to.heightCount * stride;
  const between = new Float64Array(from.angleCount * rowLength);
  for (let a = 0; a < from.angleCount; a++) {
    const input = start + a * from.heightCount * stride;
    addProduct(heights, to.heightCount, from.heightCount, samples, input, stride, between, a * rowLength);
  }
  const out = new Float64Array(to.angleCount * rowLength);
  addProduct(angles, to.angleCount, from.angleCount, between, 0, rowLength, out, 0);
  return out;
}

/** out[row] += Σ weights[row][i] · rows[i], rows of `length` numbers from an index on. */
function addProduct(
  weights: Float64Array,
  rowCount: number,
  inner: number,
  rows: Float64Array,
  from: number,
  length: number,
  out: Float64Array,
  to: number,
): void {
  for (let row = 0; row < rowCount; row++) {
    const target = to + row * length;
    for (let i = 0; i < inner; i++) {
      const weight = weights[row * inner + i]!;
      const source = from + i * length;
      for (let j = 0; j < length; j++) out[target + j]! += weight * rows[source + j]!;
    }
  }
}
