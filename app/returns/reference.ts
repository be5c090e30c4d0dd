import type { Board, PointM, StackLayer } from '../board/board.ts';
import { coveredStretches, type Region, type Stretch, uncoveredStretches } from '../geometry/polygon.ts';

/** A copper plane that carries (part of) a trace's return. */
export interface ReferencePlane {
  readonly layerIndex: number;
  readonly net: string;
  /** Dielectric between the facing surfaces of trace and plane, m. */
  readonly heightM: number;
  /** Share of the return: planes on both sides split it in inverse proportion to their distances. */
  readonly share: number;
  /** Surface of the trace that faces the plane, and of the plane that faces the trace, board z, m. */
  readonly traceZM: number;
  readonly planeZM: number;
  /** Dielectric rows between them. */
  readonly rows: readonly StackLayer[];
}

export interface SegmentReference {
  /** None, one, or two (below, above). */
  readonly planes: readonly ReferencePlane[];
  /** Stretches of the segment where the nearest chosen plane is missing under it. */
  readonly gaps: readonly Stretch[];
}

/** Part of a straight way (fractions of its length) over planes of one net. */
export interface NetStretch extends Stretch {
  readonly net: string;
}

/** A plane serves a segment when it covers at least this much of its length; the rest is a gap finding. */
const SERVING_FRACTION = 0.5;

/** How far a way around an opening is looked for, m: longer than any board. */
const LONGEST_LOOK_M = 1;

/** Areas of one layer by the net they belong to; what a segment's coverage is asked of. */
export class PlaneIndex {
  readonly #byLayer = new Map<number, { net: string; region: Region }[]>();
  readonly #board: Board;

  constructor(board: Board) {
    this.#board = board;
    for (const plane of board.planes) {
      const list = this.#byLayer.get(plane.layerIndex) ?? [];
      list.push({ net: plane.net, region: plane });
      this.#byLayer.set(plane.layerIndex, list);
    }
  }

  /**
   * Reference planes of a straight segment: below and above, the nearest copper layer whose planes (of other nets than
   * the segment's own) cover at least half of it. A layer that covers less is taken only when none covers more.
   */
  referenceOf(fromM: PointM, toM: PointM, layerIndex: number, ownNet: string): SegmentReference {
    const below = this.#nearest(fromM, toM, layerIndex, ownNet, 1);
    const above = this.#nearest(fromM, toM, layerIndex, ownNet, -1);
    const serving = [below, above].filter((found) => found !== null && found.fraction >= SERVING_FRACTION);
    const partial = [below, above]
      .filter((found) => found !== null)
      .sort((one, other) => other!.fraction - one!.fraction);
    const chosen = (serving.length > 0 ? serving : partial.slice(0, 1)) as Candidate[];
    if (chosen.length === 0) return { planes: [], gaps: [{ from: 0, to: 1 }] };
    const inverse = chosen.map(({ plane }) => 1 / plane.heightM);
    const sum = inverse.reduce((total, value) => total + value, 0);
    const nearest = chosen.reduce((one, other) => (other.plane.heightM < one.plane.heightM ? other : one));
    return {
      planes: chosen.map(({ plane }, i) => ({ ...plane, share: inverse[i]! / sum })),
      gaps: uncoveredStretches(nearest.covered),
    };
  }

  /** Planes of one layer (of other nets than the trace's own) under a straight way, in order of where each begins under it. */
  netsAlong(layerIndex: number, fromM: PointM, toM: PointM, ownNet: string): NetStretch[] {
    const areas = (this.#byLayer.get(layerIndex) ?? []).filter(({ net }) => net !== ownNet);
    return [...new Set(areas.map(({ net }) => net))]
      .flatMap((net) => {
        const own = areas.filter((area) => area.net === net).map(({ region }) => region);
        return coveredStretches(fromM, toM, own).map((stretch) => ({ net, ...stretch }));
      })
      .sort((one, other) => one.from - other.from);
  }

  /** Distance from a place without copper to the layer's copper in one direction (unit vector), m; Infinity: none. */
  distanceToCopperM(layerIndex: number, [x, y]: PointM, [dx, dy]: PointM): number {
    const regions = (this.#byLayer.get(layerIndex) ?? []).map(({ region }) => region);
    const covered = coveredStretches([x, y], [x + dx * LONGEST_LOOK_M, y + dy * LONGEST_LOOK_M], regions);
    return covered.length > 0 ? covered[0]!.from * LONGEST_LOOK_M : Infinity;
  }

  #nearest(fromM: PointM, toM: PointM, layerIndex: number, ownNet: string, step: 1 | -1): Candidate | null {
    const { stackup } = this.#board;
    let best: Candidate | null = null;
    for (let i = layerIndex + step; i >= 0 && i < stackup.length; i += step) {
      const areas = this.#byLayer.get(i)?.filter(({ net }) => net !== ownNet);
      if (!areas || areas.length === 0) continue;
      const covered = coveredStretches(
        fromM,
        toM,
        areas.map(({ region }) => region),
      );
      const fraction = covered.reduce((sum, { from, to }) => sum + to - from, 0);
      if (fraction > (best?.fraction ?? 0))
        best = { plane: this.#planeAt(layerIndex, i, areas, fromM, toM), covered, fraction };
      if (fraction >= SERVING_FRACTION) break;
    }
    return best;
  }

  #planeAt(
    traceLayer: number,
    planeLayer: number,
    areas: readonly { net: string; region: Region }[],
    fromM: PointM,
    toM: PointM,
  ): ReferencePlane {
    const { stackup } = this.#board;
    const trace = stackup[traceLayer]!;
    const plane = stackup[planeLayer]!;
    const isBelow = planeLayer > traceLayer;
    const traceZM = isBelow ? trace.zBottomM : trace.zTopM;
    const planeZM = isBelow ? plane.zTopM : plane.zBottomM;
    const rows = stackup
      .slice(Math.min(traceLayer, planeLayer) + 1, Math.max(traceLayer, planeLayer))
      .filter((row) => row.kind === 'dielectric');
    return {
      layerIndex: planeLayer,
      net: netCovering(areas, fromM, toM),
      heightM: Math.abs(traceZM - planeZM),
      share: 1,
      traceZM,
      planeZM,
      rows,
    };
  }
}

interface Candidate {
  readonly plane: ReferencePlane;
  readonly covered: readonly Stretch[];
  readonly fraction: number;
}

/** Net of the plane that covers most of the segment. */
function netCovering(areas: readonly { net: string; region: Region }[], fromM: PointM, toM: PointM): string {
  const first = areas[0]!;
  if (areas.every(({ net }) => net === first.net)) return first.net;
  let best = first.net;
  let most = -1;
  for (const { net, region } of areas) {
    const length = coveredStretches(fromM, toM, [region]).reduce((sum, { from, to }) => sum + to - from, 0);
    if (length > most) {
      most = length;
      best = net;
    }
  }
  return best;
}
