import type { BoardFile } from '../../board/board-file.ts';

export type Net = BoardFile['nets'][number];

/** A straight piece of trace, its ends in nanometres. */
interface Piece {
  readonly ax: number;
  readonly ay: number;
  readonly bx: number;
  readonly by: number;
}

/** A bend that stays this near to the straight line is none: the resolution of layout files. */
const STRAIGHT_NM = 100;

/**
 * The copper of traces, one key for each layer and width: straight pieces in one order, whatever polylines they were drawn as.
 * Pieces that continue each other straight are joined, so a polyline split in two, or drawn backwards, has the same key.
 */
export function copperKeys(traces: Net['traces'], nanometres: (valueMm: number) => number): Map<string, string> {
  const byKind = new Map<string, Piece[]>();
  for (const { layer, widthMm, pointsMm } of traces ?? []) {
    const kind = JSON.stringify([layer, nanometres(widthMm)]);
    const pieces = byKind.get(kind) ?? [];
    byKind.set(kind, pieces);
    for (const [i, [x, y]] of pointsMm.slice(1).entries()) {
      const [fromX, fromY] = pointsMm[i]!;
      pieces.push({ ax: nanometres(fromX), ay: nanometres(fromY), bx: nanometres(x), by: nanometres(y) });
    }
  }
  return new Map([...byKind].map(([kind, pieces]) => [kind, keyOf(joinStraight(pieces))]));
}

const keyOf = (pieces: readonly Piece[]): string => [...new Set(pieces.map(pieceKey))].sort().join(';');

function pieceKey({ ax, ay, bx, by }: Piece): string {
  const isForward = ax < bx || (ax === bx && ay <= by);
  return isForward ? `${ax} ${ay} ${bx} ${by}` : `${bx} ${by} ${ax} ${ay}`;
}

/** Joins pieces end to end while the joint lies on the straight line between the far ends. */
function joinStraight(pieces: readonly Piece[]): Piece[] {
  const distinct = [...new Map(pieces.map((piece) => [pieceKey(piece), piece])).values()]
    .filter(({ ax, ay, bx, by }) => ax !== bx || ay !== by)
    .sort((one, other) => (pieceKey(one) < pieceKey(other) ? -1 : 1));
  const at = new Map<string, Set<Piece>>();
  const ends = ({ ax, ay, bx, by }: Piece) => [`${ax} ${ay}`, `${bx} ${by}`];
  const enter = (piece: Piece) => {
    for (const end of ends(piece)) at.set(end, (at.get(end) ?? new Set()).add(piece));
  };
  const leave = (piece: Piece) => {
    for (const end of ends(piece)) at.get(end)?.delete(piece);
  };
  for (const piece of distinct) enter(piece);
  const done = new Set<Piece>();
  const waiting = [...distinct];
  for (let piece = waiting.pop(); piece !== undefined; piece = waiting.pop()) {
    if (![...ends(piece)].some((end) => at.get(end)?.has(piece!))) continue;
    const longer = extended(piece, at);
    if (!longer) {
      done.add(piece);
      continue;
    }
    leave(piece);
    leave(longer.partner);
    done.delete(longer.partner);
    enter(longer.joined);
    waiting.push(longer.joined);
  }
  return [...done];
}

function extended(
  piece: Piece,
  at: ReadonlyMap<string, ReadonlySet<Piece>>,
): { partner: Piece; joined: Piece } | undefined {
  for (const [jointX, jointY, farX, farY] of sides(piece)) {
    for (const partner of at.get(`${jointX} ${jointY}`) ?? []) {
      if (partner === piece) continue;
      const side = sides(partner).find(([x, y]) => x === jointX && y === jointY)!;
      const [, , otherX, otherY] = side;
      if (isStraight(farX, farY, jointX, jointY, otherX, otherY)) {
        return { partner, joined: { ax: farX, ay: farY, bx: otherX, by: otherY } };
      }
    }
  }
  return undefined;
}

const sides = ({ ax, ay, bx, by }: Piece): [number, number, number, number][] => [
  [ax, ay, bx, by],
  [bx, by, ax, ay],
];

/** Does the joint lie between both far ends, on their line? */
function isStraight(ax: number, ay: number, jx: number, jy: number, bx: number, by: number): boolean {
  const [dx, dy] = [bx - ax, by - ay];
  const length = Math.hypot(dx, dy);
  if (length === 0 || (jx - ax) * (bx - jx) + (jy - ay) * (by - jy) <= 0) return false;
  return Math.abs((jx - ax) * dy - (jy - ay) * dx) / length <= STRAIGHT_NM;
}

/**
 * Nanometres of coordinates so that values nearer than 1 nm, of either document, are one: whole nanometres decide
 * wherever no two values straddle the rounding.
 */
export function sharedNanometres(values: readonly number[]): (valueMm: number) => number {
  const sorted = [...new Set(values)].sort((one, other) => one - other);
  const whole = new Map<number, number>();
  let start = Number.NEGATIVE_INFINITY;
  let last = Number.NEGATIVE_INFINITY;
  for (const value of sorted) {
    if (value - last >= 1e-6) start = value;
    whole.set(value, Math.round(start * 1e6) + 0);
    last = value;
  }
  return (valueMm) => whole.get(valueMm) ?? Math.round(valueMm * 1e6) + 0;
}
