import type { Caveat } from '../errors.ts';
import { ETA0_OHM, MU0_H_PER_M } from '../units/constants.ts';
import type { CrossSection } from './cross-section.ts';

/** Annealed copper, 20 °C. */
export const COPPER_S_PER_M = 5.8e7;

/** Skin depth δ = 1/√(π f µ0 σ), m. */
export const skinDepthM = (frequencyHz: number): number =>
  1 / Math.sqrt(Math.PI * frequencyHz * MU0_H_PER_M * COPPER_S_PER_M);

/** Surface resistance R_s = 1/(σδ), Ω per square. */
export const surfaceResistanceOhm = (frequencyHz: number): number => 1 / (COPPER_S_PER_M * skinDepthM(frequencyHz));

/** Part of the smallest dimension by which the surfaces recede in the numerical derivative. */
const RECESSION = 1e-4;

/**
 * Series resistance of trace and return by the incremental inductance rule, joined to the trace's direct-current resistance:
 *
 *   R_skin = (R_s/η0) dZ_air/dn,   R = √(R_dc² + R_skin²),   R_dc = 1/(σ w t)   (twice that for coplanar strips)
 *
 * dn: all conductor surfaces recede by it. The rule holds while the copper is thicker than about two skin depths; below
 * (`thinConductorCaveat`) the joined value is an estimate. The plane's own direct-current resistance is left out.
 * A thickness of 0 is lossless. Returns the resistance per length, Ω/m, as a function of frequency.
 * Source: H. A. Wheeler, Formulas for the skin effect, Proc. IRE 30(9), 1942; the joint is common practice.
 */
export function resistanceOhmPerM(
  section: CrossSection,
  airImpedanceOhm: (section: CrossSection) => number,
): (frequencyHz: number) => number {
  const { widthM, thicknessM } = section;
  if (thicknessM === 0) return () => 0;
  const stepM = RECESSION * Math.min(widthM, thicknessM, gapM(section));
  const slope = (airImpedanceOhm(receded(section, stepM)) - airImpedanceOhm(receded(section, -stepM))) / (2 * stepM);
  const skinPerM = slope / ETA0_OHM;
  const directOhmPerM = (section.kind === 'coplanar-strips' ? 2 : 1) / (COPPER_S_PER_M * widthM * thicknessM);
  return (frequencyHz) => Math.hypot(directOhmPerM, surfaceResistanceOhm(frequencyHz) * skinPerM);
}

/** Range where the copper is thinner than two skin depths: f < 4/(π µ0 σ t²). */
export function thinConductorCaveat(thicknessM: number): Caveat[] {
  if (thicknessM === 0) return [];
  const toHz = 4 / (Math.PI * MU0_H_PER_M * COPPER_S_PER_M * thicknessM * thicknessM);
  return [
    {
      code: 'thin-conductor',
      message:
        'copper thinner than two skin depths: its resistance is an estimate between skin effect and direct current',
      where: '',
      fromHz: 0,
      toHz,
    },
  ];
}

/** Smallest distance between conductor surfaces. */
function gapM(section: CrossSection): number {
  switch (section.kind) {
    case 'microstrip':
      return section.heightM;
    case 'stripline':
      return Math.min(section.heightAboveM, section.heightBelowM);
    case 'coplanar-strips':
      return section.centreDistanceM - section.widthM;
  }
}

function receded(section: CrossSection, byM: number): CrossSection {
  const trace = { widthM: section.widthM - 2 * byM, thicknessM: section.thicknessM - 2 * byM };
  switch (section.kind) {
    case 'microstrip':
      return { ...section, ...trace, heightM: section.heightM + 2 * byM };
    case 'stripline': {
      const heightAboveM = section.heightAboveM + 2 * byM;
      return { ...section, ...trace, heightAboveM, heightBelowM: section.heightBelowM + 2 * byM };
    }
    case 'coplanar-strips':
      return { ...section, ...trace };
  }
}
