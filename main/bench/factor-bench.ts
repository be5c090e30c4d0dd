import { SymmetricSystem } from '../../app/structure/factor.ts';
import type { BenchResult } from './bench-result.ts';
import { factorSymmetric } from './plain-factor.ts';

/** Unknowns of a 160 × 100 mm board with two cables. */
const SIZE = 800;
const ROUNDS = 5;

/** Factorisation of the structure's matrix: the compiled kernel against the same in typed arrays, best of five. */
export function factorBench(): BenchResult {
  const compiled = new SymmetricSystem(SIZE);
  const plain = { size: SIZE, re: new Float64Array(SIZE * SIZE), im: new Float64Array(SIZE * SIZE) };
  const seconds = bestOf(compiled.re, compiled.im, () => compiled.factor());
  const plainSeconds = bestOf(plain.re, plain.im, () => factorSymmetric(plain));
  // n³/6 complex multiplications and additions, 8 real operations each.
  const giga = (8 * SIZE ** 3) / 6 / 1e9;
  return {
    name: `factorisation of ${SIZE} unknowns`,
    seconds,
    ratio: plainSeconds / seconds,
    peakMb: process.resourceUsage().maxRSS / 1024,
    detail: {
      'kernel, GFLOP/s': (giga / seconds).toFixed(1),
      'plain typed arrays, GFLOP/s': (giga / plainSeconds).toFixed(1),
    },
  };
}

function bestOf(re: Float64Array, im: Float64Array, factor: () => void): number {
  let best = Infinity;
  for (let round = 0; round < ROUNDS; round++) {
    for (let i = 0; i < re.length; i++) {
      re[i] = 0.01 * Math.sin(i) + (i % (SIZE + 1) === 0 ? 2 : 0);
      im[i] = 0.01 * Math.cos(i);
    }
    const started = performance.now();
    factor();
    best = Math.min(best, (performance.now() - started) / 1000);
  }
  return best;
}
