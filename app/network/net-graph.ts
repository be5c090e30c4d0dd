import type { Net, PointM } from '../board/board.ts';
import { attachPinsToTraces, attachRemainingPins, distanceM, type PinPoints } from './attach-pins.ts';
import { Copper, SAME_PLACE_M } from './copper.ts';
import { joinExactly } from './exact-joints.ts';
import { type Barrel, barrelsOf, joinVias } from './join-vias.ts';
import { joinLooseEnds, joinOverlappingParts, LooseEnds, trimLooseEnds } from './loose-ends.ts';

export interface GraphNode {
  readonly atM: PointM;
  readonly layerIndex: number;
}

/** A straight piece of copper between two nodes: A at `fromM`, B at `toM`, which are the nodes' places. */
export interface GraphSegment {
  readonly nodeA: number;
  readonly nodeB: number;
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly layerIndex: number;
  readonly widthM: number;
  readonly lengthM: number;
}

/** A piece of a barrel between two layers on which the net has copper there, nearest neighbours in the stackup. */
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
  /** Of two pins with one name the first that has copper. */
  readonly pinNodes: ReadonlyMap<string, number>;
  /** How far each pin's centre is from its node, m. */
  readonly pinOffsetsM: ReadonlyMap<string, number>;
  /** Pins without copper of the net within reach. */
  readonly unattachedPins: readonly string[];
  /** Connected parts of the copper. */
  readonly islands: number;
}

/**
 * The copper of one net as a graph.
 *
 * What is drawn as joined is joined (within 1 µm): ends at one place, ends on another trace of the layer, crossings, doubles.
 * Beyond that an end where nothing joins is joined to copper it overlaps (within half a width), to a via's pad, or to
 * the nearest pin within 0.6 mm; separate parts are joined where one lies on the other. Loops stay. A joint's place is that
 * inside a straight trace, else that of its ends, else (ends at several places) the pad's: ends are stretched or cut to it,
 * by at most those reaches. Throws `input` for coordinates off any board and for drawings with tens of millions of overlaps.
 */
export function buildNetGraph(net: Net): NetGraph {
  const copper = new Copper(net);
  joinExactly(copper);
  const looseEnds = new LooseEnds(copper);
  trimLooseEnds(copper, looseEnds);
  joinLooseEnds(copper, looseEnds);
  joinOverlappingParts(copper);
  const vias = joinVias(copper, looseEnds, net.vias);
  const pinPoints = attachPinsToTraces(copper, looseEnds, net.pins);
  const barrels = barrelsOf(copper, vias, net.pins, pinPoints);
  attachRemainingPins(copper, net.pins, pinPoints);
  joinSpecks(copper);
  return graphOf(copper, barrels, pinPoints);
}

/** Place of every node (by its lowest point): inside a piece, else where all its ends are, else a pad, else the first end. */
function placesOf(copper: Copper): Map<number, PointM> {
  const kinds = new Map<number, { inside?: PointM; end?: PointM; pad?: PointM; isSpread: boolean }>();
  for (const [i, { atM, kind }] of copper.points.entries()) {
    const node = copper.nodeOf(i);
    const known = kinds.get(node) ?? { isSpread: false };
    kinds.set(node, known);
    if (kind === 'end' && known.end && distanceM(known.end, atM) > SAME_PLACE_M) known.isSpread = true;
    known[kind] ??= atM;
  }
  const places = new Map<number, PointM>();
  for (const [node, { inside, end, pad, isSpread }] of kinds) {
    places.set(node, inside ?? (isSpread ? (pad ?? end!) : (end ?? pad!)));
  }
  return places;
}

/** Neighbours on a piece whose nodes came to lie at one place become one node, until none are left. */
function joinSpecks(copper: Copper): void {
  for (let isChanged = true; isChanged; ) {
    isChanged = false;
    const places = placesOf(copper);
    for (const stops of copper.stops) {
      stops.sort((one, other) => one.fraction - other.fraction);
      for (let i = 1; i < stops.length; i++) {
        const a = copper.nodeOf(stops[i - 1]!.point);
        const b = copper.nodeOf(stops[i]!.point);
        const from = places.get(a);
        const to = places.get(b);
        // Nodes joined in this round have lost their entry or keep an older place: the next round looks again.
        if (a === b || !from || !to || distanceM(from, to) > SAME_PLACE_M) continue;
        copper.join(a, b);
        isChanged = true;
      }
    }
  }
}

function graphOf(copper: Copper, barrels: readonly Barrel[], pinPoints: PinPoints): NetGraph {
  const places = placesOf(copper);
  const nodes: GraphNode[] = [];
  const numbers = new Map<number, number>();
  const parts = new Set<number>();
  const nodeOf = (point: number): number => {
    const node = copper.nodeOf(point);
    const known = numbers.get(node);
    if (known !== undefined) return known;
    numbers.set(node, nodes.length);
    parts.add(copper.partOf(point));
    nodes.push({ atM: places.get(node)!, layerIndex: copper.points[node]!.layerIndex });
    return nodes.length - 1;
  };

  const segments = segmentsOf(copper, nodes, nodeOf);
  const vias = barrels.map(({ pointA, pointB, ...barrel }) => ({
    nodeA: nodeOf(pointA),
    nodeB: nodeOf(pointB),
    ...barrel,
  }));
  const pinNodes = new Map<string, number>();
  const pinOffsetsM = new Map<string, number>();
  for (const pin of copper.net.pins) {
    const point = pinPoints.get(pin);
    if (point === undefined || pinNodes.has(pin.name)) continue;
    const node = nodeOf(point);
    pinNodes.set(pin.name, node);
    pinOffsetsM.set(pin.name, distanceM(nodes[node]!.atM, pin.atM));
  }
  const unattachedPins = [...new Set(copper.net.pins.map(({ name }) => name))].filter((name) => !pinNodes.has(name));
  return { nodes, segments, vias, pinNodes, pinOffsetsM, unattachedPins, islands: parts.size };
}

/** Segments between neighbouring stops; between two nodes of a layer only one, the widest. */
function segmentsOf(copper: Copper, nodes: readonly GraphNode[], nodeOf: (point: number) => number): GraphSegment[] {
  const segments = new Map<string, GraphSegment>();
  for (const [i, { layerIndex, widthM }] of copper.pieces.entries()) {
    const stops = copper.stops[i]!;
    for (let s = 1; s < stops.length; s++) {
      const nodeA = nodeOf(stops[s - 1]!.point);
      const nodeB = nodeOf(stops[s]!.point);
      if (nodeA === nodeB) continue;
      const key = nodeA < nodeB ? `${nodeA} ${nodeB}` : `${nodeB} ${nodeA}`;
      const known = segments.get(key);
      if (known && known.widthM >= widthM) continue;
      const fromM = nodes[nodeA]!.atM;
      const toM = nodes[nodeB]!.atM;
      segments.set(key, { nodeA, nodeB, fromM, toM, layerIndex, widthM, lengthM: distanceM(fromM, toM) });
    }
  }
  return [...segments.values()];
}
