import type { FieldTerms } from '../fields/element-field.ts';
import type { Radiator } from '../fields/element-set.ts';
import { addSample, antennaAt, SAMPLE_STRIDE } from './antenna-sample.ts';
import { extentOf, extentOfPoints } from './extent.ts';
import type { Box } from './moment-grid.ts';
import { resample, type Sampling } from './resample.ts';
import { angularOrder, chebyshevNodes, heightCount } from './sampling.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M, type SiteKind } from './site.ts';
import { gatherSources, type SourceGroup } from './source-groups.ts';

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

/** Plan for the sources' extent about the turntable axis, at one frequency. */
export function cylinderPlan(
  kPerM: number,
  scanRadiusM: number,
  radiators: readonly Radiator[],
  site: SiteKind,
): CylinderPlan {
  const extent = extentOf(radiators.map(({ elements }) => elements));
  const centreZM = (extent.lowZM + extent.highZM) / 2;
  const count = heightCount(kPerM, extent, centreZM, scanRadiusM);
  return {
    kPerM,
    radiusM: scanRadiusM,
    order: angularOrder(kPerM, extent.axisRadiusM, scanRadiusM),
    heightsM: chebyshevNodes(count, ANTENNA_LOWEST_M, ANTENNA_HIGHEST_M),
    centreZM,
    partCount: site === 'ground-plane' ? 2 : 1,
  };
}

/** Angles and heights of a plan. */
export const samplingOf = ({ order, heightsM }: CylinderPlan): Sampling => ({
  angleCount: 2 * order + 1,
  heightCount: heightsM.length,
});

/** Distance from the sources' centre to a point of the cylinder, m. */
export const centreDistanceM = (plan: CylinderPlan, heightM: number): number =>
  Math.hypot(plan.radiusM, heightM - plan.centreZM);

/**
 * Field of each domain's sources on the cylinder's sample points with e^(−jkR0)/R0 taken out.
 *
 * Returns per domain [part][angle][height][φ re, φ im, z re, z im] in V (V/m times m). Part 0 is seen at height h, part
 * 1 at −h: by image theory the reflected field is E_φ(h) = −E_φ,direct(−h), E_z(h) = +E_z,direct(−h).
 * Formula of the element: `addElementField`. Sources are first gathered (`gatherSources`); those near the axis are sampled as
 * finely as they need and interpolated to the plan's places.
 */
export function fieldOnCylinder(
  domains: readonly (readonly Radiator[])[],
  plan: CylinderPlan,
  box: Box | null,
  terms: FieldTerms = 'all',
): Float64Array[] {
  const full = samplingOf(plan);
  const perPart = full.angleCount * full.heightCount * SAMPLE_STRIDE;
  const out = domains.map(() => new Float64Array(plan.partCount * perPart));
  for (const group of gatherSources(domains, plan.kPerM, box, plan.radiusM)) {
    const own = planOf(group, plan);
    const sampling = samplingOf(own);
    if (sampling.angleCount * sampling.heightCount >= full.angleCount * full.heightCount) {
      addGroup(group, plan, terms, out);
      continue;
    }
    const ownPart = sampling.angleCount * sampling.heightCount * SAMPLE_STRIDE;
    const samples = domains.map((_, domain) =>
      group.shares.some((share) => share.domain === domain)
        ? new Float64Array(plan.partCount * ownPart)
        : new Float64Array(0),
    );
    addGroup(group, own, terms, samples);
    for (const { domain } of group.shares) {
      for (let part = 0; part < plan.partCount; part++) {
        const fine = resample(samples[domain]!, part * ownPart, SAMPLE_STRIDE, sampling, full);
        const target = out[domain]!;
        for (let i = 0; i < perPart; i++) target[part * perPart + i]! += fine[i]!;
      }
    }
  }
  return out;
}

/** The plan as coarse as a group allows: R0 counts from the same place. */
function planOf({ positionsM }: SourceGroup, plan: CylinderPlan): CylinderPlan {
  const extent = extentOfPoints(positionsM);
  const count = heightCount(plan.kPerM, extent, plan.centreZM, plan.radiusM);
  return {
    ...plan,
    order: Math.min(plan.order, angularOrder(plan.kPerM, extent.axisRadiusM, plan.radiusM)),
    heightsM: count < plan.heightsM.length ? chebyshevNodes(count, ANTENNA_LOWEST_M, ANTENNA_HIGHEST_M) : plan.heightsM,
  };
}

/** Adds a group's field at every place of a plan to its domains' samples. */
function addGroup(group: SourceGroup, plan: CylinderPlan, terms: FieldTerms, out: readonly Float64Array[]): void {
  const { angleCount } = samplingOf(plan);
  let at = 0;
  for (let part = 0; part < plan.partCount; part++) {
    for (let a = 0; a < angleCount; a++) {
      const angleRad = (2 * Math.PI * a) / angleCount;
      for (const heightM of plan.heightsM) {
        const zM = part === 0 ? heightM : -heightM;
        const r0M = centreDistanceM(plan, zM);
        addSample(group, { ...antennaAt(plan, angleRad, zM, terms), referenceM: r0M, factor: r0M }, out, at);
        at += SAMPLE_STRIDE;
      }
    }
  }
}
