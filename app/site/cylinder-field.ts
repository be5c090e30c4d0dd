import type { FieldTerms } from '../fields/element-field.ts';
import type { ElementSet, Radiator } from '../fields/element-set.ts';
import { ETA0_OHM } from '../units/constants.ts';
import { type Box, boxOf, MomentGrid } from './moment-grid.ts';
import { angularOrder, chebyshevNodes, heightCount } from './sampling.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M, type SiteKind } from './site.ts';

/** Where the cylinder is sampled at one frequency. */
export interface CylinderPlan {
  readonly kPerM: number;
  readonly radiusM: number;
  /** Angular order N: 2N + 1 equally spaced angles from 0. */
  readonly order: number;
  /** Chebyshev heights on the antenna's travel, m. */
  readonly heightsM: Float64Array;
  /** Height the distance R0 counts from, m. */
  readonly centreZM: number;
  /** 1: direct part only (free space); 2: direct part and the part seen from the mirrored heights. */
  readonly partCount: 1 | 2;
}

/** Plan for sources within a radius about the turntable axis, at one frequency. */
export function cylinderPlan(
  kPerM: number,
  scanRadiusM: number,
  radiators: readonly Radiator[],
  site: SiteKind,
): CylinderPlan {
  const box = boxOf(radiators);
  const centreZM = box ? (box.lowM[2] + box.highM[2]) / 2 : 0;
  let sourceRadiusM = 0;
  let axisRadiusM = 0;
  for (const { elements } of radiators) {
    const { positionsM } = elements;
    for (let e = 0; e < elements.count; e++) {
      const fromAxisM = Math.hypot(positionsM[3 * e]!, positionsM[3 * e + 1]!);
      axisRadiusM = Math.max(axisRadiusM, fromAxisM);
      sourceRadiusM = Math.max(sourceRadiusM, Math.hypot(fromAxisM, positionsM[3 * e + 2]! - centreZM));
    }
  }
  return {
    kPerM,
    radiusM: scanRadiusM,
    order: angularOrder(kPerM, axisRadiusM, scanRadiusM),
    heightsM: chebyshevNodes(heightCount(kPerM, sourceRadiusM, scanRadiusM), ANTENNA_LOWEST_M, ANTENNA_HIGHEST_M),
    centreZM,
    partCount: site === 'ground-plane' ? 2 : 1,
  };
}

/** Distance from the sources' centre to a point of the cylinder, m. */
export const centreDistanceM = (plan: CylinderPlan, heightM: number): number =>
  Math.hypot(plan.radiusM, heightM - plan.centreZM);

/** Floats per sample: φ component and z component, each re then im. */
export const SAMPLE_STRIDE = 4;

/**
 * Field of each domain's sources on the cylinder's sample points with e^(−jkR0)/R0 taken out.
 *
 * Returns per domain [part][angle][height][φ re, φ im, z re, z im] in V (V/m times m). Part 0 is seen at height h, part
 * 1 at −h: by image theory the reflected field is E_φ(h) = −E_φ,direct(−h), E_z(h) = +E_z,direct(−h).
 * Formula of the element: `addElementField`. Sources in the common box are first gathered on a Chebyshev grid when that
 * grid has fewer points than there are elements.
 */
export function fieldOnCylinder(
  domains: readonly (readonly Radiator[])[],
  plan: CylinderPlan,
  box: Box | null,
  terms: FieldTerms = 'all',
): Float64Array[] {
  const shared = gatherSources(domains, plan.kPerM, box);
  const angleCount = 2 * plan.order + 1;
  const perDomain = plan.partCount * angleCount * plan.heightsM.length * SAMPLE_STRIDE;
  const out = domains.map(() => new Float64Array(perDomain));
  let at = 0;
  for (let part = 0; part < plan.partCount; part++) {
    for (let a = 0; a < angleCount; a++) {
      const angleRad = (2 * Math.PI * a) / angleCount;
      for (const heightM of plan.heightsM) {
        const zM = part === 0 ? heightM : -heightM;
        const r0M = centreDistanceM(plan, zM);
        const place = { ...antennaAt(plan, angleRad, zM, terms), referenceM: r0M, factor: r0M };
        for (const group of shared) addSample(group, place, out, at);
        at += SAMPLE_STRIDE;
      }
    }
  }
  return out;
}

/** Points that several domains may share, with the moments (6 floats a point) of each domain that has some there. */
export interface SourceGroup {
  readonly positionsM: Float64Array;
  readonly shares: readonly { readonly domain: number; readonly moments: Float64Array }[];
}

