import { factorDense, solveDense } from '../math/dense-complex.ts';

/**
 * A rational function of a real variable with complex vector values, in barycentric form:
 *   r(x) = Σ_j w_j f_j/(x − x_j) / Σ_j w_j/(x − x_j).
 */
export interface RationalFit {
  /** Indices of the support points among the samples. */
  readonly support: readonly number[];
  /** Weights, re and im per support point. */
  readonly weights: Float64Array;
}

/** Support points at most, as a share of the samples: the others must be enough to find the weights. */
const MOST_SUPPORT = 0.75;

/**
 * AAA fit with one set of weights for all components ("set-valued AAA").
 *
 * `xs`: sample places; `values[i]`: `width` complex numbers (re, im) at place i. Support points are added where the error is
 * largest until every sample is met within `tolerance`, relative to its own largest component, or as many samples are
 * support points as w components allow: each other sample gives w equations for the weights.
 * Source: Y. Nakatsukasa, O. Sète, L. N. Trefethen, The AAA algorithm for rational approximation, SIAM J. Sci. Comput.
 * 40(3), 2018; for vectors: P. Lietaert et al., IMA J. Numer. Anal. 42(2), 2022. The least singular vector of the Loewner
 * matrix comes from inverse iteration on its Gram matrix, good to about 1e-7 relative.
 */
export function fitRational(xs: readonly number[], values: readonly Float64Array[], tolerance: number): RationalFit {
  const width = values[0]!.length / 2;
  const most = Math.max(1, Math.floor(xs.length * Math.min(MOST_SUPPORT, width / (width + 1))));
  const support: number[] = [];
  let weights: Float64Array = new Float64Array(0);
  const sizes = values.map((value) => largest(value) || 1);
  const error = values.map((value, i) => largest(value) / sizes[i]!);
  while (support.length < most) {
    let next = -1;
    for (let i = 0; i < xs.length; i++) {
      if (!support.includes(i) && (next < 0 || error[i]! > error[next]!)) next = i;
    }
    if (next < 0) break;
    support.push(next);
    weights = leastSingularVector(xs, values, sizes, support);
    let worst = 0;
    for (let i = 0; i < xs.length; i++) {
      const isMet = support.includes(i);
      error[i] = isMet ? 0 : distance(evaluateAt({ support, weights }, xs, values, xs[i]!), values[i]!) / sizes[i]!;
      worst = Math.max(worst, error[i]!);
    }
    if (worst <= tolerance) break;
  }
  return { support, weights };
}

/** Factors c_j(x), complex, with r(x) = Σ_j c_j f_j for any vectors f_j sampled at the support points. */
export function supportFactors({ support, weights }: RationalFit, xs: readonly number[], x: number): Float64Array {
  const factors = new Float64Array(2 * support.length);
  let sumRe = 0;
  let sumIm = 0;
  for (let j = 0; j < support.length; j++) {
    const difference = x - xs[support[j]!]!;
    if (difference === 0) {
      factors.fill(0);
      factors[2 * j] = 1;
      return factors;
    }
    factors[2 * j] = weights[2 * j]! / difference;
    factors[2 * j + 1] = weights[2 * j + 1]! / difference;
    sumRe += factors[2 * j]!;
    sumIm += factors[2 * j + 1]!;
  }
  const size = sumRe * sumRe + sumIm * sumIm;
  for (let j = 0; j < support.length; j++) {
    const re = factors[2 * j]!;
    const im = factors[2 * j + 1]!;
    factors[2 * j] = (re * sumRe + im * sumIm) / size;
    factors[2 * j + 1] = (im * sumRe - re * sumIm) / size;
  }
  return factors;
}

/** r(x) for vectors given at every sample place. */
export function evaluateAt(
  fit: RationalFit,
  xs: readonly number[],
  values: readonly Float64Array[],
  x: number,
): Float64Array {
  const factors = supportFactors(fit, xs, x);
  const out = new Float64Array(values[0]!.length);
  for (const [j, i] of fit.support.entries()) addScaled(out, values[i]!, factors[2 * j]!, factors[2 * j + 1]!);
  return out;
}

