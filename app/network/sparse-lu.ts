/** Below this a pivot counts as none: its square would underflow. Entries are of the order of 1. */
const SMALLEST_PIVOT = 1e-140;
/** Growth by a pivot taken over from other values beyond which new ones are chosen. */
const LARGEST_FACTOR = 100;

/**
 * LU factors of a sparse complex matrix, column by column with partial pivoting (left-looking): the work is proportional
 * to the multiplications done. The pattern (compressed columns) and the column order are fixed, values change.
 *
 * A column without a usable pivot (an unknown that nothing determines, or an exact resonance without loss) gets one of
 * rounding size: its unknown comes out 0 where nothing drives it, and large but finite where something does.
 * Source: J. R. Gilbert, T. Peierls, Sparse partial pivoting in time proportional to arithmetic operations, SIAM J. Sci.
 * Stat. Comput. 9, 1988.
 */
export class SparseLu {
  readonly #n: number;
  readonly #starts: Int32Array;
  readonly #rows: Int32Array;
  readonly #order: Int32Array;
  /** Row → its place in the pivot order, −1 while it has none. */
  readonly #placeOf: Int32Array;
  /** The other way round: pivot row of each step. */
  readonly #rowOf: Int32Array;
  readonly #typical: Float64Array;
  #isPlanned = false;
  #lower = new Factor(64);
  #upper = new Factor(64);
  readonly #pivotRe: Float64Array;
  readonly #pivotIm: Float64Array;
  readonly #xRe: Float64Array;
  readonly #xIm: Float64Array;
  readonly #found: Int32Array;
  readonly #stack: Int32Array;
  readonly #resume: Int32Array;
  readonly #mark: Int32Array;

  /**
   * `typical`: values whose pivots serve others too while they are large enough; what comes out for given values then does not
   * depend on what was factored before.
   */
  constructor(columnStarts: Int32Array, rowIndices: Int32Array, order: Int32Array, typical: Float64Array) {
    const n = order.length;
    this.#typical = typical;
    this.#n = n;
    this.#starts = columnStarts;
    this.#rows = rowIndices;
    this.#order = order;
    this.#placeOf = new Int32Array(n);
    this.#rowOf = new Int32Array(n);
    this.#pivotRe = new Float64Array(n);
    this.#pivotIm = new Float64Array(n);
    this.#xRe = new Float64Array(n);
    this.#xIm = new Float64Array(n);
    this.#found = new Int32Array(n);
    this.#stack = new Int32Array(n);
    this.#resume = new Int32Array(n);
    this.#mark = new Int32Array(n);
  }

