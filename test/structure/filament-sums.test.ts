import { describe, expect, it } from 'vitest';
import { FilamentSums, type SumSources } from '../../app/structure/filament-sums.ts';

const K_PER_M = 21;
const TARGETS = {
  placesM: Float64Array.of(0.3, 0.1, 0, 1.2, -0.4, 0.2, 0.02, 0.01, 0, 0, 0, 0, 2.5, 1, -1),
  vectors: Float64Array.of(0.02, 0, 0, 0, 0.02, 0.01, 0, 0, 0.02, 0.01, 0.01, 0, 1, 0, 0),
};
const PLACES = Float64Array.of(0, 0, 0, 0.05, 0.02, 0.001);
const LENGTHS = Float64Array.of(0.01, 0, 0, 0, 0.005, 0.001);
const IMAGES = {
  placesM: Float64Array.of(0, 0, -1.6, 0.05, 0.02, -1.601),
  vectors: Float64Array.of(-0.01, 0, 0, 0, -0.005, 0.001),
};
const AMPLITUDES = Float64Array.of(0.7, -0.2, 0, 1.1);
const statics = (s: number, t: number): number => 3 * s - t + 0.5;

/** The sum as its equation reads, with the language's own sine. */
function plainSum(sources: SumSources, t: number): [re: number, im: number] {
  const sum: [number, number] = [0, 0];
  for (let s = 0; s < 2; s++) {
    let gRe = statics(s, t);
    let gIm = 0;
    for (const { placesM, vectors } of [sources, ...(sources.images ? [sources.images] : [])]) {
      const axes = [0, 1, 2];
      const r = Math.hypot(...axes.map((axis) => TARGETS.placesM[3 * t + axis]! - placesM[3 * s + axis]!));
      const weight = axes.reduce((dot, axis) => dot + TARGETS.vectors[3 * t + axis]! * vectors[3 * s + axis]!, 0);
      gRe += weight * (r === 0 ? 0 : (Math.cos(K_PER_M * r) - 1) / r);
      gIm -= weight * (r === 0 ? K_PER_M : Math.sin(K_PER_M * r) / r);
    }
    sum[0] += AMPLITUDES[2 * s]! * gRe - AMPLITUDES[2 * s + 1]! * gIm;
    sum[1] += AMPLITUDES[2 * s]! * gIm + AMPLITUDES[2 * s + 1]! * gRe;
  }
  return sum;
}

describe('sums over filaments', () => {
  // Five targets: an odd number, one of them on a source, one fifteen turns away.
  it.each([
    ['with images', IMAGES],
    ['without ground', null],
  ])('are the sums of the equation, %s', (_, images) => {
    const sources = { placesM: PLACES, vectors: LENGTHS, images };
    const { re, im } = new FilamentSums(sources, TARGETS, statics).at(K_PER_M, AMPLITUDES);
    expect(re.length).toBe(5);
    for (let t = 0; t < 5; t++) {
      const expected = plainSum(sources, t);
      // Series good to 2e-14 of numbers up to 20.
      expect(re[t]!).toBeCloseTo(expected[0], 11);
      expect(im[t]!).toBeCloseTo(expected[1], 11);
    }
  });

  it('add for small phases what the first terms of the series say', () => {
    const far = { placesM: Float64Array.of(3e-4, 0, 0), vectors: Float64Array.of(1, 0, 0) };
    const near = { placesM: Float64Array.of(0, 0, 0), vectors: Float64Array.of(1, 0, 0), images: null };
    const { re, im } = new FilamentSums(near, far, () => 0).at(0.63, Float64Array.of(1, 0));
    // −k²R/2 and −k; the next terms are smaller by (kR)²/12 = 3e-9.
    expect(re[0]! / ((-0.63 * 0.63 * 3e-4) / 2)).toBeCloseTo(1, 8);
    expect(im[0]!).toBeCloseTo(-0.63, 8);
  });
});
