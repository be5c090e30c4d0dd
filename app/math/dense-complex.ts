/**
 * LU factors with partial pivoting of a small complex matrix (n × n, row by row, re and im pairs), in place; returns the
 * rows taken as pivots. A column without any pivot leaves its unknown 0.
 */
export function factorDense(a: Float64Array, n: number): Int32Array {
  const pivots = new Int32Array(n);
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) if (size2(a, i * n + k) > size2(a, pivot * n + k)) pivot = i;
    pivots[k] = pivot;
    if (pivot !== k) {
      for (let j = 0; j < 2 * n; j++) {
        const kept = a[2 * k * n + j]!;
        a[2 * k * n + j] = a[2 * pivot * n + j]!;
        a[2 * pivot * n + j] = kept;
      }
    }
    const size = size2(a, k * n + k);
    if (size === 0) continue;
    const re = a[2 * (k * n + k)]! / size;
    const im = -a[2 * (k * n + k) + 1]! / size;
    for (let i = k + 1; i < n; i++) {
      const at = 2 * (i * n + k);
      const lRe = a[at]! * re - a[at + 1]! * im;
      const lIm = a[at]! * im + a[at + 1]! * re;
      a[at] = lRe;
      a[at + 1] = lIm;
      for (let j = k + 1; j < n; j++) {
        const from = 2 * (k * n + j);
        a[2 * (i * n + j)]! -= lRe * a[from]! - lIm * a[from + 1]!;
        a[2 * (i * n + j) + 1]! -= lRe * a[from + 1]! + lIm * a[from]!;
      }
    }
  }
  return pivots;
}

const size2 = (a: Float64Array, at: number): number => a[2 * at]! ** 2 + a[2 * at + 1]! ** 2;

/** Replaces b (re, im pairs) by the solution, given the factors and pivots of `factorDense`. */
export function solveDense(a: Float64Array, pivots: Int32Array, b: Float64Array, n: number): void {
  // All exchanges first: the factors' rows stand in their final order.
  for (let k = 0; k < n; k++) {
    const pivot = pivots[k]!;
    for (const part of [0, 1]) {
      const kept = b[2 * k + part]!;
      b[2 * k + part] = b[2 * pivot + part]!;
      b[2 * pivot + part] = kept;
    }
  }
  for (let k = 0; k < n; k++) for (let i = k + 1; i < n; i++) subtractProduct(a, i * n + k, b, k, i);
  for (let k = n - 1; k >= 0; k--) {
    for (let j = k + 1; j < n; j++) subtractProduct(a, k * n + j, b, j, k);
    const size = size2(a, k * n + k);
    const re = b[2 * k]!;
    const im = b[2 * k + 1]!;
    const dRe = a[2 * (k * n + k)]!;
    const dIm = a[2 * (k * n + k) + 1]!;
    b[2 * k] = size === 0 ? 0 : (re * dRe + im * dIm) / size;
    b[2 * k + 1] = size === 0 ? 0 : (im * dRe - re * dIm) / size;
  }
}

function subtractProduct(a: Float64Array, at: number, b: Float64Array, from: number, to: number): void {
  b[2 * to]! -= a[2 * at]! * b[2 * from]! - a[2 * at + 1]! * b[2 * from + 1]!;
  b[2 * to + 1]! -= a[2 * at]! * b[2 * from + 1]! + a[2 * at + 1]! * b[2 * from]!;
}
