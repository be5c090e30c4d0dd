import type { Sheet } from './sheet.ts';

/** Smaller parts (share of all cells) are islands whose joining or parting does not matter. */
const LEAST_SHARE = 0.03;

/** Number of connected parts of the copper that hold at least 3 % of its cells. */
export function largestParts(sheet: Sheet): number {
  const { cellCount, cellAt, columnOf, rowOf, conductsRight, conductsUp, grid } = sheet;
  const parent = Int32Array.from({ length: cellCount }, (_, cell) => cell);
  const root = (cell: number): number => {
    let at = cell;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]!]!;
      at = parent[at]!;
    }
    return at;
  };
  for (let cell = 0; cell < cellCount; cell++) {
    const at = rowOf[cell]! * grid.columns + columnOf[cell]!;
    if (conductsRight[cell] === 1) parent[root(cell)] = root(cellAt[at + 1]!);
    if (conductsUp[cell] === 1) parent[root(cell)] = root(cellAt[at + grid.columns]!);
  }
  const sizes = new Int32Array(cellCount);
  for (let cell = 0; cell < cellCount; cell++) sizes[root(cell)]!++;
  return sizes.reduce((count, size) => (size >= LEAST_SHARE * cellCount ? count + 1 : count), 0);
}
