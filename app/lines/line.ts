import type { Caveat } from '../errors.ts';
import { resistanceOhmPerM, thinConductorCaveat } from './conductor-loss.ts';
import { coplanarAirImpedanceOhm, coplanarEpsilonEff } from './coplanar-strips.ts';
import { type CrossSection, checkSection, type Line } from './cross-section.ts';
import { dielectricNpPerM, lineTanDelta } from './dielectric.ts';
import { microstripAirImpedanceOhm, microstripEpsilonEff } from './microstrip.ts';
import { striplineAirImpedanceOhm } from './stripline.ts';
import { validityCaveats } from './validity.ts';

/** Lines kept; boards have tens of different sections, and thousands of segments that share them. */
const MOST_KEPT = 500;
const kept = new Map<string, Line>();

/**
 * Line of a cross-section, quasi-static (no dispersion):
 *
 *   Z0 = Z_air/√ε_eff,   α = R(f)/(2 Z0) + (π f/c) √ε_eff tan δ_line
 *
 * The conductor's internal inductance is left out. Caveats carry what is outside the formulas' range; the range in
 * frequency is `lineNotTemCaveat`. A new section costs up to a millisecond (covered, coplanar); results are kept.
 * Throws `input` when a dimension or a material is impossible.
 * Source: named in microstrip.ts, stripline.ts, coplanar-strips.ts, conductor-loss.ts, dielectric.ts.
 */
export function lineOf(section: CrossSection): Line {
  const key = JSON.stringify(section);
  const known = kept.get(key);
  if (known) return known;
  const line = newLine(section);
  if (kept.size >= MOST_KEPT) kept.clear();
  kept.set(key, line);
  return line;
}

function newLine(section: CrossSection): Line {
  checkSection(section);
  const epsilonEff = epsilonEffOf(section);
  const z0Ohm = airImpedanceOhm(section) / Math.sqrt(epsilonEff);
  const resistance = resistanceOhmPerM(section, airImpedanceOhm);
  const tanDelta = lineTanDelta(section, epsilonEffOf);
  const caveats: readonly Caveat[] = [...validityCaveats(section), ...thinConductorCaveat(section.thicknessM)];
  return {
    z0Ohm,
    epsilonEff,
    alphaNpPerM: (frequencyHz) =>
      resistance(frequencyHz) / (2 * z0Ohm) + dielectricNpPerM(frequencyHz, epsilonEff, tanDelta),
    caveats,
  };
}

function airImpedanceOhm(section: CrossSection): number {
  switch (section.kind) {
    case 'microstrip':
      return microstripAirImpedanceOhm(section);
    case 'stripline':
      return striplineAirImpedanceOhm(section);
    case 'coplanar-strips':
      return coplanarAirImpedanceOhm(section);
  }
}

function epsilonEffOf(section: CrossSection): number {
  switch (section.kind) {
    case 'microstrip':
      return microstripEpsilonEff(section);
    case 'stripline':
      return section.epsilonR;
    case 'coplanar-strips':
      return coplanarEpsilonEff(section);
  }
}
