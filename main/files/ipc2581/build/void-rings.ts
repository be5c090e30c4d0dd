import { addCurve, addSegment, beginPath, type Path, type PointMm } from '../path.ts';
import type { CopperVoid } from './copper.ts';
import type { Flattener } from './flattener.ts';

/** Rings of what a void takes away, as drawn: its area, or one round-ended strip for each straight piece of a line. */
export function voidRings({ shape, widthMm }: CopperVoid, flattener: Flattener): PointMm[][] {
  if (shape.kind === 'area') return [flattener.clearance(shape.ring)];
  if (widthMm === undefined || widthMm === 0) return [];
  const points = flattener.clearance(shape.path);
  const rings: PointMm[][] = [];
  for (let i = 1; i < points.length; i++) {
    const [[x0, y0], [x1, y1]] = [points[i - 1]!, points[i]!];
    const lengthMm = Math.hypot(x1 - x0, y1 - y0);
    if (lengthMm > 0) rings.push(flattener.clearance(strip(points[i - 1]!, points[i]!, widthMm / 2)));
  }
  return rings;
}

/** Outline of a line with round ends, counter-clockwise. */
function strip([x0, y0]: PointMm, [x1, y1]: PointMm, halfMm: number): Path {
  const lengthMm = Math.hypot(x1 - x0, y1 - y0);
  const [nx, ny] = [(-(y1 - y0) / lengthMm) * halfMm, ((x1 - x0) / lengthMm) * halfMm];
  const path = beginPath(x0 - nx, y0 - ny);
  addSegment(path, x1 - nx, y1 - ny);
  addCurve(path, x1 + nx, y1 + ny, x1, y1, false);
  addSegment(path, x0 + nx, y0 + ny);
  addCurve(path, x0 - nx, y0 - ny, x0, y0, false);
  return path;
}
