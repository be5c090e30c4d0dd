import type { Plane, PointM } from '../../app/board/board.ts';
import { isInsideRegion } from '../../app/geometry/polygon.ts';
import { type CopperIndex, type CopperPiece, distanceM } from './copper-index.ts';

/** What lies under the pointer. */

export interface LayerSight {
  /** Layers of the stackup that are shown. */
  readonly isShown: (layerIndex: number) => boolean;
  /** Lies on top whatever its place. */
  readonly activeLayer: number;
  readonly isFromBottom: boolean;
}

export interface Hit {
  readonly net: string;
  readonly layerIndex: number;
  /** Absent: a plane. */
  readonly piece?: CopperPiece;
}

/** Depth under the eye: the active layer first, then from the side that is looked at. */
export function depthOf(layerIndex: number, { activeLayer, isFromBottom }: LayerSight): number {
  if (layerIndex === activeLayer) return -Infinity;
  return isFromBottom ? -layerIndex : layerIndex;
}

/** Copper at a place or within reach of it: copper that is really under the pointer wins, then the upper layer, then the nearer. */
export function hitCopper(
  index: CopperIndex,
  planes: readonly Plane[],
  at: PointM,
  reachM: number,
  sight: LayerSight,
): Hit | null {
  return hitPiece(index, at, reachM, sight) ?? hitPlane(planes, at, sight);
}

interface Candidate {
  readonly piece: CopperPiece;
  readonly layerIndex: number;
  readonly depth: number;
  /** From the copper's edge; 0 on it. */
  readonly offM: number;
}

function hitPiece({ pieces, boxes, widestM }: CopperIndex, at: PointM, reachM: number, sight: LayerSight): Hit | null {
  if (boxes === null) return null;
  const [xM, yM] = at;
  const searchM = reachM + widestM;
  let best: Candidate | null = null;
  for (const i of boxes.search(xM - searchM, yM - searchM, xM + searchM, yM + searchM)) {
    const piece = pieces[i]!;
    const offM = Math.max(0, distanceM(at, piece) - piece.radiusM);
    if (offM > reachM) continue;
    const layerIndex = uppermostShown(piece, sight);
    if (layerIndex === null) continue;
    const candidate = { piece, layerIndex, depth: depthOf(layerIndex, sight), offM };
    if (best === null || isBefore(candidate, best)) best = candidate;
  }
  return best && { net: best.piece.net, layerIndex: best.layerIndex, piece: best.piece };
}

const isBefore = (one: Candidate, other: Candidate): boolean => {
  const isOn = one.offM === 0;
  if (isOn !== (other.offM === 0)) return isOn;
  return isOn ? one.depth < other.depth : one.offM < other.offM || (one.offM === other.offM && one.depth < other.depth);
};

/** The shown layer of a piece that is nearest to the eye; null when none is shown. */
function uppermostShown({ firstLayer, lastLayer }: CopperPiece, sight: LayerSight): number | null {
  let best: number | null = null;
  for (let layer = firstLayer; layer <= lastLayer; layer++) {
    if (sight.isShown(layer) && (best === null || depthOf(layer, sight) < depthOf(best, sight))) best = layer;
  }
  return best;
}

function hitPlane(planes: readonly Plane[], [xM, yM]: PointM, sight: LayerSight): Hit | null {
  let best: Plane | null = null;
  for (const plane of planes) {
    if (!sight.isShown(plane.layerIndex) || !isInsideRegion(plane, xM, yM)) continue;
    if (best === null || depthOf(plane.layerIndex, sight) < depthOf(best.layerIndex, sight)) best = plane;
  }
  return best && { net: best.net, layerIndex: best.layerIndex };
}
