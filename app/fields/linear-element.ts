import type { FieldTerms } from './element-field.ts';
import { addElementField } from './element-field.ts';
import { gaussLegendre, quadraturePoints } from './quadrature.ts';

/** A straight current element; the current runs linearly from one end to the other. Peak phasors, A; positions in m. */
export interface LinearElement {
  readonly fromM: readonly [number, number, number];
  readonly toM: readonly [number, number, number];
  readonly startRe: number;
  readonly startIm: number;
  readonly endRe: number;
  readonly endIm: number;
}

/** Pieces longer than this fraction of their distance to the observer are halved. */
const LENGTH_PER_DISTANCE = 0.5;
/** Halving ends here: the observer then sits within a millionth of the length. */
const MAX_HALVINGS = 24;

/**
 * Adds E and H of a straight element with linearly varying current: 2.1 integrated along it by Gauss–Legendre on pieces
 * that are short against their distance. End charges and the line charge −(dI/ds)/(jω) are contained.
 *
 * Shapes and units as `addElementField`. Returns false (and adds nothing meaningful) when the observer lies on the
 * element, where the field of a filament is infinite. Error below 1e-4 of the field, near and far (see its test).
 */
export function addLinearElementField(
  outE: Float64Array,
  outH: Float64Array | null,
  offset: number,
  kPerM: number,
  observerM: readonly [number, number, number],
  element: LinearElement,
  terms: FieldTerms = 'all',
): boolean {
  const { fromM, toM } = element;
  const dx = toM[0] - fromM[0];
  const dy = toM[1] - fromM[1];
  const dz = toM[2] - fromM[2];
  const lengthM = Math.hypot(dx, dy, dz);
  if (lengthM === 0) return true;

  const distanceTo = (from: number, to: number): number => {
    const px = observerM[0] - fromM[0];
    const py = observerM[1] - fromM[1];
    const pz = observerM[2] - fromM[2];
    const along = (px * dx + py * dy + pz * dz) / (lengthM * lengthM);
    const nearest = Math.min(to, Math.max(from, along));
    return Math.hypot(px - nearest * dx, py - nearest * dy, pz - nearest * dz);
  };

  const addPiece = (from: number, to: number, halvings: number): boolean => {
    const distanceM = distanceTo(from, to);
    const pieceM = (to - from) * lengthM;
    if (pieceM > LENGTH_PER_DISTANCE * distanceM || pieceM * kPerM > 1) {
      if (halvings === MAX_HALVINGS) return false;
      const middle = (from + to) / 2;
      return addPiece(from, middle, halvings + 1) && addPiece(middle, to, halvings + 1);
    }
    const rule = gaussLegendre(Math.max(3, quadraturePoints(pieceM, 0, kPerM, distanceM)));
    for (let i = 0; i < rule.nodes.length; i++) {
      const s = from + (to - from) * rule.nodes[i]!;
      const weight = (to - from) * rule.weights[i]!;
      const re = weight * (element.startRe + s * (element.endRe - element.startRe));
      const im = weight * (element.startIm + s * (element.endIm - element.startIm));
      addElementField(
        outE,
        outH,
        offset,
        kPerM,
        observerM[0] - fromM[0] - s * dx,
        observerM[1] - fromM[1] - s * dy,
        observerM[2] - fromM[2] - s * dz,
        [re * dx, re * dy, re * dz],
        [im * dx, im * dy, im * dz],
        terms,
      );
    }
    return true;
  };
  return addPiece(0, 1, 0);
}

/**
 * The element's image in a perfect plane at z = 0: at (x, y, −z), horizontal current reversed, vertical current kept.
 * Source: Balanis, Antenna Theory, section 4.7 (image theory).
 */
export function imageOf(element: LinearElement): LinearElement {
  const mirror = (p: readonly [number, number, number]): [number, number, number] => [p[0], p[1], -p[2]];
  return {
    fromM: mirror(element.fromM),
    toM: mirror(element.toM),
    startRe: -element.startRe,
    startIm: -element.startIm,
    endRe: -element.endRe,
    endIm: -element.endIm,
  };
}
