import { inputError } from '../errors.ts';
import { ETA0_OHM, MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';

/** What a line's end has beyond the line itself. */
export interface PairEnd {
  /** In series with the terminal: the straight piece between trace and return, less what the ending line no longer has. */
  readonly inductanceH: number;
  /** Across the end, on the line's side of that inductance: fringing charge of the wires' ends and of the straight piece. */
  readonly capacitanceF: number;
  /** Across the terminal itself: the charge of the straight piece's two halves that has no moment. */
  readonly gapCapacitanceF: number;
}

/** The logarithm of the inductance is not taken below this: conductors so close are no thin wires. */
const LEAST_LOGARITHM = 0.1;

/**
 * End of a pair of parallel conductors that a straight piece joins to a lumped terminal in its middle.
 *
 *   ΔL = (µ0/2π) D [ln(2D/a) − 2]          ΔC = C' D [1/4 + 0.27 / ln(D/a)],   C' = √ε_eff/(Z0 c)
 *   C_gap = C' D / 4
 *
 * D: distance of the conductors' axes (m); a: radius of the wires that have this impedance in air,
 * Z0 √ε_eff = (η0/π) acosh(D/2a). ΔL is what the inductance of a rectangle exceeds that of its long sides as a line
 * (F. W. Grover, Inductance Calculations, chapter 8, rectangle of round wire; limit of a long one, µ0/π·D[…] for both
 * ends). ΔC is the electric moment beyond that of the line, per spacing: the charge drawn by the missing half-line
 * (about 1/(2 ln)) and that of the piece at ±V/2 (¼); 0.27 makes both together fit the thin-wire solution within 2 % of D
 * for D/a from 15 to 1000 (see the test). C_gap: each half of the piece holds about C'D/2 at half the arm, so half of
 * its charge makes the ¼ above and the other half no moment; it fits a load that takes a quarter of the piece (0.15 for a
 * third, 0.37 for a tenth of it), and shows only with kilohms near resonance. Lumped terminal-zone networks: R. W. P. King, Transmission-Line Theory, 1955.
 * Valid for D below λ/10 and D/a above 8; in a dielectric ΔC takes the line's own ε_eff.
 * Throws `input` unless all three are positive and finite.
 */
export function pairEnd(spacingM: number, z0Ohm: number, epsilonEff: number): PairEnd {
  for (const [name, value] of Object.entries({ spacingM, z0Ohm, epsilonEff })) {
    if (!(value > 0 && value < Infinity)) throw inputError(name, 'a positive finite number', value);
  }
  const root = Math.sqrt(epsilonEff);
  const lnSpacingPerRadius = Math.log(2 * Math.cosh((Math.PI * z0Ohm * root) / ETA0_OHM));
  const logarithm = Math.max(LEAST_LOGARITHM, Math.LN2 + lnSpacingPerRadius - 2);
  const capacitanceFPerM = root / (z0Ohm * SPEED_OF_LIGHT_M_PER_S);
  return {
    inductanceH: (MU0_H_PER_M / (2 * Math.PI)) * spacingM * logarithm,
    capacitanceF: capacitanceFPerM * spacingM * (0.25 + 0.27 / lnSpacingPerRadius),
    gapCapacitanceF: capacitanceFPerM * spacingM * 0.25,
  };
}

/**
 * The same end as a short piece of line in air, to be put between the line's end and the terminal's node: Z = √(ΔL/ΔC),
 * length c √(ΔL ΔC). It takes no room and radiates nothing itself; the terminal's current is the one that leaves it, so
 * the fringing charge stays on the line's end.
 */
export function pairEndSection({ inductanceH, capacitanceF }: Omit<PairEnd, 'gapCapacitanceF'>): {
  z0Ohm: number;
  lengthM: number;
} {
  return {
    z0Ohm: Math.sqrt(inductanceH / capacitanceF),
    lengthM: SPEED_OF_LIGHT_M_PER_S * Math.sqrt(inductanceH * capacitanceF),
  };
}