function gatherSources(
  domains: readonly (readonly Radiator[])[],
  kPerM: number,
  box: Box | null,
): readonly SourceGroup[] {
  const boxed: Radiator[][] = [];
  const loose: Radiator[][] = [];
  let boxedCount = 0;
  for (const radiators of domains) {
    const inside: Radiator[] = [];
    const outside: Radiator[] = [];
    for (const radiator of radiators) {
      if (box && isInside(radiator, box)) {
        inside.push(radiator);
        boxedCount += radiator.elements.count;
      } else outside.push(radiator);
    }
    boxed.push(inside);
    loose.push(outside);
  }
  const groups: SourceGroup[] = [];
  if (box && boxedCount > 0 && MomentGrid.pointCount(box, kPerM) < boxedCount) {
    const grid = new MomentGrid(box, kPerM);
    groups.push({
      positionsM: grid.positionsM,
      shares: boxed.flatMap((radiators, domain) =>
        radiators.length > 0 ? [{ domain, moments: grid.moments(radiators) }] : [],
      ),
    });
  } else {
    for (const [d, radiators] of boxed.entries()) loose[d]!.push(...radiators);
  }
  return [...groups, ...groupByElements(loose)];
}

/** Radiators of all domains by the elements they share; moments of one domain on the same elements add up. */
export function groupByElements(domains: readonly (readonly Radiator[])[]): SourceGroup[] {
  const byElements = new Map<ElementSet, Map<number, Float64Array>>();
  for (const [domain, radiators] of domains.entries()) {
    for (const radiator of radiators) {
      const shares = byElements.get(radiator.elements) ?? new Map<number, Float64Array>();
      byElements.set(radiator.elements, shares);
      const moments = momentsOf(radiator);
      const known = shares.get(domain);
      if (known) for (let i = 0; i < moments.length; i++) known[i]! += moments[i]!;
      else shares.set(domain, moments);
    }
  }
  return [...byElements].map(([{ positionsM }, shares]) => ({
    positionsM,
    shares: [...shares].map(([domain, moments]) => ({ domain, moments })),
  }));
}

function isInside({ elements }: Radiator, box: Box): boolean {
  const { positionsM } = elements;
  for (let i = 0; i < positionsM.length; i++) {
    const axis = i % 3;
    if (positionsM[i]! < box.lowM[axis]! - 1e-9 || positionsM[i]! > box.highM[axis]! + 1e-9) return false;
  }
  return true;
}

/** Complex vector moments of a radiator's elements: 6 floats each (x, y, z, re then im), A·m. */
function momentsOf({ elements, currentsA }: Radiator): Float64Array {
  const moments = new Float64Array(6 * elements.count);
  for (let e = 0; e < elements.count; e++) {
    for (let axis = 0; axis < 3; axis++) {
      moments[6 * e + 2 * axis] = currentsA[2 * e]! * elements.vectorsM[3 * e + axis]!;
      moments[6 * e + 2 * axis + 1] = currentsA[2 * e + 1]! * elements.vectorsM[3 * e + axis]!;
    }
  }
  return moments;
}

const QUARTERS_PER_RAD = 2 / Math.PI;
/** π/2 in two parts: the first has 33 bits, so its multiples by whole numbers are exact. */
const QUARTER_HIGH_RAD = 1.5707963267341256;
const QUARTER_LOW_RAD = 6.077100506506192e-11;
const [S3, S5, S7, S9, S11] = [-1 / 6, 1 / 120, -1 / 5040, 1 / 362880, -1 / 39916800];
const [C2, C4, C6, C8, C10, C12] = [-1 / 2, 1 / 24, -1 / 720, 1 / 40320, -1 / 3628800, 1 / 479001600];

/** Where one sample is taken. */
export interface SamplePlace {
  readonly kPerM: number;
  readonly radiusM: number;
  /** Of the angle about the turntable axis. */
  readonly cosAngle: number;
  readonly sinAngle: number;
  readonly zM: number;
  /** The field is multiplied by `factor`·e^(+jk·referenceM): R0 and R0 take e^(−jkR0)/R0 out, 0 and 1 leave it. */
  readonly referenceM: number;
  readonly factor: number;
  readonly terms: FieldTerms;
}

