import type { SymmetricMatrix } from '../../app/structure/factor.ts';

/** Columns handled at once: the panel of one block of rows stays in the processor's first cache levels. */
const BLOCK = 48;
const ROW_BLOCK = 64;

/**
 * The plain way to `SymmetricSystem.factor`: the same factorisation in typed arrays, blocks of columns and tiles as there, without
 * vector instructions. Throws on a pivot that is zero or not finite.
 */
export function factorSymmetric(matrix: SymmetricMatrix): void {
  const { size } = matrix;
  const panel = new Panel(size);
  for (let start = 0; start < size; start += BLOCK) {
    const width = Math.min(BLOCK, size - start);
    factorColumns(matrix, start, width, panel);
    updateTrailing(matrix, start + width, panel, width);
  }
}

/** L and L·D of the current block of columns, packed [row][column of the block]. */
class Panel {
  readonly lRe: Float64Array;
  readonly lIm: Float64Array;
  readonly wRe: Float64Array;
  readonly wIm: Float64Array;
  constructor(size: number) {
    this.lRe = new Float64Array(size * BLOCK);
    this.lIm = new Float64Array(size * BLOCK);
    this.wRe = new Float64Array(size * BLOCK);
    this.wIm = new Float64Array(size * BLOCK);
  }
}

/** Eliminates within `width` columns, for all rows from the block's first one on. */
function factorColumns({ size, re, im }: SymmetricMatrix, start: number, width: number, panel: Panel): void {
  const { lRe, lIm, wRe, wIm } = panel;
  for (let i = start; i < size; i++) {
    const row = i * size + start;
    const p = i * BLOCK;
    const columns = Math.min(width, i - start + 1);
    for (let j = 0; j < columns; j++) {
      const q = (start + j) * BLOCK;
      let sumRe = re[row + j]!;
      let sumIm = im[row + j]!;
      for (let m = 0; m < j; m++) {
        const aRe = wRe[p + m]!;
        const aIm = wIm[p + m]!;
        const bRe = lRe[q + m]!;
        const bIm = lIm[q + m]!;
        sumRe -= aRe * bRe - aIm * bIm;
        sumIm -= aRe * bIm + aIm * bRe;
      }
      const diagonal = (start + j) * size + start + j;
      if (start + j === i) {
        const norm = sumRe * sumRe + sumIm * sumIm;
        if (!(norm > 0) || norm === Infinity) throw new Error(`pivot ${i} is ${norm}`);
        re[diagonal] = sumRe / norm;
        im[diagonal] = -sumIm / norm;
      } else {
        wRe[p + j] = sumRe;
        wIm[p + j] = sumIm;
        const dRe = re[diagonal]!;
        const dIm = im[diagonal]!;
        const valueRe = sumRe * dRe - sumIm * dIm;
        const valueIm = sumRe * dIm + sumIm * dRe;
        lRe[p + j] = valueRe;
        lIm[p + j] = valueIm;
        re[row + j] = valueRe;
        im[row + j] = valueIm;
      }
    }
  }
}

/** A[i][j] −= Σ_m W[i][m] L[j][m] for first ≤ j ≤ i, in 2 × 2 tiles whose sums stay in registers. */
function updateTrailing({ size, re, im }: SymmetricMatrix, first: number, panel: Panel, width: number): void {
  const { lRe, lIm, wRe, wIm } = panel;
  for (let blockStart = first; blockStart < size; blockStart += ROW_BLOCK) {
    const blockEnd = Math.min(size, blockStart + ROW_BLOCK);
    for (let i = blockStart; i < size; i += 2) {
      // The last tile may repeat a row or column that is not there; its sums are then not stored.
      const hasSecondRow = i + 1 < size;
      const p0 = i * BLOCK;
      const p1 = hasSecondRow ? p0 + BLOCK : p0;
      const jEnd = Math.min(blockEnd, i + 2);
      for (let j = blockStart; j < jEnd; j += 2) {
        const hasSecondColumn = j + 1 < jEnd;
        const q0 = j * BLOCK;
        const q1 = hasSecondColumn ? q0 + BLOCK : q0;
        let s00r = 0;
        let s00i = 0;
        let s01r = 0;
        let s01i = 0;
        let s10r = 0;
        let s10i = 0;
        let s11r = 0;
        let s11i = 0;
        for (let m = 0; m < width; m++) {
          const a0r = wRe[p0 + m]!;
          const a0i = wIm[p0 + m]!;
          const a1r = wRe[p1 + m]!;
          const a1i = wIm[p1 + m]!;
          const b0r = lRe[q0 + m]!;
          const b0i = lIm[q0 + m]!;
          const b1r = lRe[q1 + m]!;
          const b1i = lIm[q1 + m]!;
          s00r += a0r * b0r - a0i * b0i;
          s00i += a0r * b0i + a0i * b0r;
          s01r += a0r * b1r - a0i * b1i;
          s01i += a0r * b1i + a0i * b1r;
          s10r += a1r * b0r - a1i * b0i;
          s10i += a1r * b0i + a1i * b0r;
          s11r += a1r * b1r - a1i * b1i;
          s11i += a1r * b1i + a1i * b1r;
        }
        const at0 = i * size + j;
        re[at0]! -= s00r;
        im[at0]! -= s00i;
        if (hasSecondColumn && j < i) {
          re[at0 + 1]! -= s01r;
          im[at0 + 1]! -= s01i;
        }
        if (hasSecondRow) {
          const at1 = at0 + size;
          re[at1]! -= s10r;
          im[at1]! -= s10i;
          if (hasSecondColumn) {
            re[at1 + 1]! -= s11r;
            im[at1 + 1]! -= s11i;
          }
        }
      }
    }
  }
}
