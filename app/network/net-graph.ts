import type { Net, PointM } from '../board/board.ts';
import { CopperGrid, type CopperPiece, nearestOn } from './copper-grid.ts';
import { NodeMerger } from './node-merger.ts';

export interface GraphNode {
  readonly atM: PointM;
  readonly layerIndex: number;
}

/** A straight piece of copper between two nodes; A at `fromM`, B at `toM`. */
export interface GraphSegment {
  readonly nodeA: number;
  readonly nodeB: number;
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly layerIndex: number;
  readonly widthM: number;
  readonly lengthM: number;
}

/** A barrel between two layers on which the net has copper at this place, nearest neighbours in the stackup. */
export interface GraphVia {
  readonly nodeA: number;
  readonly nodeB: number;
  readonly atM: PointM;
  readonly fromLayerIndex: number;
  readonly toLayerIndex: number;
  readonly drillM: number;
}

export interface NetGraph {
  readonly nodes: readonly GraphNode[];
  readonly segments: readonly GraphSegment[];
  readonly vias: readonly GraphVia[];
  readonly pinNodes: ReadonlyMap<string, number>;
  /** Pins without copper of the net within reach. */
  readonly unattachedPins: readonly string[];
  /** Connected parts of the copper. */
  readonly islands: number;
}

/** Pieces shorter than this are dropped, and points closer than this are one, m. */
const SAME_PLACE_M = 1e-6;
/** A trace may end inside a pad, this far from the pin's centre, m. */
const PAD_REACH_M = 0.6e-3;

/**
 * The copper of one net as a graph: nodes at trace ends, pins, vias and wherever an end lands on another trace within half
 * its width, or two traces of a layer cross. Overlapping doubles give one segment. A pin joins the nearest copper of its
 * layer within 0.6 mm, or a via there.
 */
export function buildNetGraph(net: Net): NetGraph {
  const pieces = piecesOf(net);
  const grid = new CopperGrid(pieces);
  const merger = new NodeMerger();
  /** Places on each piece: fraction of its length and point. */
  const stops: { fraction: number; point: number }[][] = pieces.map((piece) => [
    { fraction: 0, point: merger.add(piece.fromM, piece.layerIndex, false) },
    { fraction: 1, point: merger.add(piece.toM, piece.layerIndex, false) },
  ]);
  const stopOn = (index: number, fraction: number, reachM: number): number => {
    const piece = pieces[index]!;
    const own = stops[index]!;
    if (fraction * piece.lengthM <= reachM && fraction <= 0.5) return own[0]!.point;
    if ((1 - fraction) * piece.lengthM <= reachM) return own[1]!.point;
    const known = own.find((stop) => Math.abs(stop.fraction - fraction) * piece.lengthM < SAME_PLACE_M);
    if (known) return known.point;
    const point = merger.add(pointOn(piece, fraction), piece.layerIndex, true);
    own.push({ fraction, point });
    return point;
  };

  joinPieces(pieces, grid, stops, stopOn, merger);
  const pinPoints = new Map<string, number>();
  const unattachedPins: string[] = [];
  const looseViaPins: { name: string; atM: PointM; layerIndex: number }[] = [];
  for (const pin of net.pins) {
    const point = attach(grid, pieces, stopOn, pin.atM, pin.layerIndex, PAD_REACH_M);
    if (point !== null) pinPoints.set(pin.name, point);
    else looseViaPins.push(pin);
  }
  const barrels = viaPoints(net, grid, pieces, stopOn, merger, looseViaPins, pinPoints);
  for (const { name } of looseViaPins) if (!pinPoints.has(name)) unattachedPins.push(name);

  const { nodes, nodeOf } = merger.finish();
  const segments = segmentsOf(pieces, stops, nodes, nodeOf);
  const vias = barrels
    .map(({ a, b, ...via }) => ({ nodeA: nodeOf(a), nodeB: nodeOf(b), ...via }))
    .filter(({ nodeA, nodeB }) => nodeA !== nodeB);
  return {
    nodes,
    segments,
    vias,
    pinNodes: new Map([...pinPoints].map(([name, point]) => [name, nodeOf(point)])),
    unattachedPins,
    islands: countIslands(nodes.length, [...segments, ...vias]),
  };
}

type StopOn = (piece: number, fraction: number, reachM: number) => number;

function piecesOf(net: Net): CopperPiece[] {
  return net.traces.flatMap(({ layerIndex, widthM, pointsM }) =>
    pointsM.slice(1).flatMap((toM, i) => {
      const fromM = pointsM[i]!;
      const lengthM = Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1]);
      return lengthM > SAME_PLACE_M ? [{ fromM, toM, layerIndex, widthM, lengthM }] : [];
    }),
  );
}

const pointOn = ({ fromM, toM }: CopperPiece, fraction: number): PointM => [
  fromM[0] + fraction * (toM[0] - fromM[0]),
  fromM[1] + fraction * (toM[1] - fromM[1]),
];

/** Ends on other pieces, and crossings. */
function joinPieces(
  pieces: readonly CopperPiece[],
  grid: CopperGrid,
  stops: readonly (readonly { fraction: number; point: number }[])[],
  stopOn: StopOn,
  merger: NodeMerger,
): void {
  for (const [i, piece] of pieces.entries()) {
    const ends = [stops[i]![0]!.point, stops[i]![1]!.point];
    for (const j of grid.near(piece)) {
      if (j === i) continue;
      const other = pieces[j]!;
      const reachM = Math.max(piece.widthM, other.widthM) / 2;
      for (const [e, endM] of [piece.fromM, piece.toM].entries()) {
        const { fraction, distanceM } = nearestOn(other, endM);
        if (distanceM <= reachM) merger.join(ends[e]!, stopOn(j, fraction, Math.min(reachM, other.lengthM / 2)));
      }
      if (j > i) {
        const cross = crossing(piece, other);
        if (cross) merger.join(stopOn(i, cross[0], reachM), stopOn(j, cross[1], reachM));
      }
    }
  }
}

