import { addElementField, FIELD_STRIDE, type FieldTerms } from '../fields/element-field.ts';
import type { Radiator } from '../fields/element-set.ts';
import { cylinderPlan, fieldOnCylinder } from './cylinder-field.ts';
import { findMaximum, type ScanMaximum } from './find-maximum.ts';
import type { Box } from './moment-grid.ts';
import { type Component, PowerMap } from './power-map.ts';
import type { SiteKind } from './site.ts';

export interface ScanRequest {
  readonly kPerM: number;
  readonly scanRadiusM: number;
  readonly site: SiteKind;
  /** Box of the board's own elements (gathered on a grid); elements outside are taken one by one. */
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
    horizontal.addDomain(samples);
    vertical.addDomain(samples);
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
 * One component (complex, V/m) of radiators' field at an antenna position, by the plain sum over elements and, on the
 * ground-plane site, their images (E_φ reversed, E_z kept, seen from the mirrored height).
 */
export function fieldAtAntenna(
  radiators: readonly Radiator[],
  component: Component,
  angleRad: number,
  heightM: number,
  request: ScanRequest,
): [re: number, im: number] {
  const cosA = Math.cos(angleRad);
  const sinA = Math.sin(angleRad);
  const sum: [number, number] = [0, 0];
  const e = new Float64Array(FIELD_STRIDE);
  for (let part = 0; part < (request.site === 'ground-plane' ? 2 : 1); part++) {
    e.fill(0);
    addFieldAt(radiators, request, request.scanRadiusM * cosA, request.scanRadiusM * sinA, heightM * (1 - 2 * part), e);
    const sign = part === 1 && component === 'horizontal' ? -1 : 1;
    sum[0] += sign * (component === 'vertical' ? e[4]! : e[2]! * cosA - e[0]! * sinA);
    sum[1] += sign * (component === 'vertical' ? e[5]! : e[3]! * cosA - e[1]! * sinA);
  }
  return sum;
}

function addFieldAt(
  radiators: readonly Radiator[],
  { kPerM, terms }: ScanRequest,
  xM: number,
  yM: number,
  zM: number,
  out: Float64Array,
): void {
  for (const { elements, currentsA } of radiators) {
    const { positionsM, vectorsM, count } = elements;
    for (let i = 0; i < count; i++) {
      const re = currentsA[2 * i]!;
      const im = currentsA[2 * i + 1]!;
      if (re === 0 && im === 0) continue;
      const vx = vectorsM[3 * i]!;
      const vy = vectorsM[3 * i + 1]!;
      const vz = vectorsM[3 * i + 2]!;
      addElementField(
        out,
        null,
        0,
        kPerM,
        xM - positionsM[3 * i]!,
        yM - positionsM[3 * i + 1]!,
        zM - positionsM[3 * i + 2]!,
        [re * vx, re * vy, re * vz],
        [im * vx, im * vy, im * vz],
        terms,
      );
    }
  }
}
