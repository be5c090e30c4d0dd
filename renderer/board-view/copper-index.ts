import Flatbush from 'flatbush';
import type { Net, PointM } from '../../app/board/board.ts';

/** Everything of copper that can be pointed at, in one spatial index. */

export interface CopperPiece {
  readonly net: string;
  readonly kind: 'trace' | 'via' | 'pin';
  readonly fromM: PointM;
  readonly toM: PointM;
  /** Half the trace's width; radius of vias and pins. */
  readonly radiusM: number;
  /** Indices into the stackup, from the top downwards. */
  readonly firstLayer: number;
  readonly lastLayer: number;
  /** A pin's name. */
  readonly name?: string;
}

/** A pin has no size in the model: a dot of this radius stands for it. */
export const PIN_RADIUS_M = 0.2e-3;

export interface CopperIndex {
  readonly pieces: readonly CopperPiece[];
  /** Null for a board without copper pieces. */
  readonly boxes: Flatbush | null;
  /** The largest radius of a piece: how far about a place pieces must be looked for. */
  readonly widestM: number;
}

export function indexCopper(nets: readonly Net[]): CopperIndex {
  const pieces = nets.flatMap(piecesOf);
  return {
    pieces,
    boxes: boxesOf(pieces),
    widestM: pieces.reduce((most, { radiusM }) => Math.max(most, radiusM), 0),
  };
}

function piecesOf({ name: net, traces, vias, pins }: Net): CopperPiece[] {
  const ofTraces = traces.flatMap(({ pointsM, widthM, layerIndex }) =>
    pointsM.slice(1).map(
      (toM, i): CopperPiece => ({
        net,
        kind: 'trace',
        fromM: pointsM[i]!,
        toM,
        radiusM: widthM / 2,
        firstLayer: layerIndex,
        lastLayer: layerIndex,
      }),
    ),
  );
  const ofVias = vias.map(
    ({ atM, drillM, fromLayerIndex, toLayerIndex }): CopperPiece => ({
      net,
      kind: 'via',
      fromM: atM,
      toM: atM,
      radiusM: drillM / 2,
      firstLayer: fromLayerIndex,
      lastLayer: toLayerIndex,
    }),
  );
  const ofPins = pins.map(
    ({ atM, layerIndex, name }): CopperPiece => ({
      net,
      kind: 'pin',
      fromM: atM,
      toM: atM,
      radiusM: PIN_RADIUS_M,
      firstLayer: layerIndex,
      lastLayer: layerIndex,
      name,
    }),
  );
  return [...ofTraces, ...ofVias, ...ofPins];
}

interface Straight {
  readonly fromM: readonly number[];
  readonly toM: readonly number[];
}

/** Index over straight pieces by their middle lines. */
export function boxesOf(pieces: readonly Straight[]): Flatbush | null {
  if (pieces.length === 0) return null;
  const boxes = new Flatbush(pieces.length);
  for (const { fromM, toM } of pieces) {
    boxes.add(
      Math.min(fromM[0]!, toM[0]!),
      Math.min(fromM[1]!, toM[1]!),
      Math.max(fromM[0]!, toM[0]!),
      Math.max(fromM[1]!, toM[1]!),
    );
  }
  boxes.finish();
  return boxes;
}

/** Distance of a point from a straight piece, m; heights are left out. */
export function distanceM([xM, yM]: PointM, { fromM, toM }: Straight): number {
  const alongX = toM[0]! - fromM[0]!;
  const alongY = toM[1]! - fromM[1]!;
  const squared = alongX * alongX + alongY * alongY;
  const share = squared === 0 ? 0 : ((xM - fromM[0]!) * alongX + (yM - fromM[1]!) * alongY) / squared;
  const within = Math.min(1, Math.max(0, share));
  return Math.hypot(xM - fromM[0]! - within * alongX, yM - fromM[1]! - within * alongY);
}
