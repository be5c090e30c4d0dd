import { joined, lengthMmText, numberText, type Words } from './words.ts';

type Point3Mm = readonly [number, number, number];

/** Coordinates nearer than this are one place: below it is rounding of a conversion. */
export const SAME_PLACE_MM = 1e-6;

/** Length of an open or closed chain, mm. */
export function chainLengthMm(pointsMm: readonly (readonly number[])[], isClosed = false): number {
  let lengthMm = 0;
  for (let i = isClosed ? 0 : 1; i < pointsMm.length; i++) {
    const [from, to] = [pointsMm.at(i - 1)!, pointsMm[i]!];
    lengthMm += Math.hypot(to[0]! - from[0]!, to[1]! - from[1]!, (to[2] ?? 0) - (from[2] ?? 0));
  }
  return lengthMm;
}

/** Magnitude of the vector area of a closed chain, mm²: ½ |Σ p × q|. */
export function loopAreaMm2(pointsMm: readonly Point3Mm[]): number {
  const area = [0, 0, 0];
  const origin = pointsMm[0]!;
  const relative = pointsMm.map((point) => point.map((value, axis) => value - origin[axis]!));
  for (let i = 0; i < relative.length; i++) {
    const [p, q] = [relative.at(i - 1)!, relative[i]!];
    for (let axis = 0; axis < 3; axis++) {
      const [b, c] = [(axis + 1) % 3, (axis + 2) % 3];
      area[axis]! += (p[b]! * q[c]! - p[c]! * q[b]!) / 2;
    }
  }
  return Math.hypot(...area);
}

/** Do both chains run through the same places, by the same number of points? */
export const sameChain = (one: readonly (readonly number[])[], other: readonly (readonly number[])[]): boolean =>
  one.length === other.length &&
  one.every((point, i) => point.every((value, axis) => Math.abs(value - other[i]![axis]!) < SAME_PLACE_MM));

/** "700 → 300 mm"; undefined where the rounded texts are one. */
export function lengthChange(what: string, beforeMm: number, afterMm: number): Words {
  const [one, other] = [lengthMmText(beforeMm), lengthMmText(afterMm)];
  return one === other ? undefined : `${what} ${one} → ${other} mm`;
}

/** How far a chain of the same number of points moved, as a whole or at most. */
export function movedText(one: readonly (readonly number[])[], other: readonly (readonly number[])[]): Words {
  if (sameChain(one, other)) return undefined;
  if (one.length !== other.length) return joined([`path of ${one.length} → ${other.length} points`]);
  const distances = other.map((point, i) => Math.hypot(...point.map((value, axis) => value - one[i]![axis]!)));
  const farthest = distances.reduce((most, distance) => Math.max(most, distance), 0);
  const text = farthest < 1 ? `${numberText(farthest * 1e3, 3)} µm` : `${lengthMmText(farthest)} mm`;
  return `moved by ${distances.every((distance) => Math.abs(distance - farthest) < SAME_PLACE_MM) ? '' : 'up to '}${text}`;
}
