import type { Sheet } from './sheet.ts';
import { stripDensity } from './strip-density.ts';

/**
 * How current and charge crowd towards the edges of the copper, below the resolution of the cells.
 *
 * Across a run of copper of width 2w the current along it and the charge follow 1/√(w² − u²), u from the run's middle: a cell at the
 * edge holds only its mean. What a trace at (u, height h) couples to is the flux between it and the sheet,
 * ∝ Im arcsin((u + jh)/w), which tends to h/√(w² − u²) for small h and stays finite over the edge.
 * Source: conformal map of a conducting strip (W. R. Smythe, Static and Dynamic Electricity, 3rd ed., section 4.22, from
 * memory); the check is the strip's return inductance µ0 h/(2π√(w² − u²)).
 */

/** Copper run through each cell, in cells: first and one past the last column (row) that conducts without a cut. */
export interface CopperRuns {
  readonly firstColumn: Int32Array;
  readonly endColumn: Int32Array;
  readonly firstRow: Int32Array;
  readonly endRow: Int32Array;
}

export function copperRuns(sheet: Sheet): CopperRuns {
  const { cellCount, columnOf, rowOf, cellAt, grid, conductsRight, conductsUp } = sheet;
  const runs = {
    firstColumn: columnOf.slice(),
    endColumn: columnOf.map((column) => column + 1),
    firstRow: rowOf.slice(),
    endRow: rowOf.map((row) => row + 1),
  };
  // Cells are numbered row by row, so left and lower neighbours come first, right and upper ones last.
  for (let cell = 0; cell < cellCount; cell++) {
    const at = rowOf[cell]! * grid.columns + columnOf[cell]!;
    if (conductsRight[cell] === 1) runs.firstColumn[cellAt[at + 1]!] = runs.firstColumn[cell]!;
    if (conductsUp[cell] === 1) runs.firstRow[cellAt[at + grid.columns]!] = runs.firstRow[cell]!;
  }
  for (let cell = cellCount - 1; cell >= 0; cell--) {
    const at = rowOf[cell]! * grid.columns + columnOf[cell]!;
    if (conductsRight[cell] === 1) runs.endColumn[cell] = runs.endColumn[cellAt[at + 1]!]!;
    if (conductsUp[cell] === 1) runs.endRow[cell] = runs.endRow[cellAt[at + grid.columns]!]!;
  }
  return runs;
}

/**
 * Ratio of the coupling at position `at` and height `h` to what the solver's density in `cell` would give, in a run of cells
 * from `first` to `end`; all lengths in cells. 1 far from the edges.
 */
export function profileRatio(at: number, h: number, cell: number, first: number, end: number): number {
  const w = (end - first) / 2;
  const u = Math.max(-1, Math.min(1, (at - (end + first) / 2) / w));
  return fluxPerHeight(u, h / w) / (Math.PI * w * stripDensity(end - first, cell - first));
}

/** Im arcsin(u + jv)/v for |u| ≤ 1, v > 0: acosh of half the sum of the distances to ±1, without cancellation for small v. */
function fluxPerHeight(u: number, v: number): number {
  const near = Math.hypot(1 - u, v) + 1 - u;
  const far = Math.hypot(1 + u, v) + 1 + u;
  const excess = (v * v * (1 / near + 1 / far)) / 2;
  return Math.log1p(excess + Math.sqrt(excess * (2 + excess))) / v;
}
