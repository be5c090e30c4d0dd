/**
 * K(k)/K(k′), k′ = √(1 − k²), K the complete elliptic integral of the first kind (modulus convention), by the
 * arithmetic–geometric mean: K(k) = π / (2 AGM(1, k′)).
 *
 * Both moduli are arguments, each must be accurate where it is small (1 − k² would lose it). k in 0…1.
 * Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, 17.3, 17.6.
 */
export function ellipticRatio(k: number, kComplement: number): number {
  return arithmeticGeometricMean(1, k) / arithmeticGeometricMean(1, kComplement);
}

function arithmeticGeometricMean(one: number, other: number): number {
  let a = one;
  let g = other;
  // Quadratic convergence: from g = 1e-300 it takes 13 steps.
  for (let step = 0; step < 40 && Math.abs(a - g) > 1e-15 * a; step++) {
    const mean = (a + g) / 2;
    g = Math.sqrt(a * g);
    a = mean;
  }
  return a;
}
