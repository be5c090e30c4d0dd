/**
 * Solves A x = b by Gaussian elimination with partial pivoting; `matrix` is row-major n×n and is overwritten, `rhs` becomes x.
 * For test oracles only: O(n³), no sparsity.
 */
export function solveDense(matrix: Float64Array, rhs: Float64Array): void {
  const n = rhs.length;
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) {
      if (Math.abs(matrix[i * n + k]!) > Math.abs(matrix[pivot * n + k]!)) pivot = i;
    }
    if (matrix[pivot * n + k] === 0) throw new Error(`singular matrix at column ${k}`);
    if (pivot !== k) {
      for (let j = k; j < n; j++) {
        const kept = matrix[k * n + j]!;
        matrix[k * n + j] = matrix[pivot * n + j]!;
        matrix[pivot * n + j] = kept;
      }
      const kept = rhs[k]!;
      rhs[k] = rhs[pivot]!;
      rhs[pivot] = kept;
    }
    for (let i = k + 1; i < n; i++) {
      const factor = matrix[i * n + k]! / matrix[k * n + k]!;
      if (factor === 0) continue;
      for (let j = k + 1; j < n; j++) matrix[i * n + j]! -= factor * matrix[k * n + j]!;
      rhs[i]! -= factor * rhs[k]!;
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = rhs[i]!;
    for (let j = i + 1; j < n; j++) sum -= matrix[i * n + j]! * rhs[j]!;
    rhs[i] = sum / matrix[i * n + i]!;
  }
}

/** Complex A x = b as the real system [[Re A, −Im A], [Im A, Re A]]; arrays hold re, im pairs, row-major. Returns x. */
export function solveDenseComplex(matrix: Float64Array, rhs: Float64Array): Float64Array {
  const n = rhs.length / 2;
  const real = new Float64Array(4 * n * n);
  const vector = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const re = matrix[2 * (i * n + j)]!;
      const im = matrix[2 * (i * n + j) + 1]!;
      real[i * 2 * n + j] = re;
      real[i * 2 * n + n + j] = -im;
      real[(n + i) * 2 * n + j] = im;
      real[(n + i) * 2 * n + n + j] = re;
    }
    vector[i] = rhs[2 * i]!;
    vector[n + i] = rhs[2 * i + 1]!;
  }
  solveDense(real, vector);
  return Float64Array.from(rhs, (_, i) => vector[i % 2 === 0 ? i / 2 : n + (i - 1) / 2]!);
}
