import type { FieldTerms } from '../fields/element-field.ts';
import type { ElementSet, Radiator } from '../fields/element-set.ts';
import { addSample, antennaAt, SAMPLE_STRIDE } from './antenna-sample.ts';
import { cylinderPlan, fieldOnCylinder } from './cylinder-field.ts';
import { findMaximum, type ScanMaximum } from './find-maximum.ts';
import type { Box } from './moment-grid.ts';
import { type Component, onPowerGrid, PowerMap } from './power-map.ts';
import type { SiteKind } from './site.ts';
import { groupByElements } from './source-groups.ts';

export interface ScanRequest {
  readonly kPerM: number;
  readonly scanRadiusM: number;
  readonly site: SiteKind;
  /** Box of the board's own elements (gathered on a grid); elements outside on lines, or one by one. */
  readonly box: Box | null;
  readonly terms?: FieldTerms;
}

/** Power maps of both components for domains that add as powers (within a domain: phasors). */
export function scanDomains(
  domains: readonly (readonly Radiator[])[],
  request: ScanRequest,
): { readonly horizontal: PowerMap; readonly vertical: PowerMap } {
  const plan = cylinderPlan(request.kPerM, request.scanRadiusM, domains.flat(), request.site);
  const horizontal = new PowerMap(plan, 'horizontal');
  const vertical = new PowerMap(plan, 'vertical');
  for (const samples of fieldOnCylinder(domains, plan, request.box, request.terms)) {
    const parts = onPowerGrid(plan, samples);
    horizontal.addDomain(parts);
    vertical.addDomain(parts);
  }
  return { horizontal, vertical };
}

/** Where each component of the domains' total is largest over turntable angle and antenna height. */
export function scanMaxima(
  domains: readonly (readonly Radiator[])[],
  request: ScanRequest,
): Record<Component, ScanMaximum> {
  const { horizontal, vertical } = scanDomains(domains, request);
  return { horizontal: findMaximum(horizontal), vertical: findMaximum(vertical) };
}

/**
 * One component (complex, V/m) of each domain's field at an antenna position, by the plain sum over elements and, on the
 * ground-plane site, their images (E_φ reversed, E_z kept, seen from the mirrored height).
 */
export function fieldsAtAntenna(
  domains: readonly (readonly Radiator[])[],
  component: Component,
  angleRad: number,
  heightM: number,
  { kPerM, scanRadiusM, site, terms = 'all' }: ScanRequest,
): (readonly [re: number, im: number])[] {
  const groups = groupByElements(domains);
  const offset = component === 'horizontal' ? 0 : 2;
  const totals = domains.map((): [number, number] => [0, 0]);
  for (const sign of site === 'ground-plane' ? [1, -1] : [1]) {
    const samples = domains.map(() => new Float64Array(SAMPLE_STRIDE));
    const place = antennaAt({ kPerM, radiusM: scanRadiusM }, angleRad, sign * heightM, terms);
    for (const group of groups) addSample(group, place, samples, 0);
    const kept = component === 'horizontal' ? sign : 1;
    for (const [d, sample] of samples.entries()) {
      totals[d]![0] += kept * sample[offset]!;
      totals[d]![1] += kept * sample[offset + 1]!;
    }
  }
  return totals;
}

/** The field of one domain's radiators, as `fieldsAtAntenna`. */
export const fieldAtAntenna = (
  radiators: readonly Radiator[],
  component: Component,
  angleRad: number,
  heightM: number,
  request: ScanRequest,
): readonly [re: number, im: number] => fieldsAtAntenna([radiators], component, angleRad, heightM, request)[0]!;

/** The field of each element of a set for 1 A on it, alone: re, im per element, V/m per A. */
export function unitFieldsAtAntenna(
  elements: ElementSet,
  component: Component,
  angleRad: number,
  heightM: number,
  { kPerM, scanRadiusM, site, terms = 'all' }: ScanRequest,
): Float64Array {
  const out = new Float64Array(2 * elements.count);
  const offset = component === 'horizontal' ? 0 : 2;
  const sample = new Float64Array(SAMPLE_STRIDE);
  const samples = [sample];
  const moments = new Float64Array(6);
  const positionsM = new Float64Array(3);
  const group = { positionsM, shares: [{ domain: 0, moments }] };
  for (const sign of site === 'ground-plane' ? [1, -1] : [1]) {
    const place = antennaAt({ kPerM, radiusM: scanRadiusM }, angleRad, sign * heightM, terms);
    const kept = component === 'horizontal' ? sign : 1;
    for (let e = 0; e < elements.count; e++) {
      for (let axis = 0; axis < 3; axis++) {
        moments[2 * axis] = elements.vectorsM[3 * e + axis]!;
        positionsM[axis] = elements.positionsM[3 * e + axis]!;
      }
      sample.fill(0);
      addSample(group, place, samples, 0);
      out[2 * e]! += kept * sample[offset]!;
      out[2 * e + 1]! += kept * sample[offset + 1]!;
    }
  }
  return out;
}
