import { describe, expect, it } from 'vitest';
import { STRUCTURE_CASES, type StructureCase } from '../../app/validate/structure-cases.ts';
import { estimateStructure } from '../../app/validate/structure-estimate.ts';
import { expectClose } from '../support/expect-close.ts';

const BASE = STRUCTURE_CASES.find(({ id }) => id === 'plane-80x50-220ohm')!;
const SLOT = STRUCTURE_CASES.find(({ id }) => id === 'slot-100x60')!;
const SMALL = STRUCTURE_CASES.find(({ id }) => id === 'plane-60x40')!;
const OPEN: StructureCase = {
  ...SMALL,
  id: 'plane-60x40 with a cable',
  cables: [
    {
      name: 'OPEN',
      farEnd: 'open',
      pointsM: [
        [0.06, 0.0225, 0],
        [0.76, 0.0225, 0],
      ],
    },
  ],
};

/**
 * Levels per thickness from 0.1 to 5 mm; h/a is kept, so the line stays the same (Z0 = 60·acosh(h/a)) and only the geometry of
 * pair and structure changes.
 */
const THICKNESSES_MM = Array.from({ length: 13 }, (_, i) => 0.1 * 50 ** (i / 12));

function levelsPerHeight(testCase: StructureCase, frequencyHz: number): number[][] {
  return THICKNESSES_MM.map((mm) => {
    const traceHeightM = mm * 1e-3;
    const scaled = { ...testCase, traceHeightM, traceRadiusM: traceHeightM / 12, frequenciesHz: [frequencyHz] };
    const [row] = estimateStructure(scaled);
    return [row!.horizontalVPerM, row!.verticalVPerM, ...row!.cableCurrentsA].map((value) => value / traceHeightM);
  });
}

/** Largest second difference of a series in dB: zero for a power law. */
function roughnessDb(values: readonly number[]): number {
  const db = values.map((value) => 20 * Math.log10(value));
  return Math.max(...db.slice(2).map((value, i) => Math.abs(value - 2 * db[i + 1]! + db[i]!)));
}

describe('dielectric thickness from 0.1 to 5 mm', () => {
  it.each([
    { testCase: BASE, frequencyHz: 100e6 },
    { testCase: BASE, frequencyHz: 700e6 },
    { testCase: OPEN, frequencyHz: 200e6 },
  ])(
    '$testCase.id at $frequencyHz Hz: proportional to h where it is small, smooth up to 5 mm',
    ({ testCase, frequencyHz }) => {
      const series = levelsPerHeight(testCase, frequencyHz);
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
    const squares = levelsPerHeight(SLOT, 400e6).map(([value], i) => (value! * THICKNESSES_MM[i]!) ** 2);
    const heights = THICKNESSES_MM;
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
