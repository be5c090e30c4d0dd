import { AppError } from '../errors.ts';
import { ringAreaM2 } from '../geometry/polygon.ts';
import { mmToM } from '../units/convert.ts';
import type { Point3M, PointM, RingM } from './board.ts';

export const toPointM = ([xMm, yMm]: readonly [number, number]): PointM => [mmToM(xMm), mmToM(yMm)];
export const toPoint3M = ([xMm, yMm, zMm]: readonly [number, number, number]): Point3M => [
  mmToM(xMm),
  mmToM(yMm),
  mmToM(zMm),
];

const isSame = (a: readonly number[], b: readonly number[]): boolean => a.every((value, axis) => value === b[axis]);

/** The points without those that repeat the one before. */
export const withoutRepeats = <T extends readonly number[]>(points: readonly T[]): T[] =>
  points.filter((point, i) => i === 0 || !isSame(point, points[i - 1]!));

/** An open ring: no point repeats the one before, nor the last one the first. */
export function openRing<T extends readonly number[]>(points: readonly T[]): T[] {
  const ring = withoutRepeats(points);
  while (ring.length > 1 && isSame(ring[0]!, ring.at(-1)!)) ring.pop();
  return ring;
}

/** A polygon of a file as a ring in metres. Throws `input` when it has fewer than three corners or no area. */
export function toRingM(pointsMm: readonly (readonly [number, number])[], path: string): RingM {
  const ringM = openRing(pointsMm).map(toPointM);
  if (ringM.length < 3) throw noArea(path, `${ringM.length} different points`);
  const areaM2 = Math.abs(ringAreaM2(ringM));
  const [widthM, heightM] = sizeM(ringM);
  // Rounding leaves about 1e-16 of the box; a real sliver keeps far more.
  if (areaM2 <= 1e-12 * widthM * heightM || areaM2 === 0) throw noArea(path, 'points on one line');
  return ringM;
}

const noArea = (path: string, received: string): AppError =>
  new AppError('input', `${path} must be a polygon with an area; received ${received}`, path);

function sizeM(points: readonly PointM[]): [number, number] {
  const box = new BoundingBox();
  for (const point of points) box.add(point, 0);
  return box.sizeM;
}

/** Grows with what is added to it. */
export class BoundingBox {
  #lowXM = Infinity;
  #lowYM = Infinity;
  #highXM = -Infinity;
  #highYM = -Infinity;

  add([xM, yM]: PointM, marginM: number): void {
    this.#lowXM = Math.min(this.#lowXM, xM - marginM);
    this.#lowYM = Math.min(this.#lowYM, yM - marginM);
    this.#highXM = Math.max(this.#highXM, xM + marginM);
    this.#highYM = Math.max(this.#highYM, yM + marginM);
  }

  get sizeM(): [number, number] {
    return [Math.max(0, this.#highXM - this.#lowXM), Math.max(0, this.#highYM - this.#lowYM)];
  }

  /** Counter-clockwise from the lower left corner. */
  get ringM(): RingM {
    return [
      [this.#lowXM, this.#lowYM],
      [this.#highXM, this.#lowYM],
      [this.#highXM, this.#highYM],
      [this.#lowXM, this.#highYM],
    ];
  }
}
