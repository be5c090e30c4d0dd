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

/** A piece's gaps and the cells under its ends (−1: none). */
interface PieceWalk {
  readonly gaps: readonly ReturnGap[];
  readonly firstCell: number;
  readonly lastCell: number;
}

/** An end of a piece at a joint, with the cell under it (−1: none). */
interface PieceEndAt {
  readonly piece: number;
  readonly isStart: boolean;
  readonly cell: number;
}

/**
 * Openings under the pieces of one net. A piece may enter or leave an opening at its end when another piece goes on there; pieces
 * that meet on an opening (a bend on the line of a slot), each still over copper, have a gap to their joint. An opening that
 * reaches a terminal (an end where no other piece goes on) has no copper behind it: the return filament is kept there as
 * drawn, and the opening is counted in `terminals`.
 */
export function findReturnGaps(
  sheet: Sheet,
  pieces: readonly PairPiece[],
): { readonly gaps: ReturnGap[]; readonly terminals: number } {
  const walks = pieces.map((piece, index) => walkPiece(sheet, piece, index));
  const joints = jointsOf(pieces, walks);
  const found = walks.flatMap(({ gaps }) => gaps);
  for (const ends of joints.values()) found.push(...gapsAtJoint(sheet, pieces, ends));
  found.sort((one, other) => one.piece - other.piece || one.fromM - other.fromM);

  const group = found.map((_, index) => index);
  const root = (index: number): number => {
    let at = index;
    while (group[at] !== at) at = group[at]!;
    return at;
  };
  const openAt = new Map<string, number[]>();
  const addOpen = (gap: number, point: PointM): void => {
    const key = keyOf(point);
    openAt.set(key, [...(openAt.get(key) ?? []), gap]);
  };
  for (const [index, gap] of found.entries()) {
    const piece = pieces[gap.piece]!;
    if (gap.fromCell < 0) addOpen(index, piece.fromM);
    if (gap.toCell < 0) addOpen(index, piece.toM);
  }
  const atTerminal = new Set<number>();
  for (const gapsHere of openAt.values()) {
    if (gapsHere.length === 1) atTerminal.add(gapsHere[0]!);
    for (const gap of gapsHere) group[root(gap)] = root(gapsHere[0]!);
  }
  const keptGroups = new Set([...atTerminal].map(root));
  const gaps = found.filter((_, index) => !keptGroups.has(root(index)));
  return { gaps, terminals: atTerminal.size };
}

const keyOf = ([x, y]: PointM): string => `${Math.round(x / SAME_POINT_M)} ${Math.round(y / SAME_POINT_M)}`;

/** Ends of pieces by their place. */
function jointsOf(pieces: readonly PairPiece[], walks: readonly PieceWalk[]): Map<string, PieceEndAt[]> {
  const joints = new Map<string, PieceEndAt[]>();
  const add = (point: PointM, end: PieceEndAt): void => {
    const known = joints.get(keyOf(point));
    if (known) known.push(end);
    else joints.set(keyOf(point), [end]);
  };
  for (const [piece, { fromM, toM }] of pieces.entries()) {
    add(fromM, { piece, isStart: true, cell: walks[piece]!.firstCell });
    add(toM, { piece, isStart: false, cell: walks[piece]!.lastCell });
  }
  return joints;
}

/**
 * Where the cells under the ends that meet do not all conduct to each other, every return filament stops at its own cell: their
 * currents sum to zero, so what is injected does too.
 */
function gapsAtJoint(sheet: Sheet, pieces: readonly PairPiece[], ends: readonly PieceEndAt[]): ReturnGap[] {
  const [first] = ends;
  if (!first || ends.every(({ cell }) => cell < 0)) return [];
  if (first.cell >= 0 && ends.every(({ cell }) => cell >= 0 && conducts(sheet, first.cell, cell))) return [];
  return ends.flatMap(({ piece, isStart, cell }): ReturnGap[] => {
    if (cell < 0) return [];
    const lengthM = pieceLengthM(pieces[piece]!);
    const atM = projectionM(sheet, pieces[piece]!, cell, lengthM);
    return isStart
      ? [{ piece, fromM: 0, toM: atM, fromCell: -1, toCell: cell }]
      : [{ piece, fromM: atM, toM: lengthM, fromCell: cell, toCell: -1 }];
  });
}

function walkPiece(sheet: Sheet, piece: PairPiece, index: number): PieceWalk {
  const { originXM, originYM, cellM } = sheet.grid;
  const lengthM = pieceLengthM(piece);
  const gaps: ReturnGap[] = [];
  let firstCell: number | null = null;
  let lastCell = -1;
  let isBroken = false;
  for (const { fromM, toM } of walkGrid(piece.fromM, piece.toM, originXM, originYM, cellM / 2)) {
    const t = (fromM + toM) / 2 / lengthM;
    const x = (piece.fromM[0] + t * (piece.toM[0] - piece.fromM[0]) - originXM) / cellM;
    const y = (piece.fromM[1] + t * (piece.toM[1] - piece.fromM[1]) - originYM) / cellM;
    const cell = cellUnder(sheet, x, y);
    firstCell ??= cell;
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
  return { gaps, firstCell: firstCell ?? -1, lastCell: isBroken ? -1 : lastCell };
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
