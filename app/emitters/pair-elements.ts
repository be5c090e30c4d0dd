import type { Point3M, PointM } from '../board/board.ts';
import { gaussLegendre, quadraturePoints } from '../fields/quadrature.ts';
import { effectiveDielectric } from '../lines/dielectric.ts';
import type { ReferencePlane } from '../returns/reference.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import type { RuleCollector } from './rule-collector.ts';

/** A section of a net with where it runs and what it returns in. */
export interface PlacedSection {
  readonly index: number;
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly lengthM: number;
  readonly z0Ohm: number;
  readonly epsilonEff: number;
  readonly planes: readonly ReferencePlane[];
}

/** Nearest the antenna can come to an element, for the choice of quadrature points, m. */
const NEAREST_ANTENNA_M = 1;

/** Gauss–Legendre points for a section up to the highest frequency. */
export function pointsFor(lengthM: number, epsilonEff: number, maxHz: number): number {
  const kPerM = (2 * Math.PI * maxHz) / SPEED_OF_LIGHT_M_PER_S;
  return quadraturePoints(lengthM, kPerM * Math.sqrt(epsilonEff), kPerM, NEAREST_ANTENNA_M);
}

/**
 * Trace and return of one section as current elements (physics 5.1, 5.3, 5.7): for each reference plane the share of the
 * current on the trace's facing surface, its opposite on the plane's facing surface straight under it, and the
 * dielectric's polarisation current jω C' (1 − 1/ε_r) V ds from trace to plane, C' = √ε_eff/(Z0 c).
 */
export function addPairElements(collector: RuleCollector, section: PlacedSection, maxHz: number): void {
  const { fromM, toM, lengthM } = section;
  const dx = toM[0] - fromM[0];
  const dy = toM[1] - fromM[1];
  const rule = gaussLegendre(pointsFor(lengthM, section.epsilonEff, maxHz));
  const capacitanceFPerM = Math.sqrt(section.epsilonEff) / (section.z0Ohm * SPEED_OF_LIGHT_M_PER_S);
  for (const plane of section.planes) {
    const { epsilonR } = effectiveDielectric(plane.rows);
    const boundShare = plane.share * capacitanceFPerM * (1 - 1 / epsilonR);
    for (let i = 0; i < rule.nodes.length; i++) {
      const s = rule.nodes[i]!;
      const weight = rule.weights[i]!;
      const atM = s * lengthM;
      const x = fromM[0] + s * dx;
      const y = fromM[1] + s * dy;
      const along: Point3M = [weight * dx, weight * dy, 0];
      const current = { kind: 'along', section: section.index, atM } as const;
      collector.add([x, y, plane.traceZM], along, { ...current, factor: plane.share });
      collector.add([x, y, plane.planeZM], along, { ...current, factor: -plane.share });
      if (boundShare !== 0) {
        const middle: Point3M = [x, y, (plane.traceZM + plane.planeZM) / 2];
        collector.add(middle, [0, 0, weight * lengthM * (plane.planeZM - plane.traceZM)], {
          kind: 'shunt',
          section: section.index,
          atM,
          factor: boundShare,
        });
      }
    }
  }
}