/** out += (re + j im)·vector, complex pairs. */
export function addScaled(out: Float64Array, vector: Float64Array, re: number, im: number): void {
  for (let i = 0; i < vector.length; i += 2) {
    out[i]! += re * vector[i]! - im * vector[i + 1]!;
    out[i + 1]! += re * vector[i + 1]! + im * vector[i]!;
  }
}

/** Largest magnitude of a complex vector's components. */
export function largest(vector: Float64Array): number {
  let most = 0;
  for (let i = 0; i < vector.length; i += 2) most = Math.max(most, Math.hypot(vector[i]!, vector[i + 1]!));
  return most;
}

/** Largest component of the difference of two complex vectors. */
export function distance(a: Float64Array, b: Float64Array): number {
  let most = 0;
  for (let i = 0; i < a.length; i += 2) most = Math.max(most, Math.hypot(a[i]! - b[i]!, a[i + 1]! - b[i + 1]!));
  return most;
}

function leastSingularVector(
  xs: readonly number[],
  values: readonly Float64Array[],
  sizes: readonly number[],
  support: readonly number[],
): Float64Array {
  const m = support.length;
  const gram = new Float64Array(2 * m * m);
  const row = new Float64Array(2 * m);
  const width = values[0]!.length;
  for (let i = 0; i < xs.length; i++) {
    if (support.includes(i)) continue;
    for (let d = 0; d < width; d += 2) {
      for (let j = 0; j < m; j++) {
        const scale = 1 / ((xs[i]! - xs[support[j]!]!) * sizes[i]!);
        row[2 * j] = (values[i]![d]! - values[support[j]!]![d]!) * scale;
        row[2 * j + 1] = (values[i]![d + 1]! - values[support[j]!]![d + 1]!) * scale;
      }
      addOuter(gram, row, m);
    }
  }
  mirror(gram, m);
  return smallestEigenvector(gram, m);
}

/** gram += conj(row)ᵀ row, on and above the diagonal. */
function addOuter(gram: Float64Array, row: Float64Array, m: number): void {
  for (let a = 0; a < m; a++) {
    for (let b = a; b < m; b++) {
      gram[2 * (a * m + b)]! += row[2 * a]! * row[2 * b]! + row[2 * a + 1]! * row[2 * b + 1]!;
      gram[2 * (a * m + b) + 1]! += row[2 * a]! * row[2 * b + 1]! - row[2 * a + 1]! * row[2 * b]!;
    }
  }
}

/** Fills a Hermitian matrix below the diagonal from what is above. */
function mirror(gram: Float64Array, m: number): void {
  for (let a = 0; a < m; a++) {
    for (let b = 0; b < a; b++) {
      gram[2 * (a * m + b)] = gram[2 * (b * m + a)]!;
      gram[2 * (a * m + b) + 1] = -gram[2 * (b * m + a) + 1]!;
    }
  }
}

const INVERSE_ITERATIONS = 4;
/** Keeps the Gram matrix from being singular; relative to its trace. */
const RIDGE = 1e-15;

/** Eigenvector of the least eigenvalue of a Hermitian matrix (complex pairs, destroyed), by inverse iteration. */
function smallestEigenvector(matrix: Float64Array, m: number): Float64Array {
  let trace = 0;
  for (let i = 0; i < m; i++) trace += matrix[2 * (i * m + i)]!;
  for (let i = 0; i < m; i++) matrix[2 * (i * m + i)]! += RIDGE * trace + Number.MIN_VALUE;
  const pivots = factorDense(matrix, m);
  const vector = new Float64Array(2 * m);
  for (let i = 0; i < m; i++) vector[2 * i] = 1 + 0.1 * Math.sin(i + 1);
  for (let step = 0; step < INVERSE_ITERATIONS; step++) {
    solveDense(matrix, pivots, vector, m);
    const size = Math.sqrt(vector.reduce((sum, value) => sum + value * value, 0));
    if (!(size > 0 && size < Infinity)) break;
    for (let i = 0; i < vector.length; i++) vector[i]! /= size;
  }
  return vector;
}
