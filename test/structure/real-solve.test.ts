import { expect, it } from 'vitest';
import { solveRealSymmetric } from '../../app/structure/real-solve.ts';

it('solves a system whose answer is known', () => {
  // A = [[4, 1, -2], [1, 5, 0.5], [-2, 0.5, 6]], x = [1, -2, 3]: b by hand.
  const above = Number.NaN;
  const b = Float64Array.of(4 - 2 - 6, 1 - 10 + 1.5, -2 - 1 + 18);
  solveRealSymmetric(Float64Array.of(4, above, above, 1, 5, above, -2, 0.5, 6), b);
  for (const [i, x] of [1, -2, 3].entries()) expect(b[i]!).toBeCloseTo(x, 13);
});
