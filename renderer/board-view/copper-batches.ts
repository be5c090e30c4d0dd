import type { Board, Net, PointM } from '../../app/board/board.ts';
import { boxOf, joined } from './boxes.ts';
import { PIN_RADIUS_M } from './copper-index.ts';
import { TOLERANCES_M, thinned, tilesAcross } from './detail-levels.ts';
import { addLine, addRing, addSpot } from './paths.ts';
import type { BoxM } from './view.ts';

/** Copper gathered into few paths: one a layer, width and tile of the board, so that one call draws hundreds of pieces. */

export interface TraceBatch {
  readonly layerIndex: number;
  readonly widthM: number;
  readonly box: BoxM;
  readonly pieces: number;
  /** Made when first asked for. */
  readonly path: (level: number) => Path2D;
}

export interface DotBatch {
  readonly kind: 'via' | 'pin';
  readonly firstLayer: number;
  readonly lastLayer: number;
  readonly box: BoxM;
  readonly pieces: number;
  readonly radiusM: number;
  /** What is drilled out; 0 for pins. */
  readonly holeRadiusM: number;
  /** Spots: stroked, they become dots of any size. */
  readonly path: () => Path2D;
}

export interface PlaneShape {
  readonly layerIndex: number;
  readonly box: BoxM;
  readonly corners: number;
  readonly path: () => Path2D;
}

export interface CopperBatches {
  readonly outline: () => Path2D;
  readonly planes: readonly PlaneShape[];
  readonly traces: readonly TraceBatch[];
  readonly dots: readonly DotBatch[];
}

/** Copper about a hole: the model knows only the drill. */
export const VIA_RIM_M = 0.12e-3;

export function batchCopper(board: Pick<Board, 'nets' | 'planes' | 'outlineM'>): CopperBatches {
  return {
    outline: once(() => {
      const path = new Path2D();
      for (const ring of board.outlineM) addRing(path, ring);
      return path;
    }),
    planes: board.planes.flatMap(({ layerIndex, ringM, cutoutsM }): PlaneShape[] => {
      const box = boxOf(ringM);
      if (box === null) return [];
      const corners = cutoutsM.reduce((sum, ring) => sum + ring.length, ringM.length);
      return [{ layerIndex, box, corners, path: once(() => ringsPath([ringM, ...cutoutsM])) }];
    }),
    traces: traceBatches(board.nets),
    dots: dotBatches(board.nets),
  };
}

function once<T>(make: () => T): () => T {
  let made: T | undefined;
  return () => {
    made ??= make();
    return made;
  };
}

function ringsPath(rings: Parameters<typeof addRing>[1][]): Path2D {
  const path = new Path2D();
  for (const ring of rings) addRing(path, ring);
  return path;
}

interface Line {
  readonly pointsM: readonly PointM[];
  readonly box: BoxM;
}

function traceBatches(nets: readonly Net[]): TraceBatch[] {
  const groups = new Map<string, { layerIndex: number; widthM: number; lines: Line[] }>();
  for (const { traces } of nets) {
    for (const { layerIndex, widthM, pointsM } of traces) {
      const box = boxOf(pointsM);
      if (box === null) continue;
      const key = `${layerIndex} ${widthM}`;
      const group = groups.get(key) ?? { layerIndex, widthM, lines: [] };
      group.lines.push({ pointsM, box });
      groups.set(key, group);
    }
  }
  return [...groups.values()].flatMap(({ layerIndex, widthM, lines }) =>
    tiled(lines, ({ pointsM }) => pointsM.length - 1).map((tile): TraceBatch => {
      const byLevel = TOLERANCES_M.map((toleranceM) => once(() => linesPath(tile.items, toleranceM)));
      return { layerIndex, widthM, box: tile.box, pieces: tile.pieces, path: (level) => byLevel[level]!() };
    }),
  );
}

function linesPath(lines: readonly Line[], toleranceM: number): Path2D {
  const path = new Path2D();
  for (const { pointsM } of lines) addLine(path, thinned(pointsM, toleranceM));
  return path;
}

interface Tile<T> {
  readonly items: readonly T[];
  readonly box: BoxM;
  readonly pieces: number;
}

/** Parts things by where their middles lie; the more pieces, the finer. */
function tiled<T extends { readonly box: BoxM }>(items: readonly T[], piecesOf: (item: T) => number): Tile<T>[] {
  const pieces = items.reduce((sum, item) => sum + piecesOf(item), 0);
  const across = tilesAcross(pieces);
  const whole = items.map(({ box }) => box).reduce(joined);
  const place = (low: number, high: number, middle: number): number =>
    high > low ? Math.min(across - 1, Math.floor(((middle - low) / (high - low)) * across)) : 0;
  const tiles = new Map<number, { items: T[]; box: BoxM; pieces: number }>();
  for (const item of items) {
    const { lowXM, lowYM, highXM, highYM } = item.box;
    const column = place(whole.lowXM, whole.highXM, (lowXM + highXM) / 2);
    const row = place(whole.lowYM, whole.highYM, (lowYM + highYM) / 2);
    const tile = tiles.get(row * across + column) ?? { items: [], box: item.box, pieces: 0 };
    tile.items.push(item);
    tile.box = joined(tile.box, item.box);
    tile.pieces += piecesOf(item);
    tiles.set(row * across + column, tile);
  }
  return [...tiles.values()];
}

interface Dot {
  readonly kind: DotBatch['kind'];
  readonly atM: PointM;
  readonly radiusM: number;
  readonly holeRadiusM: number;
  readonly firstLayer: number;
  readonly lastLayer: number;
  readonly box: BoxM;
}

function dotBatches(nets: readonly Net[]): DotBatch[] {
  const groups = new Map<string, Dot[]>();
  const add = (dot: Omit<Dot, 'box'>) => {
    const [xM, yM] = dot.atM;
    const key = `${dot.kind} ${dot.firstLayer} ${dot.lastLayer} ${dot.radiusM}`;
    const group = groups.get(key) ?? [];
    group.push({ ...dot, box: { lowXM: xM, lowYM: yM, highXM: xM, highYM: yM } });
    groups.set(key, group);
  };
  for (const { vias, pins } of nets) {
    for (const { atM, drillM, fromLayerIndex: firstLayer, toLayerIndex: lastLayer } of vias) {
      add({ kind: 'via', atM, radiusM: drillM / 2 + VIA_RIM_M, holeRadiusM: drillM / 2, firstLayer, lastLayer });
    }
    for (const { atM, layerIndex } of pins) {
      add({ kind: 'pin', atM, radiusM: PIN_RADIUS_M, holeRadiusM: 0, firstLayer: layerIndex, lastLayer: layerIndex });
    }
  }
  return [...groups.values()].flatMap((dots) =>
    tiled(dots, () => 1).map(({ items, box, pieces }): DotBatch => {
      const { kind, firstLayer, lastLayer, radiusM, holeRadiusM } = items[0]!;
      return { kind, firstLayer, lastLayer, radiusM, holeRadiusM, box, pieces, path: once(() => spotsPath(items)) };
    }),
  );
}

function spotsPath(dots: readonly Dot[]): Path2D {
  const path = new Path2D();
  for (const { atM } of dots) addSpot(path, atM);
  return path;
}
