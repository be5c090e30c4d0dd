import { gaussLegendre } from '../fields/quadrature.ts';

/** A stretch of a section, m from its node A. */
interface Stretch {
  readonly fromM: number;
  readonly toM: number;
}

/** Nodes this close (relative to the section) are those of a rule. */
const SAME_NODE = 1e-9;

/**
 * How the elements of one section, each standing for the quadrature point it lies at, are shared out to the pieces of the section:
 * for every distinct place the parts (adding up to 1) that belong to each piece.
 *
 * Where the places are a Gauss–Legendre rule over the section, an element's part is that of its Lagrange polynomial on the
 * piece (what the polynomial through all of them gives there); elsewhere (stretches with and without return) the stretch
 * between the middles to its neighbours counts as its own. Elements at the section's very ends belong to the piece there.
 */
export function sharesOfPlaces(
  placesM: readonly number[],
  lengthM: number,
  pieces: readonly Stretch[],
): Map<number, Float64Array> {
  const places = [...new Set(placesM)].sort((a, b) => a - b);
  const inside = places.filter((atM) => atM > SAME_NODE * lengthM && atM < lengthM * (1 - SAME_NODE));
  const shares = new Map<number, Float64Array>();
  for (const atM of places) {
    const own = new Float64Array(pieces.length);
    own[atM < lengthM / 2 ? 0 : pieces.length - 1] = 1;
    shares.set(atM, own);
  }
  const { nodes, weights } = gaussLegendre(Math.max(1, inside.length));
  const isRule = inside.every((atM, i) => Math.abs(atM / lengthM - nodes[i]!) < SAME_NODE);
  for (const [i, atM] of inside.entries()) {
    shares.set(
      atM,
      Float64Array.from(pieces, (piece) =>
        isRule
          ? lagrangeIntegral(nodes, i, piece.fromM / lengthM, piece.toM / lengthM) / weights[i]!
          : overlap(cellOf(inside, i, lengthM), piece),
      ),
    );
  }
  return shares;
}

/** ∫ of the Lagrange polynomial of one node over [from, to], exact. */
function lagrangeIntegral(nodes: Float64Array, which: number, from: number, to: number): number {
  const rule = gaussLegendre(nodes.length);
  let sum = 0;
  for (let q = 0; q < rule.nodes.length; q++) {
    const x = from + rule.nodes[q]! * (to - from);
    let value = 1;
    for (let j = 0; j < nodes.length; j++) {
      if (j !== which) value *= (x - nodes[j]!) / (nodes[which]! - nodes[j]!);
    }
    sum += rule.weights[q]! * value;
  }
  return sum * (to - from);
}

function cellOf(places: readonly number[], i: number, lengthM: number): Stretch {
  return {
    fromM: i > 0 ? (places[i - 1]! + places[i]!) / 2 : 0,
    toM: i < places.length - 1 ? (places[i]! + places[i + 1]!) / 2 : lengthM,
  };
}

/** Part of a stretch that lies on another. */
const overlap = (stretch: Stretch, on: Stretch): number =>
  Math.max(0, Math.min(stretch.toM, on.toM) - Math.max(stretch.fromM, on.fromM)) / (stretch.toM - stretch.fromM);
