import type { Net, PointM } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { BoxIndex } from './box-index.ts';
import { UnionFind } from './union-find.ts';

/** A straight piece of a trace. */
export interface CopperPiece {
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly layerIndex: number;
  readonly widthM: number;
  readonly lengthM: number;
}

/** A place on a piece, as a fraction of its length, where something joins. */
export interface Stop {
  readonly fraction: number;
  readonly point: number;
}

/** An end of a piece, a pad or barrel where copper meets, or a place inside a piece. */
export type PointKind = 'end' | 'pad' | 'inside';

/** The nearest place of a piece to some point. */
export interface Landing {
  readonly piece: number;
  readonly fraction: number;
  readonly distanceM: number;
}

/** Points closer than this are one, and shorter pieces are dropped, m. */
export const SAME_PLACE_M = 1e-6;
/** Coordinates beyond this are no board, m. */
const FARTHEST_M = 1000;
/** Pairs of neighbouring pieces looked at before the drawing is refused. */
const MOST_PAIRS = 5e7;

/**
 * The straight pieces of a net, and the points where they join. Points are found one by one; joined points become one
 * node in the end. A point may lie at an end or inside a piece (a stop), or be free (a pin or via without a trace).
 */
export class Copper {
  readonly net: Net;
  readonly pieces: readonly CopperPiece[];
  /** Stops of every piece, in no order; the first two are its ends. */
  readonly stops: Stop[][];
  readonly points: { atM: PointM; layerIndex: number; kind: PointKind }[] = [];
  /** Points that are one node. */
  readonly #nodes = new UnionFind();
  /** Points that copper, joints or vias connect. */
  readonly #parts = new UnionFind();
  readonly #layers = new Map<number, { index: BoxIndex; pieces: readonly number[]; widestM: number }>();
  #pairs = 0;

  constructor(net: Net) {
    this.net = net;
    this.pieces = piecesOf(net);
    this.stops = this.pieces.map(({ fromM, toM, layerIndex }) => {
      const from = this.addPoint(fromM, layerIndex, 'end');
      const to = this.addPoint(toM, layerIndex, 'end');
      this.connect(from, to);
      return [
        { fraction: 0, point: from },
        { fraction: 1, point: to },
      ];
    });
    for (const layerIndex of new Set(this.pieces.map((piece) => piece.layerIndex))) {
      const pieces = this.pieces.flatMap((piece, i) => (piece.layerIndex === layerIndex ? [i] : []));
      const widestM = pieces.reduce((most, i) => Math.max(most, this.pieces[i]!.widthM), 0);
      const index = new BoxIndex(pieces.map((i) => boxOf(this.pieces[i]!)));
      this.#layers.set(layerIndex, { pieces, index, widestM });
    }
  }

