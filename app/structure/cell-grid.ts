import type { Region } from '../geometry/polygon.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import type { Grid } from './sheet.ts';

/** Cells of 5 mm serve a 120 mm board to 1 GHz (compared with a moment-method model); never larger on their own account. */
const USUAL_CELL_M = 5e-3;
/** Cells per wavelength, and across the smaller side of the planes, at least. */
const CELLS_PER_WAVELENGTH = 20;
const CELLS_ACROSS = 6;
/** Cells at most, so that a factorisation stays under a second; a large board gets larger cells (cellMm overrides). */
const MOST_CELLS = 460;

/**
 * Square cells over the planes' bounding box: as large as wavelength and outline allow, as small as memory must have it, and
 * such that both sides hold (nearly) whole numbers of cells. `cellM`: the user's own size.
 */
export function chooseGrid(planes: readonly Region[], maxHz: number, cellM?: number): Grid {
  const points = planes.flatMap(({ ringM }) => ringM);
  const reduce = (axis: 0 | 1, pick: (a: number, b: number) => number) =>
    points.reduce((best, point) => pick(best, point[axis]), points[0]![axis]);
  const lowX = reduce(0, Math.min);
  const lowY = reduce(1, Math.min);
  const widthM = reduce(0, Math.max) - lowX;
  const heightM = reduce(1, Math.max) - lowY;
  const side = cellM ?? bestSide(widthM, heightM, wantedSide(widthM, heightM, maxHz));
  const columns = Math.max(1, Math.round(widthM / side));
  const rows = Math.max(1, Math.round(heightM / side));
  return {
    originXM: lowX + (widthM - columns * side) / 2,
    originYM: lowY + (heightM - rows * side) / 2,
    cellM: side,
    columns,
    rows,
  };
}

function wantedSide(widthM: number, heightM: number, maxHz: number): number {
  const fine = Math.min(
    USUAL_CELL_M,
    SPEED_OF_LIGHT_M_PER_S / maxHz / CELLS_PER_WAVELENGTH,
    Math.min(widthM, heightM) / CELLS_ACROSS,
  );
  return Math.max(fine, Math.sqrt((widthM * heightM) / MOST_CELLS));
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
