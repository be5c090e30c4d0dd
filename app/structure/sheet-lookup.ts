import { type CopperRuns, copperRuns, profileRatio } from './edge-profile.ts';
import type { Mesh } from './mesh.ts';
import { cellAtIndex, cellUnder, isLinked, type Sheet } from './sheet.ts';

/** Cells and edges of a sheet as a pair's weights need them. */
export class SheetLookup {
  readonly mesh: Mesh;
  readonly runs: CopperRuns;
  /** Edge to the right of (above) each cell, −1 where it does not conduct. */
  readonly rightEdge: Int32Array;
  readonly upEdge: Int32Array;

  constructor(mesh: Mesh) {
    this.mesh = mesh;
    this.runs = copperRuns(mesh.sheet);
    this.rightEdge = new Int32Array(mesh.sheet.cellCount).fill(-1);
    this.upEdge = new Int32Array(mesh.sheet.cellCount).fill(-1);
    for (let e = 0; e < mesh.xEdgeCount; e++) this.rightEdge[mesh.edgeFrom[e]!] = e;
    for (let e = mesh.xEdgeCount; e < mesh.xEdgeCount + mesh.yEdgeCount; e++) this.upEdge[mesh.edgeFrom[e]!] = e;
  }
}

/** Shares of the edges of one direction under a point: linear between the two nearest rows (columns) that carry current. */
export function addEdgeShares(
  { mesh, runs, rightEdge, upEdge }: SheetLookup,
  direction: 'x' | 'y',
  x: number,
  y: number,
  h: number,
  factor: number,
  edges: number[],
  factors: number[],
): void {
  if (factor === 0) return;
  const { sheet } = mesh;
  const isX = direction === 'x';
  const along = Math.floor((isX ? x : y) - 0.5);
  const across = isX ? y : x;
  const under = cellUnder(sheet, x, y);
  if (under < 0) return;
  const own = (isX ? sheet.rowOf : sheet.columnOf)[under]!;
  const next = across < own + 0.5 ? own - 1 : own + 1;
  const cellAt = (row: number): number => (isX ? cellAtIndex(sheet, along, row) : cellAtIndex(sheet, row, along));
  const edgeOf = (cell: number): number => (cell < 0 ? -1 : (isX ? rightEdge : upEdge)[cell]!);
  const ownCell = cellAt(own);
  const ownEdge = edgeOf(ownCell);
  if (ownEdge < 0) return;
  const first = isX ? runs.firstRow[ownCell]! : runs.firstColumn[ownCell]!;
  const end = isX ? runs.endRow[ownCell]! : runs.endColumn[ownCell]!;
  const nextEdge = next >= first && next < end ? edgeOf(cellAt(next)) : -1;
  const nextShare = nextEdge < 0 ? 0 : Math.min(0.5, Math.abs(across - own - 0.5));
  edges.push(ownEdge);
  factors.push(factor * (1 - nextShare) * profileRatio(across, h, own, first, end));
  if (nextEdge < 0) return;
  edges.push(nextEdge);
  factors.push(factor * nextShare * profileRatio(across, h, next, first, end));
}

/** Cells among which the charge on a stretch of trace is taken, linear both ways as far as copper connects. Shares sum to 1. */
export function cellShares(sheet: Sheet, x: number, y: number): { readonly cell: number; readonly share: number }[] {
  const own = cellUnder(sheet, x, y);
  if (own < 0) return [];
  const column = sheet.columnOf[own]!;
  const row = sheet.rowOf[own]!;
  const stepX = x < column + 0.5 ? -1 : 1;
  const stepY = y < row + 0.5 ? -1 : 1;
  const isBesideX = isLinked(sheet, column, row, stepX, 0);
  const isBesideY = isLinked(sheet, column, row, 0, stepY);
  const shareX = isBesideX ? Math.min(0.5, Math.abs(x - column - 0.5)) : 0;
  const isDiagonal =
    (isBesideX && isLinked(sheet, column + stepX, row, 0, stepY)) ||
    (isBesideY && isLinked(sheet, column, row + stepY, stepX, 0));
  const shareY = isBesideY && (!isBesideX || isDiagonal) ? Math.min(0.5, Math.abs(y - row - 0.5)) : 0;
  const out = [{ cell: own, share: (1 - shareX) * (1 - shareY) }];
  if (shareX > 0) out.push({ cell: cellAtIndex(sheet, column + stepX, row), share: shareX * (1 - shareY) });
  if (shareY > 0) out.push({ cell: cellAtIndex(sheet, column, row + stepY), share: (1 - shareX) * shareY });
  if (shareX > 0 && shareY > 0) {
    out.push({ cell: cellAtIndex(sheet, column + stepX, row + stepY), share: shareX * shareY });
  }
  return out;
}

/**
 * Shares of a point charge near a cell that keep its centre exactly: linear towards the point where copper connects there, else
 * extrapolated from the other side (negative share). Shares sum to 1. A charge off its place by part of a cell would
 * radiate more than the pair itself.
 */
export function pointShares(
  sheet: Sheet,
  cell: number,
  x: number,
  y: number,
): { readonly cell: number; readonly share: number }[] {
  const column = sheet.columnOf[cell]!;
  const row = sheet.rowOf[cell]!;
  const [stepX, shareX] = axisShare(x - column - 0.5, (step) => isLinked(sheet, column, row, step, 0));
  const [stepY, shareY] = axisShare(
    y - row - 0.5,
    (step) => isLinked(sheet, column, row, 0, step) && (shareX === 0 || isLinked(sheet, column + stepX, row, 0, step)),
  );
  return [
    { cell, share: (1 - shareX) * (1 - shareY) },
    { cell: cellAtIndex(sheet, column + stepX, row), share: shareX * (1 - shareY) },
    { cell: cellAtIndex(sheet, column, row + stepY), share: (1 - shareX) * shareY },
    { cell: cellAtIndex(sheet, column + stepX, row + stepY), share: shareX * shareY },
  ].filter(({ share }) => share !== 0);
}

/** Neighbour (step) and its share for a charge `offset` cells from a cell's centre. */
function axisShare(offset: number, isLinkedTo: (step: -1 | 1) => boolean): [step: -1 | 1, share: number] {
  const towards = offset < 0 ? -1 : 1;
  if (Math.abs(offset) < 1e-9) return [towards, 0];
  if (isLinkedTo(towards)) return [towards, Math.abs(offset)];
  const back = -towards as -1 | 1;
  return isLinkedTo(back) ? [back, -Math.abs(offset)] : [towards, 0];
}
