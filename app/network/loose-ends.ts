import type { PointM } from '../board/board.ts';
import type { Copper, Landing } from './copper.ts';

/** Copper that a loose end reaches along itself within this many reaches is its own trace: it is not joined to that again. */
const OWN_COPPER_REACHES = 4;

/** Ends of pieces where nothing else joins, as drawn. */
export class LooseEnds {
  readonly #copper: Copper;
  /** Point of every loose end → its piece. */
  readonly #pieceOf = new Map<number, number>();
  /** Node → stops there. */
  readonly #stopsAt = new Map<number, { piece: number; fraction: number }[]>();

  /** Takes the joints as they are now. */
  constructor(copper: Copper) {
    this.#copper = copper;
    for (const [piece, stops] of copper.stops.entries()) {
      for (const { fraction, point } of stops) {
        const node = copper.nodeOf(point);
        const known = this.#stopsAt.get(node);
        if (known) known.push({ piece, fraction });
        else this.#stopsAt.set(node, [{ piece, fraction }]);
      }
    }
    for (const [piece, stops] of copper.stops.entries()) {
      for (const { point } of stops.slice(0, 2)) {
        if (this.#stopsAt.get(copper.nodeOf(point))!.length === 1) this.#pieceOf.set(point, piece);
      }
    }
  }

  /** The ends that are loose still: point and piece. */
  [Symbol.iterator](): IterableIterator<[point: number, piece: number]> {
    return this.#pieceOf.entries();
  }

  /** Loose ends of a layer within reach of a place, nearest first. */
  within(atM: PointM, layerIndex: number, reachM: number): number[] {
    const found: { point: number; distanceM: number }[] = [];
    const reach = { fromM: atM, toM: atM, layerIndex, widthM: 0, lengthM: 0 };
    this.#copper.near(reach, reachM, (piece) => {
      for (const { point } of this.#copper.stops[piece]!.slice(0, 2)) {
        const end = this.#copper.points[point]!.atM;
        const distanceM = Math.hypot(end[0] - atM[0], end[1] - atM[1]);
        if (this.#pieceOf.has(point) && distanceM <= reachM) found.push({ point, distanceM });
      }
    });
    found.sort((one, other) => one.distanceM - other.distanceM || one.point - other.point);
    return found.map(({ point }) => point);
  }

  /** Joins two points; neither is a loose end then. */
  join(one: number, other: number): void {
    this.#copper.join(one, other);
    this.settle(one);
    this.settle(other);
  }

  /** Says that something joins at this point. */
  settle(point: number): void {
    this.#pieceOf.delete(point);
  }

  /** Width of the widest other piece inside which a point lies, m; 0 when it only meets ends. */
  widestAcrossM(point: number, piece: number): number {
    let most = 0;
    for (const stop of this.#stopsAt.get(this.#copper.nodeOf(point)) ?? []) {
      const isInside = stop.fraction > 0 && stop.fraction < 1;
      if (stop.piece !== piece && isInside) most = Math.max(most, this.#copper.pieces[stop.piece]!.widthM);
    }
    return most;
  }

  /** Pieces that current reaches from a loose end along the copper within `reachM`. */
  ownPieces(end: number, reachM: number): Set<number> {
    const found = new Set<number>();
    const start = this.#copper.nodeOf(end);
    const best = new Map<number, number>([[start, 0]]);
    const open: [node: number, doneM: number][] = [[start, 0]];
    for (let next = open.pop(); next; next = open.pop()) {
      const [node, doneM] = next;
      if (doneM > best.get(node)!) continue;
      for (const { piece, fraction } of this.#stopsAt.get(node) ?? []) {
        found.add(piece);
        for (const stop of this.#copper.stops[piece]!) {
          const distanceM = doneM + Math.abs(stop.fraction - fraction) * this.#copper.pieces[piece]!.lengthM;
          const other = this.#copper.nodeOf(stop.point);
          if (distanceM > reachM || distanceM >= (best.get(other) ?? Infinity)) continue;
          best.set(other, distanceM);
          open.push([other, distanceM]);
        }
      }
    }
    return found;
  }
}

/** An end that sticks out of the copper it crosses by less than half that width ends there: no stub of it is left. */
export function trimLooseEnds(copper: Copper, looseEnds: LooseEnds): void {
  for (const [end, piece] of looseEnds) {
    const stops = copper.stops[piece]!;
    const { lengthM } = copper.pieces[piece]!;
    const own = stops[0]!.point === end ? 0 : 1;
    let nearest = stops[1 - own]!;
    for (const stop of stops) {
      if (stop.point !== end && Math.abs(stop.fraction - own) < Math.abs(nearest.fraction - own)) nearest = stop;
    }
    const stubM = Math.abs(nearest.fraction - own) * lengthM;
    if (stubM <= looseEnds.widestAcrossM(nearest.point, piece) / 2) looseEnds.join(end, nearest.point);
  }
}

/** Joins every loose end to the nearest other copper it overlaps: within half the width of the wider of the two. */
export function joinLooseEnds(copper: Copper, looseEnds: LooseEnds): void {
  for (const [end, piece] of looseEnds) {
    const { atM, layerIndex } = copper.points[end]!;
    const halfM = copper.pieces[piece]!.widthM / 2;
    const landings = copper.landings(atM, layerIndex, halfM).filter((landing) => landing.piece !== piece);
    if (landings.length === 0) continue;
    const reachM = Math.max(halfM, ...landings.map((landing) => copper.pieces[landing.piece]!.widthM / 2));
    const own = looseEnds.ownPieces(end, OWN_COPPER_REACHES * reachM);
    const nearest = landings.find((landing) => !own.has(landing.piece));
    if (nearest) looseEnds.join(end, copper.stopAt(nearest, snapM(copper, nearest)));
  }
}

/** Joins separate parts of the copper where a corner or end of one lies on the other, within half its width. */
export function joinOverlappingParts(copper: Copper): void {
  for (const [piece, stops] of copper.stops.entries()) {
    for (const { point } of stops.slice(0, 2)) {
      const { atM, layerIndex } = copper.points[point]!;
      for (const landing of copper.landings(atM, layerIndex, copper.pieces[piece]!.widthM / 2)) {
        const other = copper.stops[landing.piece]![0]!.point;
        if (copper.partOf(other) === copper.partOf(point)) continue;
        copper.join(point, copper.stopAt(landing, snapM(copper, landing)));
      }
    }
  }
}

/** Nearer than half a width, an existing stop serves: no specks of copper between. */
const snapM = (copper: Copper, { piece }: Landing): number => {
  const { widthM, lengthM } = copper.pieces[piece]!;
  return Math.min(widthM, lengthM) / 2;
};
