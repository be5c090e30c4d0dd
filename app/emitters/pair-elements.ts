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
  /** Charge of the ends at node A and B besides the line's own, in lengths of line (`traceEndM`), m. */
  readonly endsM: readonly [number, number];
}

/** Nearest the antenna can come to an element, for the choice of quadrature points, m. */
const NEAREST_ANTENNA_M = 1;

/** Gauss–Legendre points for a section up to the highest frequency. */
export function pointsFor(lengthM: number, epsilonEff: number, maxHz: number): number {
  const kPerM = (2 * Math.PI * maxHz) / SPEED_OF_LIGHT_M_PER_S;
  return quadraturePoints(lengthM, kPerM * Math.sqrt(epsilonEff), kPerM, NEAREST_ANTENNA_M);
}

/** Permittivity between trace and (nearest) plane, which shields the trace's charge. */
export const pairEpsilonR = ({ planes }: PlacedSection): number =>
  planes[0] ? effectiveDielectric(planes[0].rows).epsilonR : 1;

/** A stretch of a section, m from its node A. */
export interface ReturnGapM {
  readonly fromM: number;
  readonly toM: number;
}

/**
 * Trace and return of one section as current elements (physics 5.1, 5.3, 5.7): for each reference plane the share of the
 * current on the trace's facing surface, its opposite on the plane's facing surface straight under it, and the
 * dielectric's polarisation current jω C' (1 − 1/ε_r) V ds from trace to plane, C' = √ε_eff/(Z0 c).
 * `gaps`: stretches without a return filament, where the solved plane carries the return itself (physics 11).
 */
export function addPairElements(
  collector: RuleCollector,
  section: PlacedSection,
  maxHz: number,
  gaps: readonly ReturnGapM[] = [],
): void {
  const { lengthM } = section;
  const capacitanceFPerM = Math.sqrt(section.epsilonEff) / (section.z0Ohm * SPEED_OF_LIGHT_M_PER_S);
  for (const plane of section.planes) {
    const bound = plane.share * capacitanceFPerM * (1 - 1 / effectiveDielectric(plane.rows).epsilonR);
    let atM = 0;
    for (const gap of [...gaps].sort((one, other) => one.fromM - other.fromM)) {
      if (gap.fromM > atM) addStretch(collector, section, plane, atM, gap.fromM, true, bound, maxHz);
      if (gap.toM > Math.max(atM, gap.fromM)) {
        addStretch(collector, section, plane, Math.max(atM, gap.fromM), gap.toM, false, 0, maxHz);
      }
      atM = Math.max(atM, gap.toM);
    }
    if (lengthM > atM) addStretch(collector, section, plane, atM, lengthM, true, bound, maxHz);
    addEndCharge(collector, section, plane, capacitanceFPerM);
  }
}

/**
 * Charge of the section's ends besides the line's own: jω C' Δl V/ε_r from plane to trace. In the net it is a capacitor, whose
 * current the pin's post counts as going down with the load's; what charges the end and is not bound in the dielectric
 * does not, and is taken back here.
 */
function addEndCharge(
  collector: RuleCollector,
  { index, fromM, toM, lengthM, endsM }: PlacedSection,
  { traceZM, planeZM, share, rows }: ReferencePlane,
  capacitanceFPerM: number,
): void {
  const free = (share * capacitanceFPerM) / effectiveDielectric(rows).epsilonR;
  for (const [endM, [x, y], atM] of [
    [endsM[0], fromM, 0],
    [endsM[1], toM, lengthM],
  ] as const) {
    if (endM === 0) continue;
    const rule = { kind: 'shunt', section: index, atM, factor: free * endM } as const;
    collector.add([x, y, (traceZM + planeZM) / 2], [0, 0, traceZM - planeZM], rule);
  }
}

function addStretch(
  collector: RuleCollector,
  section: PlacedSection,
  plane: ReferencePlane,
  startM: number,
  endM: number,
  hasReturn: boolean,
  boundFPerM: number,
  maxHz: number,
): void {
  const { fromM, toM, lengthM } = section;
  const part = (endM - startM) / lengthM;
  const dx = (toM[0] - fromM[0]) * part;
  const dy = (toM[1] - fromM[1]) * part;
  const rule = gaussLegendre(pointsFor(endM - startM, section.epsilonEff, maxHz));
  for (let i = 0; i < rule.nodes.length; i++) {
    const weight = rule.weights[i]!;
    const atM = startM + rule.nodes[i]! * (endM - startM);
    const x = fromM[0] + (atM / lengthM) * (toM[0] - fromM[0]);
    const y = fromM[1] + (atM / lengthM) * (toM[1] - fromM[1]);
    const along: Point3M = [weight * dx, weight * dy, 0];
    const current = { kind: 'along', section: section.index, atM } as const;
    collector.add([x, y, plane.traceZM], along, { ...current, factor: plane.share });
    if (hasReturn) collector.add([x, y, plane.planeZM], along, { ...current, factor: -plane.share });
    if (boundFPerM !== 0) {
      const middle: Point3M = [x, y, (plane.traceZM + plane.planeZM) / 2];
      collector.add(middle, [0, 0, weight * (endM - startM) * (plane.planeZM - plane.traceZM)], {
        kind: 'shunt',
        section: section.index,
        atM,
        factor: boundFPerM,
      });
    }
  }
}
