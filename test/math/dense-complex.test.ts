import fc from 'fast-check';
import { expect, test } from 'vitest';
import { factorDense, solveDense } from '../../app/math/dense-complex.ts';

/** A·x by the definition, re and im pairs. */
function product(a: Float64Array, x: Float64Array): Float64Array {
  const n = x.length / 2;
  const out = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const [re, im] = [a[2 * (i * n + j)]!, a[2 * (i * n + j) + 1]!];
      out[2 * i]! += re * x[2 * j]! - im * x[2 * j + 1]!;
      out[2 * i + 1]! += re * x[2 * j + 1]! + im * x[2 * j]!;
    }
  }
  return out;
}

test('the solution put back into the equations gives the right side (several row exchanges)', () => {
  const entry = fc.integer({ min: -50, max: 50 }).map((value) => value / 50);
  const system = fc
    .integer({ min: 1, max: 9 })
    .chain((n) =>
      fc.tuple(
        fc.array(entry, { minLength: 2 * n * n, maxLength: 2 * n * n }),
        fc.array(entry, { minLength: 2 * n, maxLength: 2 * n }),
      ),
    );
  fc.assert(
    fc.property(system, ([matrix, right]) => {
      const n = right.length / 2;
      const a = Float64Array.from(matrix);
      // Backward stable: the residual is small beside |A||x|, however large x (growth of partial pivoting: 2^8 at most).
      const x = Float64Array.from(right);
      const factors = a.slice();
      const pivots = factorDense(factors, n);
      solveDense(factors, pivots, x, n);
      const isSingular = Array.from(
        { length: n },
        (_, i) => factors[2 * (i * n + i)] === 0 && factors[2 * (i * n + i) + 1] === 0,
      );
      fc.pre(!isSingular.includes(true));
      const back = product(a, x);
      const size = Math.max(1, ...x.map(Math.abs));
      for (const [i, value] of back.entries()) expect(Math.abs(value - right[i]!)).toBeLessThan(1e-12 * size * n);
    }),
    { seed: 20261204, numRuns: 300 },
  );
});

test('a column without any pivot leaves its unknown 0', () => {
  const a = Float64Array.from([2, 0, 0, 0, 0, 0, 0, 0]);
  const b = Float64Array.from([4, 2, 0, 0]);
  solveDense(a, factorDense(a, 2), b, 2);
  expect([...b]).toEqual([2, 1, 0, 0]);
});
