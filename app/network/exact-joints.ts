import { type Copper, type CopperPiece, type Landing, landingOn, SAME_PLACE_M } from './copper.ts';

/**
 * Joins what meets as drawn on one layer: ends at one place, ends on another piece (also along it: pieces that overlap get
 * each other's ends as stops), and pieces that cross. Within 1 µm.
 */
export function joinExactly(copper: Copper): void {
  for (const [i, piece] of copper.pieces.entries()) {
    copper.near(piece, SAME_PLACE_M, (j) => {
      if (j > i) joinPair(copper, i, j);
    });
  }
}

function joinPair(copper: Copper, i: number, j: number): void {
  const touchesFirst = joinEnds(copper, i, j);
  const touchesSecond = joinEnds(copper, j, i);
  if (touchesFirst || touchesSecond) return;
  const crossing = crossingOf(copper.pieces[i]!, i, copper.pieces[j]!, j);
  if (crossing) copper.join(copper.stopAt(crossing[0], SAME_PLACE_M), copper.stopAt(crossing[1], SAME_PLACE_M));
}

/** Joins the ends of one piece that lie on another; says whether any does. */
function joinEnds(copper: Copper, piece: number, on: number): boolean {
  let isJoined = false;
  const { fromM, toM } = copper.pieces[piece]!;
  for (const [end, atM] of [fromM, toM].entries()) {
    const landing = landingOn(copper.pieces[on]!, on, atM);
    if (landing.distanceM > SAME_PLACE_M) continue;
    copper.join(copper.stops[piece]![end]!.point, copper.stopAt(landing, SAME_PLACE_M));
    isJoined = true;
  }
  return isJoined;
}

/** Where two pieces cross inside both, if they do. */
function crossingOf(a: CopperPiece, i: number, b: CopperPiece, j: number): [Landing, Landing] | null {
  const dx = a.toM[0] - a.fromM[0];
  const dy = a.toM[1] - a.fromM[1];
  const ex = b.toM[0] - b.fromM[0];
  const ey = b.toM[1] - b.fromM[1];
  const denominator = dx * ey - dy * ex;
  if (denominator === 0) return null;
  const fx = b.fromM[0] - a.fromM[0];
  const fy = b.fromM[1] - a.fromM[1];
  const t = (fx * ey - fy * ex) / denominator;
  const u = (fx * dy - fy * dx) / denominator;
  if (!(t > 0 && t < 1 && u > 0 && u < 1)) return null;
  return [
    { piece: i, fraction: t, distanceM: 0 },
    { piece: j, fraction: u, distanceM: 0 },
  ];
}
