import type { ElementSet, Radiator } from '../fields/element-set.ts';
import { gridCount } from './moment-grid.ts';
import { chebyshevNodes, chebyshevWeights } from './sampling.ts';

/** Elements off the line by more than this share of its length are not on it. */
const ON_LINE = 1e-9;
/** Error that is allowed where the distance to the antenna changes along the line. */
const ALLOWED_ERROR = 1e-5;

/** A straight line, middle to half its length. */
interface Line {
  readonly middleM: readonly [number, number, number];
  readonly halfM: readonly [number, number, number];
}

const lines = new WeakMap<ElementSet, Line | null>();

/** The line on which all elements of a set lie, null when there is none. */
export function lineOf(elements: ElementSet): Line | null {
  const known = lines.get(elements);
  if (known !== undefined) return known;
  const line = findLine(elements);
  lines.set(elements, line);
  return line;
}

function findLine({ positionsM, count }: ElementSet): Line | null {
  if (count < 2) return null;
  const at = (e: number, axis: number) => positionsM[3 * e + axis]!;
  const from = [0, 1, 2].map((axis) => at(0, axis));
  const way = from.map((start, axis) => at(count - 1, axis) - start);
  const length2 = way.reduce((sum, value) => sum + value * value, 0);
  if (length2 === 0) return null;
  for (let e = 0; e < count; e++) {
    const along = way.reduce((sum, value, axis) => sum + value * (at(e, axis) - from[axis]!), 0) / length2;
    const off = Math.hypot(...way.map((value, axis) => at(e, axis) - from[axis]! - along * value));
    if (off > ON_LINE * Math.sqrt(length2) || along < 0 || along > 1) return null;
  }
  const vector = (of: (axis: number) => number): [number, number, number] => [of(0), of(1), of(2)];
  return {
    middleM: vector((axis) => from[axis]! + way[axis]! / 2),
    halfM: vector((axis) => way[axis]! / 2),
  };
}

/**
 * Chebyshev points on a line for sources seen from `gapM` or farther: those of `gridCount` for the phase; for 1/R, which is smooth in
 * the ellipse about the line that the antenna stays out of (foci at its ends), as many as its axes ask: ρ^(−n), ρ the sum
 * of the half-axes.
 * Source: L. N. Trefethen, Approximation Theory and Approximation Practice, theorem 8.2.
 */
export function lineCount({ halfM }: Line, kPerM: number, gapM: number): number {
  const lengthM = Math.hypot(...halfM);
  const axis = 1 + gapM / lengthM;
  const rho = axis + Math.sqrt(axis * axis - 1);
  return Math.max(gridCount(kPerM, lengthM), Math.ceil(-Math.log(ALLOWED_ERROR) / Math.log(rho)));
}

/** Elements on a line as equivalent moments at `count` Chebyshev points of it (see `MomentGrid`). */
export class LineGrid {
  readonly positionsM: Float64Array;
  readonly #line: Line;
  readonly #nodes: Float64Array;

  constructor(line: Line, count: number) {
    this.#line = line;
    this.#nodes = chebyshevNodes(count, -1, 1);
    this.positionsM = new Float64Array(3 * count);
    for (let i = 0; i < count; i++) {
      for (let axis = 0; axis < 3; axis++) {
        this.positionsM[3 * i + axis] = line.middleM[axis]! + this.#nodes[i]! * line.halfM[axis]!;
      }
    }
  }

  /** Adds a radiator's complex vector moments to those of the points: 6 floats a point (x, y, z, each re then im), A·m. */
  gather({ elements, currentsA }: Radiator, out: Float64Array): void {
    const { middleM, halfM } = this.#line;
    const { positionsM, vectorsM, count } = elements;
    const half2 = halfM[0] * halfM[0] + halfM[1] * halfM[1] + halfM[2] * halfM[2];
    const weights = new Float64Array(this.#nodes.length);
    for (let e = 0; e < count; e++) {
      let along = 0;
      for (let axis = 0; axis < 3; axis++) along += (positionsM[3 * e + axis]! - middleM[axis]!) * halfM[axis]!;
      chebyshevWeights(this.#nodes, along / half2, weights);
      for (let axis = 0; axis < 3; axis++) {
        const re = currentsA[2 * e]! * vectorsM[3 * e + axis]!;
        const im = currentsA[2 * e + 1]! * vectorsM[3 * e + axis]!;
        if (re === 0 && im === 0) continue;
        for (let i = 0; i < weights.length; i++) {
          out[6 * i + 2 * axis]! += weights[i]! * re;
          out[6 * i + 2 * axis + 1]! += weights[i]! * im;
        }
      }
    }
  }
}
