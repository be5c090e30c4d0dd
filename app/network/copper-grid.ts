import type { PointM } from '../board/board.ts';

/** A straight piece of a trace. */
export interface CopperPiece {
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly layerIndex: number;
  readonly widthM: number;
  readonly lengthM: number;
}

/** Least cell of the grid, m. */
const CELL_M = 1e-3;
/** Cells a long piece may take before the grid is made coarser. */
const MOST_CELLS_A_PIECE = 200;

/** Where on a piece (fraction of its length) a place is nearest, and how far away. */
export function nearestOn(
  { fromM, toM, lengthM }: CopperPiece,
  [x, y]: PointM,
): { fraction: number; distanceM: number } {
  const dx = toM[0] - fromM[0];
  const dy = toM[1] - fromM[1];
  const along = ((x - fromM[0]) * dx + (y - fromM[1]) * dy) / (lengthM * lengthM);
  const fraction = Math.min(1, Math.max(0, along));
  return { fraction, distanceM: Math.hypot(x - fromM[0] - fraction * dx, y - fromM[1] - fraction * dy) };
}

/** Pieces by square cells, so that neighbours are found without looking at every pair. */
export class CopperGrid {
  readonly #pieces: readonly CopperPiece[];
  readonly #cells = new Map<string, number[]>();
  readonly #cellM: number;

  constructor(pieces: readonly CopperPiece[]) {
    this.#pieces = pieces;
    const longestM = pieces.reduce((most, { lengthM }) => Math.max(most, lengthM), 0);
    const widestM = pieces.reduce((most, { widthM }) => Math.max(most, widthM), 0);
    this.#cellM = Math.max(CELL_M, longestM / MOST_CELLS_A_PIECE, widestM);
    for (const [i, piece] of pieces.entries()) {
      for (const key of this.#cellsOf(piece)) {
        const cell = this.#cells.get(key);
        if (cell) cell.push(i);
        else this.#cells.set(key, [i]);
      }
    }
  }

  /** Pieces of the same layer that may touch this one, ascending. */
  near(piece: CopperPiece): number[] {
    return this.#collect(this.#cellsOf(piece), piece.layerIndex);
  }

  /** Pieces of a layer that may come within reach of a place, ascending. */
  around([x, y]: PointM, layerIndex: number, reachM: number): number[] {
    const keys = new Set<string>();
    const steps = Math.ceil(reachM / this.#cellM);
    const cx = Math.floor(x / this.#cellM);
    const cy = Math.floor(y / this.#cellM);
    for (let i = -steps; i <= steps; i++)
      for (let j = -steps; j <= steps; j++) keys.add(this.#key(layerIndex, cx + i, cy + j));
    return this.#collect(keys, layerIndex);
  }

  #collect(keys: Iterable<string>, layerIndex: number): number[] {
    const found = new Set<number>();
    for (const key of keys) {
      for (const i of this.#cells.get(key) ?? []) if (this.#pieces[i]!.layerIndex === layerIndex) found.add(i);
    }
    return [...found].sort((one, other) => one - other);
  }

  /** Cells along a piece and all their neighbours: whatever touches it, half a width away, is in one of them. */
  #cellsOf({ fromM, toM, layerIndex, lengthM }: CopperPiece): Set<string> {
    const keys = new Set<string>();
    const steps = Math.max(1, Math.ceil((2 * lengthM) / this.#cellM));
    for (let s = 0; s <= steps; s++) {
      const cx = Math.floor((fromM[0] + (s / steps) * (toM[0] - fromM[0])) / this.#cellM);
      const cy = Math.floor((fromM[1] + (s / steps) * (toM[1] - fromM[1])) / this.#cellM);
      for (let i = -1; i <= 1; i++) for (let j = -1; j <= 1; j++) keys.add(this.#key(layerIndex, cx + i, cy + j));
    }
    return keys;
  }

  #key(layerIndex: number, cx: number, cy: number): string {
    return `${layerIndex} ${cx} ${cy}`;
  }
}
