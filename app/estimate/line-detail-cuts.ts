import type { Board, Net, Point3M } from '../board/board.ts';
import { buildNetGraph } from '../network/net-graph.ts';

/** A trace is cut into pieces no longer than this, m: a colour along it shows standing waves (λ/20 at 3 GHz in air). */
export const LONGEST_PIECE_M = 5e-3;
/** With more pieces than this, longer ones are made; a straight stretch is never less than one. */
const MOST_PIECES = 5000;

/** A piece of a straight stretch of trace. */
export interface TracePiece {
  readonly section: number;
  /** From node A of its section, m. */
  readonly fromM: number;
  readonly toM: number;
  /** Board axes, middle of the copper, m. */
  readonly start: Point3M;
  readonly end: Point3M;
  readonly layer: string;
}

/** The pieces of every net, in the order of its sections and along them. */
export function cutNets(board: Board, nets: readonly Net[]): Map<string, TracePiece[]> {
  const graphs = nets.map((net) => ({ net, segments: buildNetGraph(net).segments }));
  const lengthsM = graphs.flatMap(({ segments }) => segments.map(({ lengthM }) => lengthM));
  let longestM = LONGEST_PIECE_M;
  const countWith = (mostM: number) => lengthsM.reduce((sum, lengthM) => sum + Math.ceil(lengthM / mostM), 0);
  while (countWith(longestM) > Math.max(MOST_PIECES, lengthsM.length)) longestM *= 1.25;
  return new Map(
    graphs.map(({ net, segments }) => [
      net.name,
      segments.flatMap(({ fromM, toM, lengthM, layerIndex }, section): TracePiece[] => {
        const { name: layer, zBottomM, zTopM } = board.stackup[layerIndex]!;
        const at = (part: number): Point3M => [
          fromM[0] + part * (toM[0] - fromM[0]),
          fromM[1] + part * (toM[1] - fromM[1]),
          (zBottomM + zTopM) / 2,
        ];
        const count = Math.ceil(lengthM / longestM);
        return Array.from({ length: count }, (_, i) => ({
          section,
          fromM: (lengthM * i) / count,
          toM: (lengthM * (i + 1)) / count,
          start: at(i / count),
          end: at((i + 1) / count),
          layer,
        }));
      }),
    ]),
  );
}

/** Part (0–1) of a stretch of a section that lies on a piece; a place on the border of two belongs to the later one. */
export function partOnPiece(piece: TracePiece, isLast: boolean, section: number, fromM: number, toM: number): number {
  if (section !== piece.section) return 0;
  if (toM > fromM) return Math.max(0, Math.min(toM, piece.toM) - Math.max(fromM, piece.fromM)) / (toM - fromM);
  return fromM >= piece.fromM && (fromM < piece.toM || isLast) ? 1 : 0;
}