  /** Factors the matrix whose entries, in the order of the pattern, are `values` (re, im pairs). */
  factor(values: Float64Array): void {
    if (!this.#isPlanned) this.#factorAnew(this.#typical);
    this.#isPlanned = this.#refactor(values);
    if (!this.#isPlanned) this.#factorAnew(values);
  }

  #factorAnew(values: Float64Array): void {
    const xRe = this.#xRe;
    const xIm = this.#xIm;
    const place = this.#placeOf.fill(-1);
    const lower = this.#lower;
    const upper = this.#upper;
    this.#mark.fill(-1);
    lower.clear(this.#n);
    upper.clear(this.#n);
    for (let k = 0; k < this.#n; k++) {
      const column = this.#order[k]!;
      const first = this.#reach(column, k);
      for (let i = first; i < this.#n; i++) {
        xRe[this.#found[i]!] = 0;
        xIm[this.#found[i]!] = 0;
      }
      for (let p = this.#starts[column]!; p < this.#starts[column + 1]!; p++) {
        xRe[this.#rows[p]!]! += values[2 * p]!;
        xIm[this.#rows[p]!]! += values[2 * p + 1]!;
      }
      upper.reserve(this.#n);
      lower.reserve(this.#n);
      for (let i = first; i < this.#n; i++) {
        const row = this.#found[i]!;
        const at = place[row]!;
        if (at < 0) continue;
        const re = xRe[row]!;
        const im = xIm[row]!;
        upper.push(at, re, im);
        this.#subtractColumn(at, re, im);
      }
      upper.starts[k + 1] = upper.length;
      this.#takePivot(k, column, first);
      lower.starts[k + 1] = lower.length;
    }
    this.#placeLeftRows();
  }

  /** Columns without a pivot (they have no lower part, so any place will do) take the rows that no column has taken. */
  #placeLeftRows(): void {
    let k = 0;
    for (let row = 0; row < this.#n; row++) {
      if (this.#placeOf[row]! >= 0) continue;
      while (this.#rowOf[k]! >= 0) k++;
      this.#rowOf[k] = row;
      this.#placeOf[row] = k;
    }
  }

  /** The same pattern and pivots with new values; false (and nothing usable) when a pivot has become too small. */
  #refactor(values: Float64Array): boolean {
    const xRe = this.#xRe;
    const xIm = this.#xIm;
    const lower = this.#lower;
    const upper = this.#upper;
    for (let k = 0; k < this.#n; k++) {
      const column = this.#order[k]!;
      const pivotRow = this.#rowOf[k]!;
      const upperEnd = upper.starts[k + 1]!;
      const lowerEnd = lower.starts[k + 1]!;
      xRe[pivotRow] = 0;
      xIm[pivotRow] = 0;
      for (let p = upper.starts[k]!; p < upperEnd; p++) {
        xRe[this.#rowOf[upper.indices[p]!]!] = 0;
        xIm[this.#rowOf[upper.indices[p]!]!] = 0;
      }
      for (let p = lower.starts[k]!; p < lowerEnd; p++) {
        xRe[lower.indices[p]!] = 0;
        xIm[lower.indices[p]!] = 0;
      }
      for (let p = this.#starts[column]!; p < this.#starts[column + 1]!; p++) {
        xRe[this.#rows[p]!]! += values[2 * p]!;
        xIm[this.#rows[p]!]! += values[2 * p + 1]!;
      }
      for (let p = upper.starts[k]!; p < upperEnd; p++) {
        const at = upper.indices[p]!;
        const re = xRe[this.#rowOf[at]!]!;
        const im = xIm[this.#rowOf[at]!]!;
        upper.re[p] = re;
        upper.im[p] = im;
        this.#subtractColumn(at, re, im);
      }
      const dRe = xRe[pivotRow]!;
      const dIm = xIm[pivotRow]!;
      const pivotSize = Math.abs(dRe) + Math.abs(dIm);
      if (!(pivotSize > SMALLEST_PIVOT)) return false;
      const size = dRe * dRe + dIm * dIm;
      this.#pivotRe[k] = dRe;
      this.#pivotIm[k] = dIm;
      for (let p = lower.starts[k]!; p < lowerEnd; p++) {
        const re = xRe[lower.indices[p]!]!;
        const im = xIm[lower.indices[p]!]!;
        if (Math.abs(re) + Math.abs(im) > LARGEST_FACTOR * pivotSize) return false;
        lower.re[p] = (re * dRe + im * dIm) / size;
        lower.im[p] = (im * dRe - re * dIm) / size;
      }
    }
    return true;
  }

  /** x −= value · (column `at` of the lower factor). */
  #subtractColumn(at: number, re: number, im: number): void {
    const { starts, indices, re: lowerRe, im: lowerIm } = this.#lower;
    const end = starts[at + 1]!;
    for (let p = starts[at]!; p < end; p++) {
      const target = indices[p]!;
      const fRe = lowerRe[p]!;
      const fIm = lowerIm[p]!;
      this.#xRe[target]! -= fRe * re - fIm * im;
      this.#xIm[target]! -= fRe * im + fIm * re;
    }
  }

  /** Replaces the right side (re, im pairs) by the solution. */
  solve(rhs: Float64Array): void {
    const n = this.#n;
    const yRe = this.#xRe;
    const yIm = this.#xIm;
    const { starts, indices, re, im } = this.#lower;
    for (let row = 0; row < n; row++) {
      yRe[this.#placeOf[row]!] = rhs[2 * row]!;
      yIm[this.#placeOf[row]!] = rhs[2 * row + 1]!;
    }
    for (let k = 0; k < n; k++) {
      const aRe = yRe[k]!;
      const aIm = yIm[k]!;
      if (aRe === 0 && aIm === 0) continue;
      for (let p = starts[k]!; p < starts[k + 1]!; p++) {
        const target = this.#placeOf[indices[p]!]!;
        yRe[target]! -= re[p]! * aRe - im[p]! * aIm;
        yIm[target]! -= re[p]! * aIm + im[p]! * aRe;
      }
    }
    const upper = this.#upper;
    for (let k = n - 1; k >= 0; k--) {
      const dRe = this.#pivotRe[k]!;
      const dIm = this.#pivotIm[k]!;
      const size = dRe * dRe + dIm * dIm;
      const aRe = (yRe[k]! * dRe + yIm[k]! * dIm) / size;
      const aIm = (yIm[k]! * dRe - yRe[k]! * dIm) / size;
      rhs[2 * this.#order[k]!] = aRe;
      rhs[2 * this.#order[k]! + 1] = aIm;
      for (let p = upper.starts[k]!; p < upper.starts[k + 1]!; p++) {
        const target = upper.indices[p]!;
        yRe[target]! -= upper.re[p]! * aRe - upper.im[p]! * aIm;
        yIm[target]! -= upper.re[p]! * aIm + upper.im[p]! * aRe;
      }
    }
  }

  /** Rows that the column's entries reach through the factor so far, in topological order at the end of #found. */
  #reach(column: number, stamp: number): number {
    const { starts, indices } = this.#lower;
    let top = this.#n;
    for (let p = this.#starts[column]!; p < this.#starts[column + 1]!; p++) {
      if (this.#mark[this.#rows[p]!] === stamp) continue;
      let head = 0;
      this.#stack[0] = this.#rows[p]!;
      while (head >= 0) {
        const row = this.#stack[head]!;
        const at = this.#placeOf[row]!;
        if (this.#mark[row] !== stamp) {
          this.#mark[row] = stamp;
          this.#resume[head] = at < 0 ? 0 : starts[at]!;
        }
        const end = at < 0 ? 0 : starts[at + 1]!;
        let isFinished = true;
        for (let i = this.#resume[head]!; i < end; i++) {
          if (this.#mark[indices[i]!] === stamp) continue;
          this.#resume[head] = i + 1;
          this.#stack[++head] = indices[i]!;
          isFinished = false;
          break;
        }
        if (isFinished) {
          head--;
          this.#found[--top] = row;
        }
      }
    }
    return top;
  }

  /** Chooses the pivot of a column (the diagonal unless another is ten times larger) and stores the rest as factors. */
  #takePivot(k: number, column: number, first: number): void {
    const place = this.#placeOf;
    let pivotRow = -1;
    let largest = 0;
    for (let i = first; i < this.#n; i++) {
      const row = this.#found[i]!;
      if (place[row]! >= 0) continue;
      const size = Math.abs(this.#xRe[row]!) + Math.abs(this.#xIm[row]!);
      const preferred = row === column ? 10 * size : size;
      if (preferred > largest) {
        largest = preferred;
        pivotRow = row;
      }
    }
    if (!(largest > SMALLEST_PIVOT)) {
      this.#rowOf[k] = -1;
      this.#pivotRe[k] = Number.EPSILON;
      this.#pivotIm[k] = 0;
      return;
    }
    place[pivotRow] = k;
    this.#rowOf[k] = pivotRow;
    const dRe = this.#xRe[pivotRow]!;
    const dIm = this.#xIm[pivotRow]!;
    this.#pivotRe[k] = dRe;
    this.#pivotIm[k] = dIm;
    const size = dRe * dRe + dIm * dIm;
    for (let i = first; i < this.#n; i++) {
      const row = this.#found[i]!;
      if (place[row]! >= 0) continue;
      const re = this.#xRe[row]!;
      const im = this.#xIm[row]!;
      this.#lower.push(row, (re * dRe + im * dIm) / size, (im * dRe - re * dIm) / size);
    }
  }
}

/** Columns of a triangular factor, growing. */
class Factor {
  starts = new Int32Array(1);
  indices: Int32Array;
  re: Float64Array;
  im: Float64Array;
  length = 0;

  constructor(capacity: number) {
    this.indices = new Int32Array(capacity);
    this.re = new Float64Array(capacity);
    this.im = new Float64Array(capacity);
  }

  clear(columns: number): void {
    if (this.starts.length !== columns + 1) this.starts = new Int32Array(columns + 1);
    this.length = 0;
  }

  /** Makes room for `more` entries. */
  reserve(more: number): void {
    if (this.length + more <= this.indices.length) return;
    const capacity = 2 * (this.length + more);
    this.indices = grown(this.indices, new Int32Array(capacity));
    this.re = grown(this.re, new Float64Array(capacity));
    this.im = grown(this.im, new Float64Array(capacity));
  }

  push(index: number, re: number, im: number): void {
    this.indices[this.length] = index;
    this.re[this.length] = re;
    this.im[this.length] = im;
    this.length++;
  }
}

function grown<T extends Int32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
