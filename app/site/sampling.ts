import type { Extent } from './extent.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from './site.ts';

/**
 * How finely a field on the antenna's cylinder must be sampled. With e^(−jkR0)/R0 taken out, the field of sources within
 * radius a is band-limited in angle and smooth in height.
 * Source: O. M. Bucci, G. Franceschetti, On the degrees of freedom of scattered fields, IEEE Trans. AP 37(7), 1989.
 */

/** Highest angular harmonic that matters: ka + max(5, 9/ln(D/a)), sources within radius a about the axis, seen from distance D > a. */
export function angularOrder(kPerM: number, radiusM: number, distanceM: number): number {
  if (radiusM <= 0) return 2;
  return Math.ceil(kPerM * radiusM + 1.2 * Math.cbrt(kPerM * radiusM) + Math.max(5, 9 / Math.log(distanceM / radiusM)));
}

/** Error of the interpolation over height that is allowed, relative. */
const ALLOWED_ERROR = 1e-5;
/** Heights at which the phase's slope is looked at. */
const SLOPE_PLACES = 9;

/**
 * Chebyshev heights over the antenna's travel (1–4 m) and its mirror image for sources within an extent, R0 counted from
 * `centreZM` on the axis.
 *
 * The phase k(R − R0) changes by at most κ to either side of the middle, κ = k · half the travel · the largest slope of R − R0, taken
 * at the extent's corners (the slope is monotonic in the source's place): κ + 3∛κ + 4 points, as in `gridCount`. Where that is
 * more, 1/R of the nearest source asks for ρ^(−n) beyond κ, ρ = y + √(1 + y²), y = its distance over half the travel.
 * Source: L. N. Trefethen, Approximation Theory and Approximation Practice, chapter 3 and theorem 8.2.
 */
export function heightCount(kPerM: number, extent: Extent, centreZM: number, antennaM: number): number {
  const { axisRadiusM, lowZM, highZM } = extent;
  const half = (ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M) / 2;
  let steepest = 0;
  for (let i = 0; i < SLOPE_PLACES; i++) {
    const heightM = ANTENNA_LOWEST_M + (2 * half * i) / (SLOPE_PLACES - 1);
    for (const zM of [heightM, -heightM]) {
      const own = slope(antennaM, zM - centreZM);
      for (const sourceZM of [lowZM, highZM]) {
        for (const awayM of [antennaM - axisRadiusM, antennaM + axisRadiusM]) {
          steepest = Math.max(steepest, Math.abs(slope(awayM, zM - sourceZM) - own));
        }
      }
    }
  }
  const kappa = kPerM * half * steepest;
  const y = Math.max(antennaM - axisRadiusM, 1e-3 * antennaM) / half;
  const forDistance = -Math.log(ALLOWED_ERROR) / Math.log(y + Math.sqrt(1 + y * y));
  return Math.ceil(kappa + Math.max(3 * Math.cbrt(kappa) + 4, forDistance));
}

/** dR/dz at the height `upM` above a source `awayM` away. */
const slope = (awayM: number, upM: number): number => upM / Math.hypot(awayM, upM);

/** Chebyshev points of the first kind on [low, high]. */
export function chebyshevNodes(count: number, low: number, high: number): Float64Array {
  return Float64Array.from(
    { length: count },
    (_, i) => (low + high) / 2 - ((high - low) / 2) * Math.cos((Math.PI * (i + 0.5)) / count),
  );
}

const barycentric = new Map<number, Float64Array>();

/** (−1)^i sin(π(i + ½)/count): what the weights share at every place. */
function barycentricFactors(count: number): Float64Array {
  let factors = barycentric.get(count);
  if (!factors) {
    factors = Float64Array.from(
      { length: count },
      (_, i) => (1 - 2 * (i % 2)) * Math.sin((Math.PI * (i + 0.5)) / count),
    );
    barycentric.set(count, factors);
  }
  return factors;
}

/**
 * Barycentric Lagrange weights at `x` for Chebyshev points of the first kind: value(x) = Σ out[i]·value(node i).
 * Source: J.-P. Berrut, L. N. Trefethen, Barycentric Lagrange interpolation, SIAM Review 46(3), 2004, eq. 5.3.
 */
export function chebyshevWeights(nodes: Float64Array, x: number, out: Float64Array, offset = 0): void {
  const count = nodes.length;
  const factors = barycentricFactors(count);
  let sum = 0;
  for (let i = 0; i < count; i++) {
    const difference = x - nodes[i]!;
    if (difference === 0) {
      out.fill(0, offset, offset + count);
      out[offset + i] = 1;
      return;
    }
    const weight = factors[i]! / difference;
    out[offset + i] = weight;
    sum += weight;
  }
  for (let i = 0; i < count; i++) out[offset + i]! /= sum;
}

/**
 * Trigonometric interpolation weights at `angleRad` for 2·order + 1 equally spaced angles from 0:
 * the Dirichlet kernel sin((2N+1)x/2) / ((2N+1) sin(x/2)). Source: A. Zygmund, Trigonometric Series, chapter X.
 */
export function trigonometricWeights(order: number, angleRad: number, out: Float64Array, offset = 0): void {
  const count = 2 * order + 1;
  for (let i = 0; i < count; i++) {
    const half = (angleRad - (2 * Math.PI * i) / count) / 2;
    const denominator = count * Math.sin(half);
    out[offset + i] =
      Math.abs(denominator) < 1e-12 ? Math.cos(count * half) / Math.cos(half) : Math.sin(count * half) / denominator;
  }
}
