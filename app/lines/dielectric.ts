import { inputError } from '../errors.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { type CrossSection, checkMaterial, type Dielectric } from './cross-section.ts';

/**
 * Several dielectric rows between two conductors as one: capacitors in series,
 * h/ε = Σ h_i/ε_i,   tan δ = (ε/h) Σ h_i tan δ_i / ε_i   (first order in tan δ).
 *
 * Exact for a field across the rows (wide traces). Throws `input` when there is no thickness at all.
 */
export function effectiveDielectric(rows: readonly Dielectric[]): { epsilonR: number; tanDelta: number } {
  let thicknessM = 0;
  let series = 0;
  let loss = 0;
  rows.forEach((row, i) => {
    checkMaterial(`rows[${i}]`, row);
    thicknessM += row.thicknessM;
    series += row.thicknessM / row.epsilonR;
    loss += (row.thicknessM * row.tanDelta) / row.epsilonR;
  });
  if (!(thicknessM > 0 && thicknessM < Infinity))
    throw inputError('rows', 'layers of a positive total thickness', thicknessM);
  return { epsilonR: thicknessM / series, tanDelta: loss / series };
}

/** Relative change of a permittivity in the numerical derivative. */
const EPSILON_STEP = 1e-4;

/**
 * Loss tangent of the line's shunt admittance, from the share of each dielectric in the capacitance:
 *
 *   tan δ_line = Σ tan δ_i · (ε_i/ε_eff) ∂ε_eff/∂ε_i ,   α_d = (π f/c) √ε_eff tan δ_line
 *
 * First-order perturbation, the usual filling factor: for microstrip (ε_r/ε_eff)(ε_eff − 1)/(ε_r − 1) when ε_eff is linear in ε_r.
 * Source: D. M. Pozar, Microwave Engineering, 4th ed., 2.7 and 3.8 (filling factor).
 */
export function lineTanDelta(section: CrossSection, epsilonEff: (section: CrossSection) => number): number {
  const share = (epsilonR: number, changed: (epsilonR: number) => CrossSection): number => {
    const step = EPSILON_STEP * epsilonR;
    const low = epsilonEff(changed(epsilonR));
    return ((epsilonEff(changed(epsilonR + step)) - low) / step) * (epsilonR / low);
  };
  let sum = 0;
  if (section.tanDelta > 0) sum += section.tanDelta * share(section.epsilonR, (epsilonR) => ({ ...section, epsilonR }));
  if (section.kind === 'microstrip' && section.cover && section.cover.tanDelta > 0) {
    const { cover } = section;
    sum += cover.tanDelta * share(cover.epsilonR, (epsilonR) => ({ ...section, cover: { ...cover, epsilonR } }));
  }
  return sum;
}

/** α_d of a line with this loss tangent, Np/m. */
export const dielectricNpPerM = (frequencyHz: number, epsilonEff: number, tanDelta: number): number =>
  ((Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S) * Math.sqrt(epsilonEff) * tanDelta;
