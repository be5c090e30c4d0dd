import type { Net, Plane } from '../../app/board/board.ts';
import { VIA_RIM_M } from './copper-batches.ts';
import { PIN_RADIUS_M } from './copper-index.ts';
import { addDot, addLine, addRing } from './paths.ts';

/** One net as paths. */
export interface NetShape {
  readonly name: string;
  readonly strokes: readonly { readonly layerIndex: number; readonly widthM: number; readonly path: Path2D }[];
  readonly vias: Path2D;
  readonly pins: readonly { readonly layerIndex: number; readonly path: Path2D }[];
  readonly planes: readonly { readonly layerIndex: number; readonly path: Path2D }[];
  /** How much there is to draw. */
  readonly pieces: number;
}

const known = new WeakMap<Net, NetShape>();

/** Kept as long as the net: copper keeps its identity while only sources change. */
export function netShapeOf(net: Net, planes: readonly Plane[]): NetShape {
  const before = known.get(net);
  if (before !== undefined) return before;
  const made = makeShape(net, planes);
  known.set(net, made);
  return made;
}

function makeShape(net: Net, planes: readonly Plane[]): NetShape {
  const strokes = new Map<string, { layerIndex: number; widthM: number; path: Path2D }>();
  let pieces = 0;
  for (const { layerIndex, widthM, pointsM } of net.traces) {
    const key = `${layerIndex} ${widthM}`;
    const stroke = strokes.get(key) ?? { layerIndex, widthM, path: new Path2D() };
    addLine(stroke.path, pointsM);
    strokes.set(key, stroke);
    pieces += pointsM.length - 1;
  }
  const vias = new Path2D();
  for (const { atM, drillM } of net.vias) addDot(vias, atM, drillM / 2 + VIA_RIM_M);
  const pins = new Map<number, Path2D>();
  for (const { atM, layerIndex } of net.pins) {
    const path = pins.get(layerIndex) ?? new Path2D();
    addDot(path, atM, PIN_RADIUS_M);
    pins.set(layerIndex, path);
  }
  const own = planes.filter((plane) => plane.net === net.name);
  return {
    name: net.name,
    strokes: [...strokes.values()],
    vias,
    pins: [...pins].map(([layerIndex, path]) => ({ layerIndex, path })),
    planes: own.map(({ layerIndex, ringM, cutoutsM }) => {
      const path = new Path2D();
      for (const ring of [ringM, ...cutoutsM]) addRing(path, ring);
      return { layerIndex, path };
    }),
    pieces: own.reduce((sum, { ringM }) => sum + ringM.length, pieces + net.vias.length + net.pins.length),
  };
}
