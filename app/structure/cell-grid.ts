import type { RingM } from '../board/board.ts';
import type { Region } from '../geometry/polygon.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { largestParts } from './copper-parts.ts';
import { openSlotsM } from './open-slots.ts';
import { type Grid, rasterizePlanes } from './sheet.ts';

/** Cells of 5 mm serve a 120 mm board to 1 GHz (compared with a moment-method model); never larger on their own account. */
const USUAL_CELL_M = 5e-3;
/** Cells per wavelength, across the smaller side of the planes, and along a slot, at least. */
const CELLS_PER_WAVELENGTH = 20;
const CELLS_ACROSS = 6;
const CELLS_ALONG_SLOT = 10;
/** Shorter openings change nothing that is heard below 1 GHz. */
const SHORTEST_SLOT_M = 8e-3;
/** Slots open to the edge that cut less of the planes' smaller side than this hardly move its currents. */
const LEAST_CUT = 0.15;
/** Cells come out this much larger than wanted at most, to divide the outline. */
const CELL_SLACK = 1.3;
/** Cells at most, so that a factorisation stays under a second; a large board gets larger cells (cellMm overrides). */
const MOST_CELLS = 460;
/** Cells at most where a slot or a narrow neck asks for them. */
const MOST_CELLS_FOR_DETAIL = 900;
/** Step by which cells shrink until narrow necks hold together. */
const SHRINK = 0.8;

/**
 * Square cells over the planes' bounding box: as large as wavelength, outline, slots and narrow necks allow, as small as
 * memory must have it, and such that both sides hold (nearly) whole numbers of cells. `cellM`: the user's own size.
 */
export function chooseGrid(planes: readonly Region[], maxHz: number, cellM?: number): Grid {
  const box = boxOf(planes.flatMap(({ ringM }) => ringM));
  if (cellM !== undefined) return gridOf(box, cellM);
  const widthM = box.highXM - box.lowXM;
  const heightM = box.highYM - box.lowYM;
  const leastM = (cells: number): number => Math.sqrt((widthM * heightM) / cells);
  const coarse = Math.min(
    USUAL_CELL_M,
    SPEED_OF_LIGHT_M_PER_S / maxHz / CELLS_PER_WAVELENGTH,
    Math.min(widthM, heightM) / CELLS_ACROSS,
  );
  const usualM = Math.max(coarse, leastM(MOST_CELLS));
  const slotM = shortestSlotM(planes, gridOf(box, usualM)) / CELLS_ALONG_SLOT;
  let wantedM = Math.max(Math.min(usualM, slotM), leastM(MOST_CELLS_FOR_DETAIL));
  let grid = gridOf(box, bestSide(widthM, heightM, wantedM));
  // A neck narrower than a cell must not part the copper: compare with a raster three times as fine.
  const parts = largestParts(rasterizePlanes(planes, gridOf(box, grid.cellM / 3), 0));
  while (largestParts(rasterizePlanes(planes, grid, 0)) > parts && wantedM * SHRINK >= leastM(MOST_CELLS_FOR_DETAIL)) {
    wantedM *= SHRINK;
    grid = gridOf(box, bestSide(widthM, heightM, wantedM));
  }
  return grid;
}

interface Box {
  readonly lowXM: number;
  readonly highXM: number;
  readonly lowYM: number;
  readonly highYM: number;
}

function boxOf(ringM: RingM): Box {
  let lowXM = Infinity;
  let highXM = -Infinity;
  let lowYM = Infinity;
  let highYM = -Infinity;
  for (const [xM, yM] of ringM) {
    lowXM = Math.min(lowXM, xM);
    highXM = Math.max(highXM, xM);
    lowYM = Math.min(lowYM, yM);
    highYM = Math.max(highYM, yM);
  }
  return { lowXM, highXM, lowYM, highYM };
}

/** Cells of one side over the box, what is left over shared by both ends. */
function gridOf({ lowXM, highXM, lowYM, highYM }: Box, cellM: number): Grid {
  const columns = Math.max(1, Math.round((highXM - lowXM) / cellM));
  const rows = Math.max(1, Math.round((highYM - lowYM) / cellM));
  return {
    originXM: (lowXM + highXM - columns * cellM) / 2,
    originYM: (lowYM + highYM - rows * cellM) / 2,
    cellM,
    columns,
    rows,
  };
}

/**
 * Length of the shortest opening that counts as a slot, ∞ without one: a cutout, or one that is open to the plane's edge and cuts
 * a good part of it.
 */
function shortestSlotM(planes: readonly Region[], grid: Grid): number {
  let shortest = Infinity;
  for (const { cutoutsM } of planes) {
    for (const ring of cutoutsM) {
      const { lowXM, highXM, lowYM, highYM } = boxOf(ring);
      const lengthM = Math.hypot(highXM - lowXM, highYM - lowYM);
      if (lengthM >= SHORTEST_SLOT_M) shortest = Math.min(shortest, lengthM);
    }
  }
  const acrossM = Math.min(grid.columns, grid.rows) * grid.cellM;
  const leastM = Math.max(SHORTEST_SLOT_M, LEAST_CUT * acrossM);
  const open = openSlotsM(rasterizePlanes(planes, grid, 0)).filter((lengthM) => lengthM >= leastM);
  return Math.min(shortest, ...open);
}

/** A slot that has too few cells along it for its length to count right. */
export interface CoarseSlot {
  readonly lengthM: number;
  readonly cells: number;
}

/** The shortest slot when the grid cannot follow it (memory, or the user's own cells), else null. */
export function coarseSlot(planes: readonly Region[], grid: Grid): CoarseSlot | null {
  const lengthM = shortestSlotM(planes, grid);
  const cells = lengthM / grid.cellM;
  return cells < CELLS_ALONG_SLOT / CELL_SLACK ? { lengthM, cells } : null;
}

/** Side near the wanted one that divides both lengths best. */
function bestSide(widthM: number, heightM: number, wantedM: number): number {
  let best = wantedM;
  let least = Infinity;
  for (let n = Math.max(1, Math.floor(widthM / wantedM / 1.15)); n <= Math.ceil((widthM / wantedM) * 1.25); n++) {
    const side = widthM / n;
    const score = 2 * Math.abs(heightM / side - Math.round(heightM / side)) + Math.abs(Math.log(side / wantedM));
    if (score < least) {
      least = score;
      best = side;
    }
  }
  return best;
}
