import { type CopperRuns, copperRuns, profileRatio } from './edge-profile.ts';
import type { Mesh } from './mesh.ts';
import { cellAtIndex, type Sheet } from './sheet.ts';

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
  const own = Math.floor(across);
  const next = across - own < 0.5 ? own - 1 : own + 1;
  const cellAt = (row: number): number => (isX ? cellAtIndex(sheet, along, row) : cellAtIndex(sheet, row, along));
  const edgeOf = (cell: number): number => (cell < 0 ? -1 : (isX ? rightEdge : upEdge)[cell]!);
  const ownCell = cellAt(own);
  const ownEdge = edgeOf(ownCell);
  if (ownEdge < 0) return;
  const first = isX ? runs.firstRow[ownCell]! : runs.firstColumn[ownCell]!;
  const end = isX ? runs.endRow[ownCell]! : runs.endColumn[ownCell]!;
  const nextEdge = next >= first && next < end ? edgeOf(cellAt(next)) : -1;
  const nextShare = nextEdge < 0 ? 0 : Math.abs(across - own - 0.5);
  edges.push(ownEdge);
  factors.push(factor * (1 - nextShare) * profileRatio(across, h, own, first, end));
  if (nextEdge < 0) return;
  edges.push(nextEdge);
  factors.push(factor * nextShare * profileRatio(across, h, next, first, end));
}

/** Cells that share a charge at a point so that its centre stays: linear both ways, as far as copper connects. Shares sum to 1. */
export function cellShares(sheet: Sheet, x: number, y: number): { readonly cell: number; readonly share: number }[] {
  const column = Math.floor(x);
  const row = Math.floor(y);
  const own = cellAtIndex(sheet, column, row);
  if (own < 0) return [];
  const stepX = x - column < 0.5 ? -1 : 1;
  const stepY = y - row < 0.5 ? -1 : 1;
  const isBesideX = isLinked(sheet, column, row, stepX, 0);
  const isBesideY = isLinked(sheet, column, row, 0, stepY);
  const shareX = isBesideX ? Math.abs(x - column - 0.5) : 0;
  const isDiagonal =
    (isBesideX && isLinked(sheet, column + stepX, row, 0, stepY)) ||
    (isBesideY && isLinked(sheet, column, row + stepY, stepX, 0));
  const shareY = isBesideY && (!isBesideX || isDiagonal) ? Math.abs(y - row - 0.5) : 0;
  const out = [{ cell: own, share: (1 - shareX) * (1 - shareY) }];
  if (shareX > 0) out.push({ cell: cellAtIndex(sheet, column + stepX, row), share: shareX * (1 - shareY) });
  if (shareY > 0) out.push({ cell: cellAtIndex(sheet, column, row + stepY), share: (1 - shareX) * shareY });
  if (shareX > 0 && shareY > 0) {
    out.push({ cell: cellAtIndex(sheet, column + stepX, row + stepY), share: shareX * shareY });
  }
  return out;
}

/** Does the cell conduct to its neighbour one step away? */
function isLinked(sheet: Sheet, column: number, row: number, stepX: number, stepY: number): boolean {
  const cell = cellAtIndex(sheet, Math.min(column, column + stepX), Math.min(row, row + stepY));
  if (cell < 0) return false;
  return (stepX !== 0 ? sheet.conductsRight : sheet.conductsUp)[cell] === 1;
}
