import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PointM } from '../../../app/board/board.ts';
import { distanceM } from '../../../renderer/board-view/copper-index.ts';
import { levelOfDetail, strokeWidthM, TOLERANCES_M, thinned } from '../../../renderer/board-view/detail-levels.ts';
import { amplitudeStep, levelStep } from '../../../renderer/board-view/levels.ts';

/** Oracle: the promise itself (no error that can be seen), and decibels worked out by hand. */

const HALF_A_PIXEL = 0.5;

describe('level of detail', () => {
  it('draws everything close by and leaves out more the farther away', () => {
    expect(levelOfDetail(1e6)).toBe(0);
    const levels = [100_000, 5000, 1500, 100].map(levelOfDetail);
    expect(levels).toEqual([0, 1, 2, 3]);
  });

  it('never moves a line by half a pixel', () => {
    const points = fc.array(
      fc.tuple(fc.double({ min: 0, max: 0.02, noNaN: true }), fc.double({ min: 0, max: 0.02, noNaN: true })),
      { minLength: 2, maxLength: 60 },
    );
    fc.assert(
      fc.property(points, fc.double({ min: 50, max: 1e6, noNaN: true }), (pointsM: PointM[], pxPerM) => {
        const kept = thinned(pointsM, TOLERANCES_M[levelOfDetail(pxPerM)]!);
        expect(kept[0]).toEqual(pointsM[0]);
        expect(kept.at(-1)).toEqual(pointsM.at(-1));
        for (const point of pointsM) {
          const offM = Math.min(...kept.slice(1).map((toM, i) => distanceM(point, { fromM: kept[i]!, toM })));
          expect(offM * pxPerM).toBeLessThan(HALF_A_PIXEL);
        }
      }),
      { seed: 3, numRuns: 300 },
    );
  });

  it('leaves out the corners of a fine arc seen from afar', () => {
    const arc = Array.from({ length: 91 }, (_, i): PointM => {
      const angle = (i * Math.PI) / 180;
      return [1e-3 * Math.cos(angle), 1e-3 * Math.sin(angle)];
    });
    // A quarter of a circle of 1 mm is π/2 mm long: at most 7 pieces of 0.2 mm or more, and the rest to the end.
    expect(thinned(arc, 0.2e-3).length).toBeLessThanOrEqual(9);
  });

  it('keeps thin copper seen', () => {
    // 0.1 mm at 1 px/mm would be a tenth of a pixel; wide copper stays as it is.
    expect(strokeWidthM(0.1e-3, 1000) * 1000).toBeGreaterThan(0.5);
    expect(strokeWidthM(2e-3, 1000)).toBe(2e-3);
  });
});

describe('colours of levels', () => {
  it('run over 30 dB below the strongest, weakest first', () => {
    expect(levelStep(60, 60, 15)).toBe(14);
    expect(levelStep(58.5, 60, 15)).toBe(14);
    expect(levelStep(57.5, 60, 15)).toBe(13);
    expect(levelStep(30.5, 60, 15)).toBe(0);
    expect(levelStep(29.9, 60, 15)).toBeNull();
    expect(levelStep(-Infinity, 60, 15)).toBeNull();
  });

  it('take amplitudes by 20·log10: a tenth is 20 dB down', () => {
    // 20 of 30 dB down: a third of 15 steps is left.
    expect(amplitudeStep(0.1001, 1, 15)).toBe(5);
    expect(amplitudeStep(1, 1, 15)).toBe(14);
    expect(amplitudeStep(0.03, 1, 15)).toBeNull();
    expect(amplitudeStep(0, 1, 15)).toBeNull();
    expect(amplitudeStep(0, 0, 15)).toBeNull();
  });
});
