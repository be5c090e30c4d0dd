import type { RingM } from '../board/board.ts';
import type { Region } from '../geometry/polygon.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { largestParts } from './copper-parts.ts';
import { type Grid, rasterizePlanes } from './sheet.ts';

/** Cells of 5 mm serve a 120 mm board to 1 GHz (compared with a moment-method model); never larger on their own account. */
const USUAL_CELL_M = 5e-3;
/** Cells per wavelength, across the smaller side of the planes, and along a slot, at least. */
const CELLS_PER_WAVELENGTH = 20;
const CELLS_ACROSS = 6;
const CELLS_ALONG_SLOT = 10;
/** Shorter openings change nothing that is heard below 1 GHz. */
const SHORTEST_SLOT_M = 8e-3;
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
  const slotM = shortestSlotM(planes) / CELLS_ALONG_SLOT;
  let wantedM = Math.max(Math.min(Math.max(coarse, leastM(MOST_CELLS)), slotM), leastM(MOST_CELLS_FOR_DETAIL));
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

/** Length of the shortest cutout that counts as a slot, ∞ without one. */
function shortestSlotM(planes: readonly Region[]): number {
  let shortest = Infinity;
  for (const { cutoutsM } of planes) {
    for (const ring of cutoutsM) {
      const { lowXM, highXM, lowYM, highYM } = boxOf(ring);
      const lengthM = Math.hypot(highXM - lowXM, highYM - lowYM);
      if (lengthM >= SHORTEST_SLOT_M) shortest = Math.min(shortest, lengthM);
    }
  }
  return shortest;
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