/** The place at an angle and height (of the mirrored part: negative); the field as it is. */
export const antennaAt = (
  { kPerM, radiusM }: Pick<CylinderPlan, 'kPerM' | 'radiusM'>,
  angleRad: number,
  zM: number,
  terms: FieldTerms,
): SamplePlace => ({
  kPerM,
  radiusM,
  cosAngle: Math.cos(angleRad),
  sinAngle: Math.sin(angleRad),
  zM,
  referenceM: 0,
  factor: 1,
  terms,
});

/**
 * Adds the φ and z components (re, im each) of sources at one place to every sharing domain's array at `at`; all terms of
 * `addElementField`, arranged for many sources: E = P n (n·m) − Q m, P = far + 3 near, Q = far + near.
 */
export function addSample(
  { positionsM, shares }: SourceGroup,
  place: SamplePlace,
  out: readonly Float64Array[],
  at: number,
): void {
  const { kPerM, radiusM, cosAngle: cosA, sinAngle: sinA, zM, referenceM } = place;
  const ox = radiusM * cosA;
  const oy = radiusM * sinA;
  const strength = (ETA0_OHM / (4 * Math.PI)) * place.factor;
  const isAll = place.terms === 'all';
  const shareCount = shares.length;
  const pointCount = positionsM.length / 3;
  for (let p = 0; p < pointCount; p++) {
    const rx = ox - positionsM[3 * p]!;
    const ry = oy - positionsM[3 * p + 1]!;
    const rz = zM - positionsM[3 * p + 2]!;
    const rM = Math.sqrt(rx * rx + ry * ry + rz * rz);
    const inverse = 1 / rM;
    const nx = rx * inverse;
    const ny = ry * inverse;
    const nz = rz * inverse;
    const nPhi = ny * cosA - nx * sinA;
    const phase = kPerM * (rM - referenceM);
    const scale = strength * inverse;
    // sin and cos of the phase together, to 1e-11: quarter turns taken out, then their series (A&S 4.3.65–66)
    const turns = Math.round(phase * QUARTERS_PER_RAD);
    const r = phase - turns * QUARTER_HIGH_RAD - turns * QUARTER_LOW_RAD;
    const r2 = r * r;
    const sinR = r * (1 + r2 * (S3 + r2 * (S5 + r2 * (S7 + r2 * (S9 + r2 * S11)))));
    const cosR = 1 + r2 * (C2 + r2 * (C4 + r2 * (C6 + r2 * (C8 + r2 * (C10 + r2 * C12)))));
    const quarter = turns & 3;
    const cosPhase = quarter === 0 ? cosR : quarter === 1 ? -sinR : quarter === 2 ? -cosR : sinR;
    const sinPhase = quarter === 0 ? sinR : quarter === 1 ? cosR : quarter === 2 ? -sinR : -cosR;
    const gRe = scale * cosPhase;
    const gIm = -scale * sinPhase;
    // far = g·jk, near = g·(1/R − j/(kR²))
    const farRe = -gIm * kPerM;
    const farIm = gRe * kPerM;
    let nearRe = 0;
    let nearIm = 0;
    if (isAll) {
      const second = (inverse * inverse) / kPerM;
      nearRe = gRe * inverse + gIm * second;
      nearIm = gIm * inverse - gRe * second;
    }
    const pRe = farRe + 3 * nearRe;
    const pIm = farIm + 3 * nearIm;
    const qRe = farRe + nearRe;
    const qIm = farIm + nearIm;
    for (let share = 0; share < shareCount; share++) {
      const { domain, moments } = shares[share]!;
      const m = 6 * p;
      const xRe = moments[m]!;
      const xIm = moments[m + 1]!;
      const yRe = moments[m + 2]!;
      const yIm = moments[m + 3]!;
      const zRe = moments[m + 4]!;
      const zIm = moments[m + 5]!;
      const dotRe = nx * xRe + ny * yRe + nz * zRe;
      const dotIm = nx * xIm + ny * yIm + nz * zIm;
      const lRe = pRe * dotRe - pIm * dotIm;
      const lIm = pRe * dotIm + pIm * dotRe;
      const phiRe = yRe * cosA - xRe * sinA;
      const phiIm = yIm * cosA - xIm * sinA;
      const target = out[domain]!;
      target[at]! += nPhi * lRe - (qRe * phiRe - qIm * phiIm);
      target[at + 1]! += nPhi * lIm - (qRe * phiIm + qIm * phiRe);
      target[at + 2]! += nz * lRe - (qRe * zRe - qIm * zIm);
      target[at + 3]! += nz * lIm - (qRe * zIm + qIm * zRe);
    }
  }
}
