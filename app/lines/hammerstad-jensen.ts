import { ETA0_OHM } from '../units/constants.ts';

/**
 * Microstrip closed forms, static. u = w/h, thickness as t/h.
 * Source: E. Hammerstad, Ø. Jensen, Accurate models for microstrip computer-aided design, IEEE MTT-S Digest 1980, 407–409.
 * Stated there for 0.01 ≤ u ≤ 100, ε_r ≤ 128: Z0 within 0.03 % (u ≤ 1000), ε_eff within 0.2 %.
 */

/** Impedance of a thin strip in air, Ω: (η0/2π) ln[F/u + √(1 + 4/u²)]. */
export function thinAirImpedanceOhm(u: number): number {
  const f = 6 + (2 * Math.PI - 6) * Math.exp(-((30.666 / u) ** 0.7528));
  return (ETA0_OHM / (2 * Math.PI)) * Math.log(f / u + Math.sqrt(1 + 4 / (u * u)));
}

/** Effective permittivity of a thin strip on a substrate, air above. `epsilonR` is 1 or more. */
export function thinEpsilonEff(u: number, epsilonR: number): number {
  return (epsilonR + 1) / 2 + ((epsilonR - 1) / 2) * (1 + 10 / u) ** (-exponentOfU(u) * exponentOfEpsilon(epsilonR));
}

/** a(u) of ε_eff. */
export const exponentOfU = (u: number): number =>
  1 + Math.log((u ** 4 + (u / 52) ** 2) / (u ** 4 + 0.432)) / 49 + Math.log(1 + (u / 18.1) ** 3) / 18.7;

/** b(ε_r) of ε_eff. */
export const exponentOfEpsilon = (epsilonR: number): number => 0.564 * ((epsilonR - 0.9) / (epsilonR + 3)) ** 0.053;

/** Widening of a strip by its thickness, as a part of h: in a uniform dielectric, and on a substrate under air. */
export function widening(u: number, thickness: number, epsilonR: number): { uniform: number; mixed: number } {
  if (thickness === 0) return { uniform: 0, mixed: 0 };
  const coth = 1 / Math.tanh(Math.sqrt(6.517 * u));
  const uniform = (thickness / Math.PI) * Math.log(1 + (4 * Math.E) / (thickness * coth * coth));
  return { uniform, mixed: (uniform * (1 + 1 / Math.cosh(Math.sqrt(epsilonR - 1)))) / 2 };
}

/** Impedance in air of a strip of any thickness, Ω. */
export const airImpedanceOhm = (u: number, thickness: number): number =>
  thinAirImpedanceOhm(u + widening(u, thickness, 1).uniform);

/** Effective permittivity with thickness: ε_e(u_r) [Z01(u_1) / Z01(u_r)]². */
export function epsilonEffOf(u: number, thickness: number, epsilonR: number): number {
  const { uniform, mixed } = widening(u, thickness, epsilonR);
  const ratio = thinAirImpedanceOhm(u + uniform) / thinAirImpedanceOhm(u + mixed);
  return thinEpsilonEff(u + mixed, epsilonR) * ratio * ratio;
}