function crossing(a: CopperPiece, b: CopperPiece): [number, number] | null {
  const dx = a.toM[0] - a.fromM[0];
  const dy = a.toM[1] - a.fromM[1];
  const ex = b.toM[0] - b.fromM[0];
  const ey = b.toM[1] - b.fromM[1];
  const denominator = dx * ey - dy * ex;
  if (Math.abs(denominator) < 1e-9 * a.lengthM * b.lengthM) return null;
  const fx = b.fromM[0] - a.fromM[0];
  const fy = b.fromM[1] - a.fromM[1];
  const t = (fx * ey - fy * ex) / denominator;
  const u = (fx * dy - fy * dx) / denominator;
  return t > 0 && t < 1 && u > 0 && u < 1 ? [t, u] : null;
}

/** The point of the nearest copper of a layer within reach of a place (beyond the copper's own edge), or null. */
function attach(
  grid: CopperGrid,
  pieces: readonly CopperPiece[],
  stopOn: StopOn,
  atM: PointM,
  layerIndex: number,
  reachM: number,
): number | null {
  let best: { index: number; fraction: number; distanceM: number } | null = null;
  for (const index of grid.around(atM, layerIndex, reachM)) {
    const { fraction, distanceM } = nearestOn(pieces[index]!, atM);
    if (distanceM > Math.max(reachM, pieces[index]!.widthM / 2)) continue;
    if (!best || distanceM < best.distanceM) best = { index, fraction, distanceM };
  }
  return best ? stopOn(best.index, best.fraction, pieces[best.index]!.widthM / 2) : null;
}

/** Barrels of every via between the layers on which the net has a trace or an otherwise loose pin there. */
function viaPoints(
  net: Net,
  grid: CopperGrid,
  pieces: readonly CopperPiece[],
  stopOn: StopOn,
  merger: NodeMerger,
  loosePins: readonly { name: string; atM: PointM; layerIndex: number }[],
  pinPoints: Map<string, number>,
) {
  const layers = [...new Set([...pieces, ...loosePins].map(({ layerIndex }) => layerIndex))].sort((a, b) => a - b);
  return net.vias.flatMap(({ atM, fromLayerIndex, toLayerIndex, drillM }) => {
    const met: { layerIndex: number; point: number }[] = [];
    for (const layerIndex of layers) {
      if (layerIndex < fromLayerIndex || layerIndex > toLayerIndex) continue;
      const point = attach(grid, pieces, stopOn, atM, layerIndex, drillM);
      if (point !== null) met.push({ layerIndex, point });
      const pins = loosePins.filter(
        (pin) => pin.layerIndex === layerIndex && Math.hypot(pin.atM[0] - atM[0], pin.atM[1] - atM[1]) <= PAD_REACH_M,
      );
      if (pins.length === 0) continue;
      const own = point ?? merger.add(atM, layerIndex, true);
      if (point === null) met.push({ layerIndex, point: own });
      for (const pin of pins) if (!pinPoints.has(pin.name)) pinPoints.set(pin.name, own);
    }
    return met.slice(1).map(({ layerIndex, point }, i) => ({
      a: met[i]!.point,
      b: point,
      atM,
      fromLayerIndex: met[i]!.layerIndex,
      toLayerIndex: layerIndex,
      drillM,
    }));
  });
}

function segmentsOf(
  pieces: readonly CopperPiece[],
  stops: readonly { fraction: number; point: number }[][],
  nodes: readonly GraphNode[],
  nodeOf: (point: number) => number,
): GraphSegment[] {
  const segments: GraphSegment[] = [];
  const seen = new Set<string>();
  for (const [i, piece] of pieces.entries()) {
    const ordered = [...stops[i]!].sort((one, other) => one.fraction - other.fraction);
    for (let s = 1; s < ordered.length; s++) {
      const nodeA = nodeOf(ordered[s - 1]!.point);
      const nodeB = nodeOf(ordered[s]!.point);
      const key = nodeA < nodeB ? `${nodeA} ${nodeB}` : `${nodeB} ${nodeA}`;
      if (nodeA === nodeB || seen.has(key)) continue;
      seen.add(key);
      const fromM = nodes[nodeA]!.atM;
      const toM = nodes[nodeB]!.atM;
      const lengthM = Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1]);
      if (lengthM === 0) continue;
      segments.push({ nodeA, nodeB, fromM, toM, layerIndex: piece.layerIndex, widthM: piece.widthM, lengthM });
    }
  }
  return segments;
}

function countIslands(nodeCount: number, links: readonly { nodeA: number; nodeB: number }[]): number {
  const parent = Int32Array.from({ length: nodeCount }, (_, i) => i);
  const find = (i: number): number => {
    let root = i;
    while (parent[root] !== root) {
      parent[root] = parent[parent[root]!]!;
      root = parent[root]!;
    }
    return root;
  };
  for (const { nodeA, nodeB } of links) parent[find(nodeA)] = find(nodeB);
  return new Set(links.map(({ nodeA }) => find(nodeA))).size;
}
