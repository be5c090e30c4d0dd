import type { Caveat } from '../errors.ts';
import { inputError } from '../errors.ts';

/** A dielectric layer: thickness, relative permittivity, loss tangent. */
export interface Dielectric {
  readonly thicknessM: number;
  readonly epsilonR: number;
  readonly tanDelta: number;
}

/** Trace over one plane, air (or a cover) above. */
export interface Microstrip {
  readonly kind: 'microstrip';
  readonly widthM: number;
  readonly thicknessM: number;
  /** From the plane to the trace's lower surface. */
  readonly heightM: number;
  readonly epsilonR: number;
  readonly tanDelta: number;
  /** Dielectric on top of trace and substrate (solder mask, or the layers above an embedded trace), counted from the trace's upper surface. */
  readonly cover?: Dielectric;
}

/** Trace between two planes. Heights: dielectric from the trace's surface to the plane above and below. */
export interface Stripline {
  readonly kind: 'stripline';
  readonly widthM: number;
  readonly thicknessM: number;
  readonly heightAboveM: number;
  readonly heightBelowM: number;
  readonly epsilonR: number;
  readonly tanDelta: number;
}

/** Trace and its return side by side, of equal width, on a substrate of thickness `substrateM` (0: in air), no plane. */
export interface CoplanarStrips {
  readonly kind: 'coplanar-strips';
  readonly widthM: number;
  readonly thicknessM: number;
  readonly centreDistanceM: number;
  readonly epsilonR: number;
  readonly tanDelta: number;
  readonly substrateM: number;
}

export type CrossSection = Microstrip | Stripline | CoplanarStrips;

/** A uniform line in the quasi-TEM approximation: γ = α(f) + jω√ε_eff / c. */
export interface Line {
  readonly z0Ohm: number;
  readonly epsilonEff: number;
  /** Attenuation of conductor and dielectric, Np/m. */
  alphaNpPerM(frequencyHz: number): number;
  /** Where the formulas are outside their range; `where` is empty. */
  readonly caveats: readonly Caveat[];
}

/** Throws `input` when a dimension is not a positive finite number, or a permittivity below 1. */
export function checkSection(section: CrossSection): void {
  positive('widthM', section.widthM);
  notNegative('thicknessM', section.thicknessM);
  checkMaterial('section', section);
  switch (section.kind) {
    case 'microstrip':
      positive('heightM', section.heightM);
      if (section.cover) {
        notNegative('cover.thicknessM', section.cover.thicknessM);
        checkMaterial('section.cover', section.cover);
      }
      return;
    case 'stripline':
      positive('heightAboveM', section.heightAboveM);
      positive('heightBelowM', section.heightBelowM);
      return;
    case 'coplanar-strips':
      notNegative('substrateM', section.substrateM);
      if (!(section.centreDistanceM > section.widthM && section.centreDistanceM < Infinity)) {
        throw inputError('section.centreDistanceM', 'greater than the width', section.centreDistanceM);
      }
  }
}

export function checkMaterial(path: string, material: { readonly epsilonR: number; readonly tanDelta?: number }): void {
  if (!(material.epsilonR >= 1 && material.epsilonR < Infinity)) {
    throw inputError(`${path}.epsilonR`, 'a finite number of at least 1', material.epsilonR);
  }
  const { tanDelta = 0 } = material;
  if (!(tanDelta >= 0 && tanDelta < Infinity)) throw inputError(`${path}.tanDelta`, 'zero or more', tanDelta);
}

function positive(field: string, lengthM: number): void {
  if (!(lengthM > 0 && lengthM < Infinity)) throw inputError(`section.${field}`, 'a positive finite length', lengthM);
}

function notNegative(field: string, lengthM: number): void {
  if (!(lengthM >= 0 && lengthM < Infinity))
    throw inputError(`section.${field}`, 'a finite length of at least 0', lengthM);
}
