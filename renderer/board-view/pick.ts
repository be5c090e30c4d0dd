import type { Board, Cable, PointM } from '../../app/board/board.ts';
import type { Finding } from '../../app/estimate/result.ts';
import { boxesOf, type CopperIndex, distanceM } from './copper-index.ts';
import { isOnFlag } from './flags.ts';
import { type Hit, hitCopper, type LayerSight } from './hit-test.ts';
import type { PieceDetail } from './scene.ts';
import { type ScreenPoint, type Size, toScreen, toWorld, type View } from './view.ts';

/** What a place of the picture stands for. */
export type Pick =
  | { readonly kind: 'finding'; readonly finding: number }
  | { readonly kind: 'piece'; readonly piece: number; readonly net: string }
  | { readonly kind: 'cable'; readonly cable: string }
  | ({ readonly kind: 'net' } & Hit);

export interface PickScene {
  readonly board: Board;
  readonly index: CopperIndex;
  readonly sight: LayerSight;
  readonly findings: readonly Finding[];
  readonly cables: readonly Cable[];
  /** Those that are coloured, with their index. */
  readonly pieces: PieceIndex | null;
}

/** A finger or a shaking hand hits what is this near. */
const REACH_PX = 5;
const CABLE_REACH_PX = 6;

export interface PieceIndex {
  readonly pieces: readonly PieceDetail[];
  /** Index into the detail's pieces of each box. */
  readonly numbers: readonly number[];
  readonly boxes: ReturnType<typeof boxesOf>;
}

/** Index over the pieces that pass a test. */
export function indexPieces(pieces: readonly PieceDetail[], isShown: (piece: PieceDetail) => boolean): PieceIndex {
  const numbers = pieces.flatMap((piece, i) => (isShown(piece) ? [i] : []));
  return { pieces, numbers, boxes: boxesOf(numbers.map((i) => pieces[i]!)) };
}

/** Flags lie over cables, cables over coloured pieces, these over copper. */
export function pickAt(scene: PickScene, view: View, size: Size, at: ScreenPoint): Pick | null {
  const finding = scene.findings.findLastIndex(({ atM }) => isOnFlag(toScreen(view, size, atM), at));
  if (finding >= 0) return { kind: 'finding', finding };
  const place = toWorld(view, size, at);
  const reachM = REACH_PX / view.pxPerM;
  const cable = nearestCable(scene.cables, place, CABLE_REACH_PX / view.pxPerM);
  if (cable !== null) return { kind: 'cable', cable };
  const piece = scene.pieces === null ? null : nearestPiece(scene.pieces, place, reachM);
  if (piece !== null) return { kind: 'piece', piece, net: scene.pieces!.pieces[piece]!.net };
  const hit = hitCopper(scene.index, scene.board.planes, place, reachM, scene.sight);
  return hit && { kind: 'net', ...hit };
}

function nearestCable(cables: readonly Cable[], place: PointM, reachM: number): string | null {
  let best: string | null = null;
  let bestM = reachM;
  for (const { name, pointsM } of cables) {
    for (let i = 1; i < pointsM.length; i++) {
      const offM = distanceM(place, { fromM: pointsM[i - 1]!, toM: pointsM[i]! });
      if (offM <= bestM) {
        best = name;
        bestM = offM;
      }
    }
  }
  return best;
}

/** The nearest coloured piece; of equally near ones the strongest, which comes first. */
export function nearestPiece({ pieces, numbers, boxes }: PieceIndex, [xM, yM]: PointM, reachM: number): number | null {
  let best: number | null = null;
  let bestM = reachM;
  for (const box of boxes?.search(xM - reachM, yM - reachM, xM + reachM, yM + reachM) ?? []) {
    const number = numbers[box]!;
    const offM = distanceM([xM, yM], pieces[number]!);
    if (offM < bestM || (offM === bestM && (best === null || number < best))) {
      best = number;
      bestM = offM;
    }
  }
  return best;
}
