import { retardedIm, retardedRe } from './retarded.ts';
import type { Grid, Sheet } from './sheet.ts';
import { meanInverseOfSquares } from './square-kernel.ts';
import type { GroundPlane } from './wires.ts';

/**
 * Kernel between squares of the sheet. A regular grid makes it a table: the direct part depends on the distance in columns and
 * rows; the image part on the distance in columns and, flat, the distance in rows, upright, the sum of the row numbers.
 * Index of both tables: row index · columns + column distance.
 */
export class SheetKernel {
  readonly grid: Grid;
  readonly directRe: Float64Array;
  readonly directIm: Float64Array;
  readonly imageRe: Float64Array;
  readonly imageIm: Float64Array;
  /** 0: no ground; 1: the image row index is the distance in rows; 2: it is the sum of row numbers. */
  readonly imageKind: 0 | 1 | 2;
  readonly #directStatic: Float64Array;
  readonly #imageStatic: Float64Array;
  readonly #imageAcrossM: (row: number) => readonly [dyM: number, dzM: number];

  constructor({ grid, zM }: Sheet, ground: GroundPlane | null) {
    const { columns, rows, cellM, originYM } = grid;
    this.grid = grid;
    this.imageKind = ground === null ? 0 : ground.axis === 2 ? 1 : 2;
    this.#directStatic = new Float64Array(columns * rows);
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        this.#directStatic[row * columns + column] = meanInverseOfSquares(column * cellM, row * cellM, 0, cellM);
      }
    }
    const positionM = ground?.positionM ?? 0;
    this.#imageAcrossM =
      this.imageKind === 2
        ? (row) => [2 * (originYM - positionM) + (row + 1) * cellM, 0]
        : (row) => [row * cellM, 2 * (zM - positionM)];
    // Upright: sums of row numbers up to 2 rows − 2 for cells (y edges, half a cell higher each, have one row fewer).
    const imageRows = this.imageKind === 0 ? 0 : this.imageKind === 1 ? rows : 2 * rows;
    this.#imageStatic = new Float64Array(columns * imageRows);
    for (let row = 0; row < imageRows; row++) {
      const [dyM, dzM] = this.#imageAcrossM(row);
      for (let column = 0; column < columns; column++) {
        this.#imageStatic[row * columns + column] = meanInverseOfSquares(column * cellM, dyM, dzM, cellM);
      }
    }
    this.directRe = new Float64Array(columns * rows);
    this.directIm = new Float64Array(columns * rows);
    this.imageRe = new Float64Array(columns * imageRows);
    this.imageIm = new Float64Array(columns * imageRows);
  }

  /** Adds the retarded part for one frequency. */
  update(kPerM: number): void {
    const { columns, cellM } = this.grid;
    for (let at = 0; at < this.directRe.length; at++) {
      const distanceM = cellM * Math.hypot(at % columns, Math.floor(at / columns));
      this.directRe[at] = this.#directStatic[at]! + retardedRe(kPerM, distanceM);
      this.directIm[at] = retardedIm(kPerM, distanceM);
    }
    for (let at = 0; at < this.imageRe.length; at++) {
      const [dyM, dzM] = this.#imageAcrossM(Math.floor(at / columns));
      const distanceM = Math.hypot((at % columns) * cellM, dyM, dzM);
      this.imageRe[at] = this.#imageStatic[at]! + retardedRe(kPerM, distanceM);
      this.imageIm[at] = retardedIm(kPerM, distanceM);
    }
  }
}
