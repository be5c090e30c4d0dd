import { copperRuns } from './edge-profile.ts';
import type { SymmetricMatrix } from './factor.ts';
import type { Mesh } from './mesh.ts';
import { cellAtIndex, type Sheet } from './sheet.ts';
import { slotCorrection } from './slot-kernel.ts';
import { edgeCorrection } from './strip-density.ts';

/**
 * A change of the static kernel of two nodes (1/m) or two edges (m): −value on both diagonals, +value between (what the odd
 * mode sees); with first = second: −value on the diagonal.
 */
interface KernelChange {
  readonly first: number;
  readonly second: number;
  readonly value: number;
}

/** Changes that give slots their true width (`slotCorrection`) and open edges their true place (`edgeCorrection`). */
export interface KernelChanges {
  readonly nodes: readonly KernelChange[];
  readonly edges: readonly KernelChange[];
}

export function boundaryCorrections(mesh: Mesh): KernelChanges {
  const collector = new ChangeCollector(mesh);
  for (const { first, second, across, missingCells, widthM } of mesh.sheet.facing) {
    collector.add(first, second, across, slotCorrection(missingCells, widthM / mesh.sheet.grid.cellM));
  }
  addOpenEdges(mesh.sheet, collector);
  return { nodes: collector.nodes, edges: collector.edges };
}

/** Turns a correction of cells into changes of the cells' kernel and of the edges that run along the boundary. */
class ChangeCollector {
  readonly nodes: KernelChange[] = [];
  readonly edges: KernelChange[] = [];
  readonly #cellM: number;
  /** Edges by the cell they leave to the right (up), and by the cell they arrive in. */
  readonly #leaving = { x: new Map<number, number>(), y: new Map<number, number>() };
  readonly #arriving = { x: new Map<number, number>(), y: new Map<number, number>() };

  constructor({ sheet, edgeFrom, edgeTo, xEdgeCount, yEdgeCount }: Mesh) {
    this.#cellM = sheet.grid.cellM;
    for (let e = 0; e < xEdgeCount + yEdgeCount; e++) {
      const direction = e < xEdgeCount ? 'x' : 'y';
      this.#leaving[direction].set(edgeFrom[e]!, e);
      this.#arriving[direction].set(edgeTo[e]!, e);
    }
  }

  /** `across`: direction across the boundary; `delta`: correction times the cell side. */
  add(first: number, second: number, across: 'x' | 'y', delta: number): void {
    this.nodes.push({ first, second, value: delta / this.#cellM });
    const along = across === 'x' ? 'y' : 'x';
    for (const edges of [this.#leaving[along], this.#arriving[along]]) {
      const a = edges.get(first);
      const b = edges.get(second);
      // An edge spans two half cells, each counts for its half. Partial inductance: a² times the kernel.
      if (a !== undefined && b !== undefined)
        this.edges.push({ first: a, second: b, value: (delta * this.#cellM) / 2 });
    }
  }
}

/** Sides of cells with neither copper nor a facing cell beyond. */
function addOpenEdges(sheet: Sheet, collector: ChangeCollector): void {
  const runs = copperRuns(sheet);
  const hasFacing = {
    x: { before: new Set<number>(), behind: new Set<number>() },
    y: { before: new Set<number>(), behind: new Set<number>() },
  };
  for (const { first, second, across } of sheet.facing) {
    hasFacing[across].behind.add(first);
    hasFacing[across].before.add(second);
  }
  for (let cell = 0; cell < sheet.cellCount; cell++) {
    const column = sheet.columnOf[cell]!;
    const row = sheet.rowOf[cell]!;
    const inX = edgeCorrection(runs.endColumn[cell]! - runs.firstColumn[cell]!);
    const inY = edgeCorrection(runs.endRow[cell]! - runs.firstRow[cell]!);
    if (cellAtIndex(sheet, column - 1, row) < 0 && !hasFacing.x.before.has(cell)) collector.add(cell, cell, 'x', inX);
    if (cellAtIndex(sheet, column + 1, row) < 0 && !hasFacing.x.behind.has(cell)) collector.add(cell, cell, 'x', inX);
    if (cellAtIndex(sheet, column, row - 1) < 0 && !hasFacing.y.before.has(cell)) collector.add(cell, cell, 'y', inY);
    if (cellAtIndex(sheet, column, row + 1) < 0 && !hasFacing.y.behind.has(cell)) collector.add(cell, cell, 'y', inY);
  }
}

/** Adds the changes to a symmetric matrix (lower triangle; both triangles when `isFull`). */
export function applyChanges(changes: readonly KernelChange[], { size, re }: SymmetricMatrix, isFull: boolean): void {
  for (const { first, second, value } of changes) {
    re[first * size + first]! -= value;
    if (first === second) continue;
    re[second * size + second]! -= value;
    re[Math.max(first, second) * size + Math.min(first, second)]! += value;
    if (isFull) re[Math.min(first, second) * size + Math.max(first, second)]! += value;
  }
}
