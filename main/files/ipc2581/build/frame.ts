import type { PointMm } from '../path.ts';

/** Board coordinates are kept to 1 nm: finer digits are only what the shift's subtraction left behind. */
const STEPS_PER_MM = 1e6;

export const roundMm = (lengthMm: number): number => Math.round(lengthMm * STEPS_PER_MM) / STEPS_PER_MM + 0;

/** Lower-left and upper-right corner of points. */
export interface BoxMm {
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
}

export function boxOf(points: Iterable<PointMm>): BoxMm | undefined {
  let [minX, minY, maxX, maxY] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of points) {
    minX = Math.min(minX, x);
    minY = Math.min(minY, y);
    maxX = Math.max(maxX, x);
    maxY = Math.max(maxY, y);
  }
  return minX === Infinity ? undefined : { minX, minY, maxX, maxY };
}

/** Moves drawn coordinates so that the board's lower-left corner is the origin. */
export class BoardFrame {
  readonly originMm: PointMm;

  constructor(originMm: PointMm) {
    this.originMm = originMm;
  }

  point([x, y]: PointMm): PointMm {
    return [roundMm(x - this.originMm[0]), roundMm(y - this.originMm[1])];
  }

  /** Takes the points over; without repeated neighbours. Undefined when fewer than two are left. */
  polyline(points: PointMm[]): PointMm[] | undefined {
    this.moveDistinct(points);
    return points.length < 2 ? undefined : points;
  }

  /** Takes the points over; without repeated neighbours and closing point. Undefined when they enclose no area. */
  ring(points: PointMm[]): PointMm[] | undefined {
    this.moveDistinct(points);
    while (points.length > 1 && isSame(points[0]!, points[points.length - 1]!)) points.pop();
    return hasArea(points) ? points : undefined;
  }

  /** In place, for a large board has millions of points. */
  private moveDistinct(points: PointMm[]): void {
    let kept = 0;
    for (const point of points) {
      point[0] = roundMm(point[0] - this.originMm[0]);
      point[1] = roundMm(point[1] - this.originMm[1]);
      if (kept === 0 || !isSame(points[kept - 1]!, point)) points[kept++] = point;
    }
    points.length = kept;
  }
}

const isSame = (p: PointMm, q: PointMm): boolean => p[0] === q[0] && p[1] === q[1];

/** Area inside a ring, always positive (shoelace formula). */
export function ringAreaMm2(ring: readonly PointMm[]): number {
  let twice = 0;
  for (let i = 0; i < ring.length; i++) {
    const [x0, y0] = ring[i]!;
    const [x1, y1] = ring[(i + 1) % ring.length]!;
    twice += x0 * y1 - x1 * y0;
  }
  return Math.abs(twice) / 2;
}

/** False for a line there and back: rounding leaves far less than 1e-9 of the box, a real sliver keeps far more. */
export function hasArea(ring: readonly PointMm[]): boolean {
  const box = boxOf(ring);
  if (box === undefined || ring.length < 3) return false;
  return ringAreaMm2(ring) > 1e-9 * (box.maxX - box.minX) * (box.maxY - box.minY);
}
