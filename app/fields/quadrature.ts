/** Gauss–Legendre rule on [0, 1]: nodes and weights that sum to 1. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, QuadratureRule>();

/**
 * Gauss–Legendre rule with `count` points, mapped to [0, 1]; exact for polynomials of degree 2·count − 1.
 * Nodes by Newton's method on the Legendre polynomial. Source: Abramowitz & Stegun, 25.4.29–30.
 */
export function gaussLegendre(count: number): QuadratureRule {
  const known = rules.get(count);
  if (known) return known;
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let derivative = 1;
    for (let step = 0; step < 100; step++) {
      let previous = 1;
      let current = x;
      for (let degree = 2; degree <= count; degree++) {
        const next = ((2 * degree - 1) * x * current - (degree - 1) * previous) / degree;
        previous = current;
        current = next;
      }
      derivative = (count * (x * current - previous)) / (x * x - 1);
      const change = current / derivative;
      x -= change;
      if (Math.abs(change) < 1e-15) break;
    }
    nodes[count - 1 - i] = (1 + x) / 2;
    weights[count - 1 - i] = 1 / ((1 - x * x) * derivative * derivative);
  }
  const rule = { nodes, weights };
  rules.set(count, rule);
  return rule;
}

/** Relative error of the quadrature that is allowed: 1e-5 keeps 0.01 dB where parts of a net cancel a hundredfold. */
const ALLOWED_ERROR = 1e-5;

/**
 * Fewest Gauss–Legendre points for a current wave on a straight piece seen from `distanceM` or farther.
 *
 * The integrand turns by at most θ = (L/2)(k_line + k) to either side of the middle; the mean of e^(jθx) on [−1, 1] is
 * wrong by θ^(2n) (n!)⁴ 2^(2n) / ((2n+1) [(2n)!]³). The 1/R terms add (L/2R)^(2n)-like errors, bounded by the same rule
 * with θ replaced by 3L/(2R).
 * Source of the error term: Abramowitz & Stegun, 25.4.30.
 */
export function quadraturePoints(lengthM: number, kLinePerM: number, kPerM: number, distanceM: number): number {
  const theta = (lengthM / 2) * Math.max(kLinePerM + kPerM, 3 / distanceM);
  let term = 1; // θ^(2n) (n!)⁴ 2^(2n) / [(2n)!]³
  for (let n = 1; n <= 64; n++) {
    term *= (theta * theta * n ** 4 * 4) / ((2 * n - 1) * 2 * n) ** 3;
    if (term / (2 * n + 1) < ALLOWED_ERROR) return n;
  }
  return 64;
}
