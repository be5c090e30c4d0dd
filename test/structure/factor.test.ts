import { describe, expect, it } from 'vitest';
import { factorSymmetric, type SymmetricMatrix, solveSymmetric } from '../../app/structure/factor.ts';

/** Reproducible numbers in −½…½ (linear congruential generator, seed fixed). */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return state / 2_147_483_648 - 0.5;
  };
}

function randomMatrix(size: number, next: () => number): SymmetricMatrix {
  const matrix = { size, re: new Float64Array(size * size), im: new Float64Array(size * size) };
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      matrix.re[i * size + j] = next() + (i === j ? next() * 3 : 0);
      matrix.im[i * size + j] = next() + (i === j ? size / 3 : 0);
    }
  }
  return matrix;
}

describe('symmetric factorisation', () => {
  // Sizes around the blocks of 48 columns, 64 rows and the tiles of 2.
  it.each([1, 2, 3, 47, 48, 49, 63, 65, 96, 97, 131])('A x gives b back, size %i', (size) => {
    const next = generator(size);
    const matrix = randomMatrix(size, next);
    const kept = { re: matrix.re.slice(), im: matrix.im.slice() };
    const bRe = Float64Array.from({ length: size }, next);
    const bIm = Float64Array.from({ length: size }, next);
    const xRe = bRe.slice();
    const xIm = bIm.slice();
    factorSymmetric(matrix);
    solveSymmetric(matrix, xRe, xIm);
    for (let i = 0; i < size; i++) {
      let re = -bRe[i]!;
      let im = -bIm[i]!;
      for (let j = 0; j < size; j++) {
        const at = i >= j ? i * size + j : j * size + i;
        re += kept.re[at]! * xRe[j]! - kept.im[at]! * xIm[j]!;
        im += kept.re[at]! * xIm[j]! + kept.im[at]! * xRe[j]!;
      }
      // Well-conditioned (dominant diagonal): rounding of some hundred operations on numbers of size 1.
      expect(Math.hypot(re, im)).toBeLessThan(1e-13 * size);
    }
  });

  it('refuses a singular matrix and one that is not finite', () => {
    const zero = { size: 2, re: new Float64Array([1, 0, 1, 1]), im: new Float64Array(4) };
    expect(() => factorSymmetric(zero)).toThrow(/pivot 1/);
    const broken = { size: 1, re: new Float64Array([Number.NaN]), im: new Float64Array(1) };
    expect(() => factorSymmetric(broken)).toThrow(/pivot 0/);
  });
});
