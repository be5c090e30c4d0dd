import type { NecFrequencyResult } from '../support/nec2c.ts';
import { anglesOf, heightsOf, type ScanGrid } from './two-wire-model.ts';

/** Maxima over height and angle of the two components, peak phasors, V/m. */
export interface Maxima {
  readonly horizontalVPerM: number;
  readonly verticalVPerM: number;
}

/**
 * Largest horizontal (across the line of sight) and vertical field on the scan's cylinder. Between the grid's points by
 * the parabola through the neighbours, in angle and in height; `firstGrid`: index of the scan's first column.
 */
export function maximaOf(result: NecFrequencyResult, scan: ScanGrid, firstGrid: number): Maxima {
  const angles = anglesOf(scan);
  const heights = heightsOf(scan);
  const horizontal: number[][] = [];
  const vertical: number[][] = [];
  for (let a = 0; a < angles; a++) {
    const angleRad = (a * scan.angleStepDeg * Math.PI) / 180;
    const column = result.electricVPerM[firstGrid + a]!;
    horizontal.push(
      column.map(([ex, ey]) =>
        Math.hypot(
          ey.re * Math.cos(angleRad) - ex.re * Math.sin(angleRad),
          ey.im * Math.cos(angleRad) - ex.im * Math.sin(angleRad),
        ),
      ),
    );
    vertical.push(column.map(([, , ez]) => Math.hypot(ez.re, ez.im)));
  }
  return { horizontalVPerM: refined(horizontal, angles, heights), verticalVPerM: refined(vertical, angles, heights) };
}

function refined(values: readonly (readonly number[])[], angles: number, heights: number): number {
  let best = -1;
  let bestAngle = 0;
  let bestHeight = 0;
  for (let a = 0; a < angles; a++) {
    for (let h = 0; h < heights; h++) {
      if (values[a]![h]! > best) {
        best = values[a]![h]!;
        bestAngle = a;
        bestHeight = h;
      }
    }
  }
  const at = (a: number, h: number): number => values[(a + angles) % angles]![h]!;
  const inAngle = parabolaGain(at(bestAngle - 1, bestHeight), best, at(bestAngle + 1, bestHeight));
  const isInside = bestHeight > 0 && bestHeight < heights - 1;
  const inHeight = isInside ? parabolaGain(at(bestAngle, bestHeight - 1), best, at(bestAngle, bestHeight + 1)) : 0;
  return best + inAngle + inHeight;
}

/** Rise of the parabola through three equidistant values above the middle, largest one. */
function parabolaGain(left: number, middle: number, right: number): number {
  const curvature = left - 2 * middle + right;
  return curvature < 0 ? -((right - left) ** 2) / (8 * curvature) : 0;
}
