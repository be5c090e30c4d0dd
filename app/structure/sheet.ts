import type { RingM } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { coveredStretches, type Region, type Stretch } from '../geometry/polygon.ts';

/** Square cells: the lower left corner of cell (0, 0) and the side, board axes. */
export interface Grid {
  readonly originXM: number;
  readonly originYM: number;
  readonly cellM: number;
  readonly columns: number;
  readonly rows: number;
}

/** Two cells that face each other across an opening (a slot) of at most two missing cells. */
export interface FacingCells {
  /** The left or lower cell, and the right or upper one. */
  readonly first: number;
  readonly second: number;
  /** 'x': the opening lies between a left and a right cell; 'y': between a lower and an upper one. */
  readonly across: 'x' | 'y';
  readonly missingCells: number;
  /** True width on the line between the centres, m. */
  readonly widthM: number;
}

/**
 * The planes as one thin sheet on square cells. Copper cells are numbered row by row from the lower left; links between
 * neighbours (cut by slots) carry the current.
 */
export interface Sheet {
  readonly grid: Grid;
  /** Height of the sheet, m, board axes. */
  readonly zM: number;
  readonly cellCount: number;
  /** [row · columns + column] → cell number, −1 where there is no copper. */
  readonly cellAt: Int32Array;
  /** Column and row of every cell. */
  readonly columnOf: Int32Array;
  readonly rowOf: Int32Array;
  /** Does cell c conduct to its right (upper) neighbour? */
  readonly conductsRight: Uint8Array;
  readonly conductsUp: Uint8Array;
  readonly facing: readonly FacingCells[];
}

/** Widest opening (in missing cells) across which cells are said to face each other. */
const FACING_REACH_CELLS = 2;

/**
 * Rasterises the union of the planes. A cell is copper when its centre is; two neighbours conduct when the straight line
 * between their centres stays on copper, so the thinnest split cuts. Cutouts smaller than half a cell both ways (clearances of
 * vias) are left out: a cut edge would stand for an opening a whole cell long.
 *
 * Throws `input` when no cell is copper.
 */
export function rasterizePlanes(planes: readonly Region[], grid: Grid, zM: number): Sheet {
  const { originXM, originYM, cellM, columns, rows } = grid;
  const regions = planes.map(({ ringM, cutoutsM }) => ({
    ringM,
    cutoutsM: cutoutsM.filter((ring) => largestExtentM(ring) >= cellM / 2),
  }));
  const endXM = originXM + columns * cellM;
  const endYM = originYM + rows * cellM;
  const isCopper = new Uint8Array(columns * rows);
  const right = new Uint8Array(columns * rows);
  const up = new Uint8Array(columns * rows);
  const facing: FacingCells[] = [];
  for (let row = 0; row < rows; row++) {
    const yM = originYM + (row + 0.5) * cellM;
    const stretches = coveredStretches([originXM, yM], [endXM, yM], regions);
    const on = stretchOfCentres(stretches, columns);
    for (let column = 0; column < columns; column++) isCopper[row * columns + column] = on[column]! >= 0 ? 1 : 0;
    link(on, stretches, 'x', row * columns, 1, cellM, isCopper, right, facing);
  }
  for (let column = 0; column < columns; column++) {
    const xM = originXM + (column + 0.5) * cellM;
    const stretches = coveredStretches([xM, originYM], [xM, endYM], regions);
    link(stretchOfCentres(stretches, rows), stretches, 'y', column, columns, cellM, isCopper, up, facing);
  }
  const cellAt = new Int32Array(columns * rows).fill(-1);
  let cellCount = 0;
  for (let at = 0; at < cellAt.length; at++) if (isCopper[at] === 1) cellAt[at] = cellCount++;
  if (cellCount === 0) throw inputError('planes', `copper at the centre of a cell of ${cellM} m`, 'none');
  const columnOf = new Int32Array(cellCount);
  const rowOf = new Int32Array(cellCount);
  const conductsRight = new Uint8Array(cellCount);
  const conductsUp = new Uint8Array(cellCount);
  for (let at = 0; at < cellAt.length; at++) {
    const cell = cellAt[at]!;
    if (cell < 0) continue;
    columnOf[cell] = at % columns;
    rowOf[cell] = Math.floor(at / columns);
    conductsRight[cell] = right[at]!;
    conductsUp[cell] = up[at]!;
  }
  const numbered = facing.map((pair) => ({ ...pair, first: cellAt[pair.first]!, second: cellAt[pair.second]! }));
  return { grid, zM, cellCount, cellAt, columnOf, rowOf, conductsRight, conductsUp, facing: numbered };
}

