import type { PointM } from '../board/board.ts';
import { walkGrid } from './grid-walk.ts';
import { type PairPiece, pieceLengthM } from './pair-piece.ts';
import { cellCentreXM, cellCentreYM, cellUnder, isLinked, type Sheet } from './sheet.ts';

/** Part of a piece whose return filament is missing: from the centre of the last cell before an opening to the first behind it. */
export interface ReturnGap {
  /** Index into the pieces. */
  readonly piece: number;
  /** Arc length from the piece's start, m. */
  readonly fromM: number;
  readonly toM: number;
  /** Cell the filament stops in and cell it starts again in; −1 where the gap runs on into a neighbouring piece. */
  readonly fromCell: number;
  readonly toCell: number;
}

/** Ends closer than this are one point. */
const SAME_POINT_M = 1e-9;

/**
 * Openings under the pieces of one net. A piece may enter or leave an opening at its end when another piece goes on there. An
 * opening that reaches a terminal (an end where no other piece goes on) has no copper behind it: the return filament
 * is kept there as drawn, and the opening is counted in `terminals`.
 */
export function findReturnGaps(
  sheet: Sheet,
  pieces: readonly PairPiece[],
): { readonly gaps: ReturnGap[]; readonly terminals: number } {
  const found = pieces.flatMap((piece, index) => gapsOfPiece(sheet, piece, index));
  const group = found.map((_, index) => index);
  const root = (index: number): number => {
    let at = index;
    while (group[at] !== at) at = group[at]!;
    return at;
  };
  const atTerminal = new Set<number>();
  const openEnds: { readonly gap: number; readonly pointM: PointM }[] = [];
  for (const [index, gap] of found.entries()) {
    const piece = pieces[gap.piece]!;
    if (gap.fromCell < 0) openEnds.push({ gap: index, pointM: piece.fromM });
    if (gap.toCell < 0) openEnds.push({ gap: index, pointM: piece.toM });
  }
  for (const { gap, pointM } of openEnds) {
    const partners = openEnds.filter((other) => other.gap !== gap && isSamePoint(other.pointM, pointM));
    if (partners.length === 0) atTerminal.add(gap);
    for (const partner of partners) group[root(partner.gap)] = root(gap);
  }
  const keptGroups = new Set([...atTerminal].map(root));
  const gaps = found.filter((_, index) => !keptGroups.has(root(index)));
  return { gaps, terminals: atTerminal.size };
}

const isSamePoint = (a: PointM, b: PointM): boolean => Math.hypot(a[0] - b[0], a[1] - b[1]) < SAME_POINT_M;

function gapsOfPiece(sheet: Sheet, piece: PairPiece, index: number): ReturnGap[] {
  const { originXM, originYM, cellM } = sheet.grid;
  const lengthM = pieceLengthM(piece);
  const gaps: ReturnGap[] = [];
  let lastCell = -1;
  let isBroken = false;
  for (const { fromM, toM } of walkGrid(piece.fromM, piece.toM, originXM, originYM, cellM / 2)) {
    const t = (fromM + toM) / 2 / lengthM;
    const x = (piece.fromM[0] + t * (piece.toM[0] - piece.fromM[0]) - originXM) / cellM;
    const y = (piece.fromM[1] + t * (piece.toM[1] - piece.fromM[1]) - originYM) / cellM;
    const cell = cellUnder(sheet, x, y);
    if (cell < 0) {
      isBroken = true;
      continue;
    }
    if (isBroken || (lastCell >= 0 && !conducts(sheet, lastCell, cell))) {
      const startM = lastCell < 0 ? 0 : projectionM(sheet, piece, lastCell, lengthM);
      const endM = projectionM(sheet, piece, cell, lengthM);
      gaps.push({ piece: index, fromM: startM, toM: endM, fromCell: lastCell, toCell: cell });
    }
    lastCell = cell;
    isBroken = false;
  }
  if (isBroken) {
    const startM = lastCell < 0 ? 0 : projectionM(sheet, piece, lastCell, lengthM);
    gaps.push({ piece: index, fromM: startM, toM: lengthM, fromCell: lastCell, toCell: -1 });
  }
  return gaps;
}

/** Arc length where the piece is nearest to the cell's centre. */
function projectionM(sheet: Sheet, { fromM, toM }: PairPiece, cell: number, lengthM: number): number {
  const dx = (toM[0] - fromM[0]) / lengthM;
  const dy = (toM[1] - fromM[1]) / lengthM;
  const along = (cellCentreXM(sheet, cell) - fromM[0]) * dx + (cellCentreYM(sheet, cell) - fromM[1]) * dy;
  return Math.max(0, Math.min(lengthM, along));
}

/** Does current pass between two cells that follow each other under a trace? Over a corner: by way of either neighbour. */
function conducts(sheet: Sheet, a: number, b: number): boolean {
  if (a === b) return true;
  const columns = sheet.columnOf[b]! - sheet.columnOf[a]!;
  const rows = sheet.rowOf[b]! - sheet.rowOf[a]!;
  if (Math.abs(columns) > 1 || Math.abs(rows) > 1) return false;
  const column = sheet.columnOf[a]!;
  const row = sheet.rowOf[a]!;
  if (rows === 0) return isLinked(sheet, column, row, columns, 0);
  if (columns === 0) return isLinked(sheet, column, row, 0, rows);
  return (
    (isLinked(sheet, column, row, columns, 0) && isLinked(sheet, column + columns, row, 0, rows)) ||
    (isLinked(sheet, column, row, 0, rows) && isLinked(sheet, column, row + rows, columns, 0))
  );
}
