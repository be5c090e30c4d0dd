import type { SourcesPart } from '../../app/project/board-parts.ts';

export type LoopFile = NonNullable<SourcesPart['loops']>[number];
type Points = LoopFile['pointsMm'];
type PointMm = Points[number];

/** Area of a closed ring in space, mm²: half the length of Σ r_i × r_(i+1) (exact for plane rings). */
export function ringAreaMm2(points: Points): number {
  const sum: [number, number, number] = [0, 0, 0];
  for (const [i, [ax, ay, az]] of points.entries()) {
    const [bx, by, bz] = points[(i + 1) % points.length]!;
    sum[0] += ay * bz - az * by;
    sum[1] += az * bx - ax * bz;
    sum[2] += ax * by - ay * bx;
  }
  return Math.hypot(...sum) / 2;
}

/** The ring made larger or smaller about the mean of its corners, same shape; one without any area stays as it is. */
export function withArea(points: Points, areaMm2: number): Points {
  const now = ringAreaMm2(points);
  if (now === 0) return points;
  const factor = Math.sqrt(areaMm2 / now);
  const mean = [0, 1, 2].map((axis) => points.reduce((sum, point) => sum + point[axis]!, 0) / points.length);
  const scaled = (point: PointMm, axis: number) =>
    Number((mean[axis]! + (point[axis]! - mean[axis]!) * factor).toFixed(6));
  return points.map((point): PointMm => [scaled(point, 0), scaled(point, 1), scaled(point, 2)]);
}
