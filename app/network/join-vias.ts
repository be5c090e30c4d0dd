import type { Pin, PointM, Via } from '../board/board.ts';
import { PinGrid, type PinPoints } from './attach-pins.ts';
import { type Copper, SAME_PLACE_M } from './copper.ts';
import type { LooseEnds } from './loose-ends.ts';

/** A piece of a via's barrel, between the points of two layers. */
export interface Barrel {
  readonly pointA: number;
  readonly pointB: number;
  readonly atM: PointM;
  readonly fromLayerIndex: number;
  readonly toLayerIndex: number;
  readonly drillM: number;
}

/** A via with the point of the copper it meets on each layer. */
interface MetVia extends Via {
  readonly points: Map<number, number>;
}

/**
 * Joins vias to the traces of the layers they pass: to what runs over the hole (within half its width or the hole), and to
 * loose ends within a drill diameter (about the pad's radius, common practice).
 */
export function joinVias(copper: Copper, looseEnds: LooseEnds, vias: readonly Via[]): MetVia[] {
  return merged(vias).map((via) => {
    const points = new Map<number, number>();
    for (const layerIndex of copper.layerIndices) {
      if (layerIndex < via.fromLayerIndex || layerIndex > via.toLayerIndex) continue;
      const point = meetLayer(copper, looseEnds, via, layerIndex);
      if (point !== null) points.set(layerIndex, point);
    }
    connectAll(copper, points);
    return { ...via, points };
  });
}

/**
 * Barrels of every via between the layers on which it meets copper; where it meets no trace, a pin within a pad's reach
 * counts, which gets the barrel's place when it has no copper of its own.
 */
export function barrelsOf(
  copper: Copper,
  vias: readonly MetVia[],
  pins: readonly Pin[],
  pinPoints: PinPoints,
): Barrel[] {
  const pinGrid = new PinGrid(pins);
  const pinLayers = [...new Set(pins.map(({ layerIndex }) => layerIndex))];
  return vias.flatMap(({ atM, fromLayerIndex, toLayerIndex, drillM, points }) => {
    for (const layerIndex of pinLayers) {
      if (layerIndex < fromLayerIndex || layerIndex > toLayerIndex || points.has(layerIndex)) continue;
      const pin = pinGrid.nearest(atM, layerIndex);
      if (!pin) continue;
      const point = pinPoints.get(pin) ?? copper.addPoint(atM, layerIndex, 'pad');
      pinPoints.set(pin, point);
      points.set(layerIndex, point);
    }
    connectAll(copper, points);
    const met = [...points].sort(([one], [other]) => one - other);
    return met.slice(1).map(([layerIndex, point], i) => ({
      pointA: met[i]![1],
      pointB: point,
      atM,
      fromLayerIndex: met[i]![0],
      toLayerIndex: layerIndex,
      drillM,
    }));
  });
}

/** The point where a via meets the traces of one layer, if it does. */
function meetLayer(copper: Copper, looseEnds: LooseEnds, { atM, drillM }: Via, layerIndex: number): number | null {
  let point: number | null = null;
  /** What is connected already is not joined again: else a finely drawn bend would shrink to a point. */
  const isConnected = (other: number) => point !== null && copper.partOf(other) === copper.partOf(point);
  const meet = (other: number) => {
    point ??= copper.addPoint(atM, layerIndex, 'pad');
    looseEnds.join(other, point);
  };
  for (const landing of copper.landings(atM, layerIndex, drillM / 2)) {
    const { widthM } = copper.pieces[landing.piece]!;
    if (!isConnected(copper.stops[landing.piece]![0]!.point)) meet(copper.stopAt(landing, widthM / 2));
  }
  for (const end of looseEnds.within(atM, layerIndex, drillM)) if (!isConnected(end)) meet(end);
  return point;
}

function connectAll(copper: Copper, points: ReadonlyMap<number, number>): void {
  const [first, ...others] = points.values();
  for (const other of others) copper.connect(first!, other);
}

/** Vias at one place whose spans touch are one (stacked or listed twice). */
function merged(vias: readonly Via[]): Via[] {
  const places = new Map<string, Via[]>();
  for (const via of vias) {
    const key = via.atM.map((coordinate) => Math.round(coordinate / SAME_PLACE_M)).join(' ');
    const known = places.get(key);
    if (known) known.push(via);
    else places.set(key, [via]);
  }
  return [...places.values()].flatMap((stack) => {
    const result: Via[] = [];
    for (const via of stack.sort((a, b) => a.fromLayerIndex - b.fromLayerIndex)) {
      const last = result.at(-1);
      if (!last || via.fromLayerIndex > last.toLayerIndex) result.push(via);
      else {
        const toLayerIndex = Math.max(last.toLayerIndex, via.toLayerIndex);
        result[result.length - 1] = { ...last, toLayerIndex, drillM: Math.max(last.drillM, via.drillM) };
      }
    }
    return result;
  });
}
