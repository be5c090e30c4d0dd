import { describe, expect, it } from 'vitest';
import { SymmetricSystem } from '../../app/structure/factor.ts';
import { factorSymmetric } from '../../main/bench/plain-factor.ts';

/** Reproducible numbers in −½…½ (linear congruential generator, seed fixed). */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return state / 2_147_483_648 - 0.5;
  };
}

function randomSystem(size: number, next: () => number): SymmetricSystem {
  const matrix = new SymmetricSystem(size);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      matrix.re[i * size + j] = next() + (i === j ? next() * 3 : 0);
      matrix.im[i * size + j] = next() + (i === j ? size / 3 : 0);
    }
    // What lies above the diagonal is nobody's business.
    for (let j = i + 1; j < size; j++) matrix.re[i * size + j] = Number.NaN;
  }
  return matrix;
}

describe('symmetric factorisation', () => {
  // Sizes around the blocks of 32 columns, 64 rows and the tiles of 2.
  it.each([1, 2, 3, 31, 32, 33, 34, 63, 64, 65, 96, 97, 131])('A x gives b back, size %i', (size) => {
    const next = generator(size);
    const matrix = randomSystem(size, next);
    const kept = { re: matrix.re.slice(), im: matrix.im.slice() };
    matrix.factor();
    // Twice: a solution leaves the factors as they are.
    for (let round = 0; round < 2; round++) {
      const bRe = Float64Array.from({ length: size }, next);
      const bIm = Float64Array.from({ length: size }, next);
      const xRe = bRe.slice();
      const xIm = bIm.slice();
      matrix.solve(xRe, xIm);
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
    }
  });

  it.each([5, 33, 130])('gives the factors of the plain way, size %i', (size) => {
    const compiled = randomSystem(size, generator(size));
    const plain = { size, re: compiled.re.slice(), im: compiled.im.slice() };
    compiled.factor();
    factorSymmetric(plain);
    for (let i = 0; i < size; i++) {
      for (let j = 0; j <= i; j++) {
        const at = i * size + j;
        // The same operations in another order.
        expect(compiled.re[at]!).toBeCloseTo(plain.re[at]!, 12);
        expect(compiled.im[at]!).toBeCloseTo(plain.im[at]!, 12);
      }
    }
  });

  it('refuses a singular matrix and one that is not finite', () => {
    const zero = new SymmetricSystem(2);
    zero.re.set([1, 0, 1, 1]);
    expect(() => zero.factor()).toThrow(/pivot 1/);
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, 1e200]) {
      const broken = new SymmetricSystem(1);
      broken.re[0] = value;
      expect(() => broken.factor()).toThrow(/pivot 0/);
    }
  });
});
