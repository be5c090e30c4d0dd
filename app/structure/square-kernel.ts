/**
 * Closed forms of the mean of 1/R between the patches of the structure: the static part of every partial inductance and
 * potential coefficient.
 */

const ATAN_LIMIT_M = 1e-15;

/** x·asinh(y/√(x² + z²)), 0 at x = 0 (its limit). */
const xAsinh = (x: number, y: number, z2: number): number => (x === 0 ? 0 : x * Math.asinh(y / Math.sqrt(x * x + z2)));

/**
 * Mean of 1/R over two equal parallel squares (side a) whose centres are (dx, dy, dz) apart, sides along x and y, 1/m.
 * Second differences in x and y of
 *   F = (y² − z²)/2 · x ln(x + ρ) + (x² − z²)/2 · y ln(y + ρ) − (x² + y² − 2z²) ρ/6 − x y z atan(xy/(zρ)),
 * beyond 12 sides the first terms of its multipole series (relative error below 1e-6 there).
 * Source: C. Hoer, C. Love, J. Res. NBS 69C, 1965, eq. 1; A. E. Ruehli, P. A. Brennan, IEEE Trans. MTT 21(2), 1973.
 */
export function meanInverseOfSquares(dx: number, dy: number, dz: number, a: number): number {
  const r2 = dx * dx + dy * dy + dz * dz;
  if (r2 > 144 * a * a) {
    // 1 + (a²/12)(∂xx + ∂yy) + (a⁴/180·…): the fourth-order term is below 1e-6 here.
    const planar = 3 * (dx * dx + dy * dy) - 2 * r2;
    return (1 + ((a * a) / 12) * (planar / (r2 * r2))) / Math.sqrt(r2);
  }
  let sum = 0;
  for (let m = -1; m <= 1; m++) {
    for (let n = -1; n <= 1; n++) {
      const weight = (m === 0 ? -2 : 1) * (n === 0 ? -2 : 1);
      sum += weight * squarePairIntegral(dx + m * a, dy + n * a, dz);
    }
  }
  return sum / (a * a * a * a);
}

function squarePairIntegral(x: number, y: number, z: number): number {
  const z2 = z * z;
  const rho = Math.sqrt(x * x + y * y + z2);
  // ln(x + ρ) may be replaced by asinh(x/√(y² + z²)): the rest is linear in x and drops out of the second difference.
  const inX = ((y * y - z2) / 2) * (y === 0 && z === 0 ? 0 : x * Math.asinh(x / Math.sqrt(y * y + z2)));
  const inY = ((x * x - z2) / 2) * (x === 0 && z === 0 ? 0 : y * Math.asinh(y / Math.sqrt(x * x + z2)));
  const angle = Math.abs(z) < ATAN_LIMIT_M ? 0 : x * y * z * Math.atan((x * y) / (z * rho));
  return inX + inY - ((x * x + y * y - 2 * z2) * rho) / 6 - angle;
}

/**
 * Mean of 1/R from a point to a square (side a) in the plane z = 0 centred at the origin, 1/m.
 * Source: D. R. Wilton et al., IEEE Trans. AP 32(3), 1984 (uniform source on a polygon), for a square.
 */
export function meanInverseToSquare(x: number, y: number, z: number, a: number): number {
  const z2 = z * z;
  let sum = 0;
  for (let m = -1; m <= 1; m += 2) {
    for (let n = -1; n <= 1; n += 2) {
      const u = x + (m * a) / 2;
      const v = y + (n * a) / 2;
      let corner = xAsinh(u, v, z2) + xAsinh(v, u, z2);
      if (Math.abs(z) >= ATAN_LIMIT_M) corner -= z * Math.atan((u * v) / (z * Math.sqrt(u * u + v * v + z2)));
      sum += m * n * corner;
    }
  }
  return sum / (a * a);
}
