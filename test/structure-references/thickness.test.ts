import { describe, expect, it } from 'vitest';
import { STRUCTURE_CASES } from '../../app/validate/structure-cases.ts';
import {
  levelsPerThickness,
  roughnessDb,
  THICKNESS_CASES,
  THICKNESSES_M,
} from '../../app/validate/structure-convergence.ts';
import { expectClose } from '../support/expect-close.ts';

const SLOT = STRUCTURE_CASES.find(({ id }) => id === 'slot-100x60')!;

describe('dielectric thickness from 0.1 to 5 mm', () => {
  it.each(THICKNESS_CASES.map(([testCase, frequencyHz]) => ({ testCase, frequencyHz })))(
    '$testCase.id at $frequencyHz Hz: proportional to h where it is small, smooth up to 5 mm',
    ({ testCase, frequencyHz }) => {
      const series = levelsPerThickness(testCase, frequencyHz);
      for (let quantity = 0; quantity < series[0]!.length; quantity++) {
        const values = series.map((row) => row[quantity]!);
        const because =
          'law: field and currents of a pair far closer than everything else are proportional to its height';
        expectClose(values[1]!, values[0]!, { rel: 0.01, because });
        expectClose(values[2]!, values[0]!, { rel: 0.02, because });
        // From one thickness to the next (a factor 1.39) the slope on log scales changes by less than 0.1 dB: no step where h passes the
        // cell's or the trace's own sizes.
        expect(roughnessDb(values)).toBeLessThan(0.1);
      }
    },
  );

  it('over a slot the plane carries the current: a part without h and one with it', () => {
    const squares = levelsPerThickness(SLOT, 400e6).map(([value], i) => (value! * THICKNESSES_M[i]!) ** 2);
    const heights = THICKNESSES_M;
    // |a + b·h|² with complex a, b is a parabola in h; laid through three thicknesses it must meet all others.
    const fitted = [0, 8, 12];
    for (const [i, h] of heights.entries()) {
      const predicted = fitted.reduce((sum, j) => {
        const others = fitted.filter((k) => k !== j);
        const share = others.reduce((product, k) => (product * (h - heights[k]!)) / (heights[j]! - heights[k]!), 1);
        return sum + share * squares[j]!;
      }, 0);
      expectClose(squares[i]!, predicted, { rel: 0.01, because: 'h is small against slot and wavelength' });
    }
    // Proportional to h the first step would be 2.8 dB.
    expect(10 * Math.log10(squares[1]! / squares[0]!)).toBeLessThan(0.2);
  });
});
