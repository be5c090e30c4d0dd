/**
 * Solves a small dense real symmetric system A x = b in place by L D Lᵀ without pivoting, for matrices that allow it (kernels of
 * charges, positive). `lower`: row-major, size × size, only its lower triangle is used; both arguments are overwritten.
 * Source: G. H. Golub, C. F. Van Loan, Matrix Computations, 4th ed., section 4.1.2.
 */
export function solveRealSymmetric(lower: Float64Array, b: Float64Array): void {
  const size = b.length;
  for (let j = 0; j < size; j++) {
    const pivot = lower[j * size + j]!;
    for (let i = j + 1; i < size; i++) {
      const ratio = lower[i * size + j]! / pivot;
      for (let m = i; m < size; m++) lower[m * size + i]! -= ratio * lower[m * size + j]!;
      b[i]! -= ratio * b[j]!;
    }
  }
  for (let i = size - 1; i >= 0; i--) {
    for (let m = i + 1; m < size; m++) b[i]! -= lower[m * size + i]! * b[m]!;
    b[i]! /= lower[i * size + i]!;
  }
}