/**
 * Marks which neighbours on one line of centres conduct, and collects those that face each other across an opening. Places are
 * first + i · step.
 */
function link(
  on: Int32Array,
  stretches: readonly Stretch[],
  across: 'x' | 'y',
  first: number,
  step: number,
  cellM: number,
  isCopper: Uint8Array,
  conducts: Uint8Array,
  facing: FacingCells[],
): void {
  let last = -1;
  for (let i = 0; i < on.length; i++) {
    const at = first + i * step;
    if (isCopper[at] === 0 || on[i]! < 0) continue;
    if (last >= 0 && on[last] === on[i] && i === last + 1) conducts[at - step] = 1;
    else if (last >= 0 && i - last - 1 <= FACING_REACH_CELLS && on[last] !== on[i]) {
      const widthM = (stretches[on[i]!]!.from - stretches[on[last]!]!.to) * on.length * cellM;
      facing.push({ first: first + last * step, second: at, across, missingCells: i - last - 1, widthM });
    }
    last = i;
  }
}

/** For each of `count` cell centres on the line: the index of the copper stretch it lies on, −1 for none. */
function stretchOfCentres(stretches: readonly Stretch[], count: number): Int32Array {
  const out = new Int32Array(count).fill(-1);
  let next = 0;
  for (let i = 0; i < count; i++) {
    const at = (i + 0.5) / count;
    while (next < stretches.length && stretches[next]!.to < at) next++;
    if (next < stretches.length && stretches[next]!.from <= at) out[i] = next;
  }
  return out;
}

function largestExtentM(ringM: RingM): number {
  let lowX = Infinity;
  let highX = -Infinity;
  let lowY = Infinity;
  let highY = -Infinity;
  for (const [xM, yM] of ringM) {
    lowX = Math.min(lowX, xM);
    highX = Math.max(highX, xM);
    lowY = Math.min(lowY, yM);
    highY = Math.max(highY, yM);
  }
  return Math.max(highX - lowX, highY - lowY);
}

export const cellCentreXM = ({ grid, columnOf }: Sheet, cell: number): number =>
  grid.originXM + (columnOf[cell]! + 0.5) * grid.cellM;
export const cellCentreYM = ({ grid, rowOf }: Sheet, cell: number): number =>
  grid.originYM + (rowOf[cell]! + 0.5) * grid.cellM;

/** Cell number at a column and row, −1 outside and where there is no copper. */
export function cellAtIndex({ grid, cellAt }: Sheet, column: number, row: number): number {
  if (column < 0 || row < 0 || column >= grid.columns || row >= grid.rows) return -1;
  return cellAt[row * grid.columns + column]!;
}

/** A point off the copper cells still counts for the nearest one this near (in cells): outlines rarely follow the grid. */
const UNDER_REACH_CELLS = 0.75;

/**
 * Copper cell under a point (x, y in cells from the grid's origin): the one it lies in, else the nearest whose centre is within
 * three quarters of a cell, else −1.
 */
export function cellUnder(sheet: Sheet, x: number, y: number): number {
  const column = Math.floor(x);
  const row = Math.floor(y);
  const own = cellAtIndex(sheet, column, row);
  if (own >= 0) return own;
  let nearest = -1;
  let least = UNDER_REACH_CELLS;
  for (let r = row - 1; r <= row + 1; r++) {
    for (let c = column - 1; c <= column + 1; c++) {
      const cell = cellAtIndex(sheet, c, r);
      const distance = Math.hypot(x - c - 0.5, y - r - 0.5);
      if (cell >= 0 && distance < least) {
        nearest = cell;
        least = distance;
      }
    }
  }
  return nearest;
}

/** Does the cell conduct to its neighbour one step away? */
export function isLinked(sheet: Sheet, column: number, row: number, stepX: number, stepY: number): boolean {
  const cell = cellAtIndex(sheet, Math.min(column, column + stepX), Math.min(row, row + stepY));
  if (cell < 0) return false;
  return (stepX !== 0 ? sheet.conductsRight : sheet.conductsUp)[cell] === 1;
}
