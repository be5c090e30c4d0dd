import { MU0_H_PER_M } from '../units/constants.ts';

/** Shortest barrel that is told from none, m. */
const SHORTEST_BARREL_M = 1e-6;

/**
 * Partial inductance of a via barrel as a round wire: L = (µ0 l/2π) [ln(4l/d) − ¾], at least µ0 l/(8π) for wide holes.
 * Length l and drill d in m. Source: F. W. Grover, Inductance Calculations, chapter 5 (straight round wire, from memory).
 */
export function viaInductanceH(lengthM: number, drillM: number): number {
  const l = Math.max(lengthM, SHORTEST_BARREL_M);
  return ((MU0_H_PER_M * l) / (2 * Math.PI)) * Math.max(0.25, Math.log((4 * l) / drillM) - 0.75);
}
