import { describe, expect, it } from 'vitest';
import { positionOf, SLIDER_STEPS, type SliderRange, valueAt } from '../../../renderer/components/slider-scale.ts';

/** Oracle: the middle of a linear way is the mean, of a logarithmic one the geometric mean (definition of the scales). */

const EDGES: SliderRange = { min: 0.1e-9, max: 10e-9, scale: 'logarithmic' };
const OHMS: SliderRange = { min: 0, max: 220, scale: 'linear' };

describe('a slider’s way', () => {
  it('is halved by the mean of its scale', () => {
    expect(valueAt(SLIDER_STEPS / 2, OHMS)).toBe(110);
    expect(valueAt(SLIDER_STEPS / 2, EDGES)).toBe(1e-9);
    expect(positionOf(1e-9, EDGES)).toBeCloseTo(SLIDER_STEPS / 2, 9);
  });

  it('ends exactly at its ends, and holds what lies beyond there', () => {
    for (const range of [EDGES, OHMS]) {
      expect([valueAt(0, range), valueAt(SLIDER_STEPS, range)]).toEqual([range.min, range.max]);
      expect([positionOf(-1, OHMS), positionOf(1e3, OHMS)]).toEqual([0, SLIDER_STEPS]);
    }
  });

  it('gives another, larger value at each step, and finds back to that step', () => {
    for (const range of [EDGES, OHMS, { min: 0, max: 50e-12, scale: 'linear' } as const]) {
      for (let step = 1; step <= SLIDER_STEPS; step++) {
        const value = valueAt(step, range);
        expect(value).toBeGreaterThan(valueAt(step - 1, range));
        expect(Math.round(positionOf(value, range))).toBe(step);
      }
    }
  });
});