  get layerIndices(): readonly number[] {
    return [...this.#layers.keys()].sort((a, b) => a - b);
  }

  addPoint(atM: PointM, layerIndex: number, kind: PointKind): number {
    this.points.push({ atM, layerIndex, kind });
    this.#nodes.add();
    return this.#parts.add();
  }

  /** Makes two points one node. */
  join(one: number, other: number): void {
    this.#nodes.join(one, other);
    this.#parts.join(one, other);
  }

  /** Says that current can pass between two points (which stay two nodes). */
  connect(one: number, other: number): void {
    this.#parts.join(one, other);
  }

  nodeOf(point: number): number {
    return this.#nodes.find(point);
  }

  partOf(point: number): number {
    return this.#parts.find(point);
  }

  /** The point of a landing: a stop of the piece within `snapM` of it (the nearest), else a new one inside the piece. */
  stopAt({ piece, fraction }: Landing, snapM: number): number {
    const { fromM, toM, layerIndex, lengthM } = this.pieces[piece]!;
    let best: Stop | null = null;
    for (const stop of this.stops[piece]!) {
      const distance = Math.abs(stop.fraction - fraction);
      if (distance * lengthM <= snapM && (!best || distance < Math.abs(best.fraction - fraction))) best = stop;
    }
    if (best) return best.point;
    const atM: PointM = [fromM[0] + fraction * (toM[0] - fromM[0]), fromM[1] + fraction * (toM[1] - fromM[1])];
    const point = this.addPoint(atM, layerIndex, 'inside');
    this.stops[piece]!.push({ fraction, point });
    this.connect(point, this.stops[piece]![0]!.point);
    return point;
  }

  /** Calls `visit` for every piece of the layer whose box, wider by `reachM`, meets the box of this piece. */
  near(piece: CopperPiece, reachM: number, visit: (piece: number) => void): void {
    const layer = this.#layers.get(piece.layerIndex);
    if (!layer) return;
    const { lowX, lowY, highX, highY } = boxOf(piece);
    const box = { lowX: lowX - reachM, lowY: lowY - reachM, highX: highX + reachM, highY: highY + reachM };
    layer.index.meeting(box, (i) => {
      if (++this.#pairs > MOST_PAIRS) {
        throw inputError(
          `net ${this.net.name}`,
          `drawn with fewer than ${MOST_PAIRS} overlapping pairs of pieces`,
          'more',
        );
      }
      visit(layer.pieces[i]!);
    });
  }

  /** Landings of a place on the pieces of a layer, nearest first; within half the piece's width, or `leastReachM` if more. */
  landings(atM: PointM, layerIndex: number, leastReachM: number): Landing[] {
    const found: Landing[] = [];
    const farthestM = Math.max(leastReachM, (this.#layers.get(layerIndex)?.widestM ?? 0) / 2);
    this.near({ fromM: atM, toM: atM, layerIndex, widthM: 0, lengthM: 0 }, farthestM, (piece) => {
      const landing = landingOn(this.pieces[piece]!, piece, atM);
      if (landing.distanceM <= Math.max(leastReachM, this.pieces[piece]!.widthM / 2)) found.push(landing);
    });
    return found.sort((one, other) => one.distanceM - other.distanceM || one.piece - other.piece);
  }
}

export function landingOn({ fromM, toM, lengthM }: CopperPiece, piece: number, [x, y]: PointM): Landing {
  const dx = toM[0] - fromM[0];
  const dy = toM[1] - fromM[1];
  const along = ((x - fromM[0]) * dx + (y - fromM[1]) * dy) / (lengthM * lengthM);
  const fraction = Math.min(1, Math.max(0, along));
  return { piece, fraction, distanceM: Math.hypot(x - fromM[0] - fraction * dx, y - fromM[1] - fraction * dy) };
}

/** Straight pieces of all traces; exact doubles once (the widest), specks dropped. Throws `input` when far off any board. */
function piecesOf({ name, traces }: Net): CopperPiece[] {
  const pieces = new Map<string, CopperPiece>();
  for (const { layerIndex, widthM, pointsM } of traces) {
    if (pointsM.length === 0) continue;
    for (const [x, y] of pointsM) {
      if (!(Math.abs(x) <= FARTHEST_M && Math.abs(y) <= FARTHEST_M)) {
        throw inputError(`net ${name}`, `within ${FARTHEST_M} m of the origin`, [x, y]);
      }
    }
    let fromM = pointsM[0]!;
    for (const toM of pointsM) {
      const lengthM = Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1]);
      if (lengthM <= SAME_PLACE_M) continue;
      const [a, b] = fromM[0] < toM[0] || (fromM[0] === toM[0] && fromM[1] < toM[1]) ? [fromM, toM] : [toM, fromM];
      const key = `${layerIndex} ${a} ${b}`;
      const known = pieces.get(key);
      if (!known || known.widthM < widthM) pieces.set(key, { fromM, toM, layerIndex, widthM, lengthM });
      fromM = toM;
    }
  }
  return [...pieces.values()];
}

const boxOf = ({ fromM, toM }: CopperPiece) => ({
  lowX: Math.min(fromM[0], toM[0]),
  lowY: Math.min(fromM[1], toM[1]),
  highX: Math.max(fromM[0], toM[0]),
  highY: Math.max(fromM[1], toM[1]),
});
