import type { Point3M } from '../board/board.ts';
import { ElementCollector, type ElementSet } from '../fields/element-set.ts';
import { gaussLegendre } from '../fields/quadrature.ts';
import { type SiteFrame, toSitePoint, toSiteVector } from '../site/site.ts';
import { pointsFor } from './pair-elements.ts';

/** Straight legs longer than this are taken in pieces, m. */
const LONGEST_PIECE_M = 0.5;

/** Elements along a polyline given in board axes, with the distance of each from its start. */
export interface StraightElements {
  readonly elements: ElementSet;
  /** Distance of each element from the polyline's first point, m. */
  readonly alongM: Float64Array;
  readonly lengthM: number;
}

/** Gauss–Legendre elements along an open polyline, fit for currents up to `maxHz`. */
export function elementsAlong(frame: SiteFrame, pointsM: readonly Point3M[], maxHz: number): StraightElements {
  const collector = new ElementCollector();
  const along: number[] = [];
  let doneM = 0;
  for (let leg = 0; leg + 1 < pointsM.length; leg++) {
    const from = toSitePoint(frame, pointsM[leg]!);
    const a = pointsM[leg]!;
    const b = pointsM[leg + 1]!;
    const step = toSiteVector(frame.orientation, [b[0] - a[0], b[1] - a[1], b[2] - a[2]]);
    const legM = Math.hypot(...step);
    const pieces = Math.max(1, Math.ceil(legM / LONGEST_PIECE_M));
    const rule = gaussLegendre(pointsFor(legM / pieces, 1, maxHz));
    for (let piece = 0; piece < pieces; piece++) {
      for (let i = 0; i < rule.nodes.length; i++) {
        const s = (piece + rule.nodes[i]!) / pieces;
        const weight = rule.weights[i]! / pieces;
        collector.add(
          [from[0] + s * step[0], from[1] + s * step[1], from[2] + s * step[2]],
          [weight * step[0], weight * step[1], weight * step[2]],
        );
        along.push(doneM + s * legM);
      }
    }
    doneM += legM;
  }
  return { elements: collector.finish(), alongM: Float64Array.from(along), lengthM: doneM };
}
