import type { Board, PointM, Via } from '../board/board.ts';
import type { Finding } from '../estimate/result.ts';
import type { ReferencePlane } from '../returns/reference.ts';
import type { EndTerm } from './element-currents.ts';
import { type Leaving, levelsOf, mergeTerms, type Post, postsAt } from './posts.ts';

/** Beyond this distance a stitching via no longer serves the return (physics 5.4), m. */
export const STITCH_REACH_M = 10e-3;

/** A place of a net where currents leave, with what they return in. */
export interface NetPlace {
  readonly atM: PointM;
  readonly net: string;
  readonly hasTerminal: boolean;
  readonly hasVia: boolean;
  readonly leaving: readonly Leaving[];
  readonly planes: readonly ReferencePlane[];
}

/** A straight return current on a plane between the net's via and the stitching via. */
export interface Detour {
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly zM: number;
  readonly terms: readonly EndTerm[];
}

export interface PlaceCurrents {
  readonly posts: readonly Post[];
  readonly detours: readonly Detour[];
  readonly finding: Finding | null;
}

/**
 * Vertical currents and return detours of one place. Where the reference plane changes to another layer (at a via, or where
 * the nearer plane ends), the return crosses at the nearest stitching via of that plane net within 10 mm (its detour is part
 * of the loop); without one it is taken to cross beside the trace, and a finding says so.
 */
export function placeCurrents(board: Board, stitches: StitchIndex, place: NetPlace): PlaceCurrents {
  const planeLayers = [...new Set(place.planes.map(({ layerIndex }) => layerIndex))];
  if (planeLayers.length < 2 || place.hasTerminal) {
    return { posts: postsAt(place.atM, place.leaving), detours: [], finding: null };
  }
  const nets = [...new Set(place.planes.map(({ net }) => net))];
  const stitch = nets.length === 1 ? stitches.nearest(nets[0]!, place.atM, planeLayers) : null;
  if (!stitch || stitch.distanceM > STITCH_REACH_M) {
    return {
      posts: postsAt(place.atM, place.leaving),
      detours: [],
      finding: transitionFinding(board, place, nets, stitch?.distanceM ?? null),
    };
  }
  const onTrace = place.leaving.filter(({ isReturn }) => !isReturn);
  const onPlanes = place.leaving.filter(({ isReturn }) => isReturn);
  const detours = levelsOf(onPlanes).map(
    ({ zM, terms }): Detour => ({ fromM: stitch.via.atM, toM: place.atM, zM, terms: mergeTerms(terms) }),
  );
  return {
    posts: [...postsAt(place.atM, onTrace), ...postsAt(stitch.via.atM, onPlanes)],
    detours,
    finding: null,
  };
}

function transitionFinding(board: Board, place: NetPlace, nets: readonly string[], distanceM: number | null): Finding {
  const layers = place.planes.map(({ layerIndex, net }) => `${net} on ${board.stackup[layerIndex]!.name}`);
  const why =
    nets.length > 1
      ? 'planes of different nets: the return must cross through a capacitor'
      : distanceM === null
        ? 'no stitching via joins them'
        : `the nearest stitching via is ${(distanceM * 1e3).toFixed(1)} mm away`;
  return {
    code: 'return-changes-plane',
    net: place.net,
    message: `${place.hasVia ? 'the layer change' : 'the trace'} moves the return from ${[...new Set(layers)].join(' to ')}; ${why}`,
    atM: [place.atM[0], place.atM[1]],
    layer: board.stackup[place.planes[0]!.layerIndex]!.name,
  };
}

/** Vias of every net that owns a plane, for the nearest one that joins given layers. */
export class StitchIndex {
  readonly #byNet = new Map<string, readonly Via[]>();

  constructor(board: Board) {
    const planeNets = new Set(board.planes.map(({ net }) => net));
    for (const net of board.nets) if (planeNets.has(net.name)) this.#byNet.set(net.name, net.vias);
  }

  nearest(net: string, [x, y]: PointM, layers: readonly number[]): { via: Via; distanceM: number } | null {
    let best: { via: Via; distanceM: number } | null = null;
    for (const via of this.#byNet.get(net) ?? []) {
      if (!layers.every((layer) => layer >= via.fromLayerIndex && layer <= via.toLayerIndex)) continue;
      const distanceM = Math.hypot(via.atM[0] - x, via.atM[1] - y);
      if (!best || distanceM < best.distanceM) best = { via, distanceM };
    }
    return best;
  }
}
