import { scratchKernel } from '../kernel/kernel.ts';
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
 * Samples ([angle][height][`stride`], from index `start` on; `stride` even) interpolated to another sampling: exact for what
 * both samplings can hold.
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
  const sourceLength = from.heightCount * stride;
  const rowLength = to.heightCount * stride;
  // The kernel's memory: tables, samples, samples on the new heights, result.
  const anglesAt = heights.length;
  const samplesAt = anglesAt + angles.length;
  const betweenAt = samplesAt + from.angleCount * sourceLength;
  const outAt = betweenAt + from.angleCount * rowLength;
  const end = outAt + to.angleCount * rowLength;
  const { floats, functions } = scratchKernel(end);
  floats.set(heights);
  floats.set(angles, anglesAt);
  floats.set(samples.subarray(start, start + from.angleCount * sourceLength), samplesAt);
  for (let a = 0; a < from.angleCount; a++) {
    const rows = 8 * (samplesAt + a * sourceLength);
    functions.combineRows(0, to.heightCount, from.heightCount, rows, stride, 8 * (betweenAt + a * rowLength));
  }
  functions.combineRows(8 * anglesAt, to.angleCount, from.angleCount, 8 * betweenAt, rowLength, 8 * outAt);
  return floats.slice(outAt, end);
}
