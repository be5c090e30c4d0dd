import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PointM, RingM } from '../../app/board/board.ts';
import {
  coveredStretches,
  isInsideRegion,
  isInsideRing,
  type Region,
  ringAreaM2,
  uncoveredStretches,
} from '../../app/geometry/polygon.ts';

const SEED = 20261208;
const coordinate = fc.double({ min: -1, max: 1, noNaN: true });
const point: fc.Arbitrary<PointM> = fc.tuple(coordinate, coordinate);

/** Star-shaped ring about a centre: simple whatever the radii. */
const star = fc
  .tuple(fc.array(fc.double({ min: 0.1, max: 1, noNaN: true }), { minLength: 3, maxLength: 12 }), point)
  .map(
    ([radii, [cx, cy]]): RingM =>
      radii.map((radius, i) => {
        const angle = (2 * Math.PI * i) / radii.length;
        return [cx + radius * Math.cos(angle), cy + radius * Math.sin(angle)];
      }),
  );

/** Winding number by the sum of angles: another way than crossing counts. */
function windingNumber(ring: RingM, [x, y]: PointM): number {
  let sum = 0;
  for (const [i, [x1, y1]] of ring.entries()) {
    const [x2, y2] = ring[(i + 1) % ring.length]!;
    const [ax, ay, bx, by] = [x1 - x, y1 - y, x2 - x, y2 - y];
    sum += Math.atan2(ax * by - ay * bx, ax * bx + ay * by);
  }
  return Math.round(sum / (2 * Math.PI));
}

/** Distance from a point to the nearest side: places on a side belong to either. */
const toSides = (ring: RingM, [x, y]: PointM): number =>
  Math.min(
    ...ring.map(([x1, y1], i) => {
      const [x2, y2] = ring[(i + 1) % ring.length]!;
      const t = Math.min(
        1,
        Math.max(0, ((x - x1) * (x2 - x1) + (y - y1) * (y2 - y1)) / ((x2 - x1) ** 2 + (y2 - y1) ** 2)),
      );
      return Math.hypot(x - x1 - t * (x2 - x1), y - y1 - t * (y2 - y1));
    }),
  );

describe('rings', () => {
  it('area of a regular n-gon is n/2·r²·sin(2π/n), its sign the direction', () => {
    for (const n of [3, 4, 5, 17]) {
      const ring: PointM[] = Array.from({ length: n }, (_, i) => [
        0.3 + 0.7 * Math.cos((2 * Math.PI * i) / n),
        -2 + 0.7 * Math.sin((2 * Math.PI * i) / n),
      ]);
      const expected = (n / 2) * 0.49 * Math.sin((2 * Math.PI) / n);
      expect(ringAreaM2(ring)).toBeCloseTo(expected, 12);
      expect(ringAreaM2([...ring].reverse())).toBeCloseTo(-expected, 12);
    }
  });

  it('inside by crossings is inside by winding', () => {
    fc.assert(
      fc.property(star, point, (ring, at) => {
        fc.pre(toSides(ring, at) > 1e-9);
        expect(isInsideRing(ring, at[0], at[1])).toBe(windingNumber(ring, at) !== 0);
        expect(isInsideRing([...ring].reverse(), at[0], at[1])).toBe(isInsideRing(ring, at[0], at[1]));
      }),
      { numRuns: 500, seed: SEED },
    );
  });
});

const square = (x: number, y: number, half: number): RingM => [
  [x - half, y - half],
  [x + half, y - half],
  [x + half, y + half],
  [x - half, y + half],
];

describe('stretches of a piece over regions', () => {
  it('a slot, a hole, an edge and abutting areas, by hand', () => {
    const plane: Region = { ringM: square(0, 0, 1), cutoutsM: [square(0.25, 0, 0.125)] };
    // From −2 to 2: on the plane from −1 to 1, but for 0.125 to 0.375.
    const covered = coveredStretches([-2, 0.01], [2, 0.01], [plane]);
    expect(covered).toHaveLength(2);
    for (const [i, [from, to]] of [
      [0.25, 2.125 / 4],
      [2.375 / 4, 0.75],
    ].entries()) {
      expect(covered[i]!.from).toBeCloseTo(from!, 12);
      expect(covered[i]!.to).toBeCloseTo(to!, 12);
    }
    // A patch over the hole and one that abuts the edge: one stretch from −1 to 1.6.
    const patch: Region = { ringM: square(0.25, 0, 0.2), cutoutsM: [] };
    const beside: Region = { ringM: square(1.3, 0, 0.3), cutoutsM: [] };
    const merged = coveredStretches([-2, 0.01], [2, 0.01], [plane, patch, beside]);
    expect(merged).toHaveLength(1);
    expect(merged[0]!.from).toBeCloseTo(0.25, 12);
    expect(merged[0]!.to).toBeCloseTo(0.9, 12);
    expect(uncoveredStretches(merged)).toEqual([
      { from: 0, to: merged[0]!.from },
      { from: merged[0]!.to, to: 1 },
    ]);
    expect(coveredStretches([0, 5], [1, 5], [plane])).toEqual([]);
    expect(uncoveredStretches([])).toEqual([{ from: 0, to: 1 }]);
    expect(uncoveredStretches([{ from: 0, to: 1 }])).toEqual([]);
  });

  const regions = fc.array(fc.record({ ringM: star, cutoutsM: fc.array(star, { maxLength: 2 }) }), {
    minLength: 1,
    maxLength: 3,
  });

  it('hold the point tests at every place, in order, apart', () => {
    fc.assert(
      fc.property(point, point, regions, (a, b, areas) => {
        fc.pre(Math.hypot(b[0] - a[0], b[1] - a[1]) > 1e-3);
        const covered = coveredStretches(a, b, areas);
        const gaps = uncoveredStretches(covered);
        let at = 0;
        for (const { from, to } of [...covered, ...gaps].sort((one, other) => one.from - other.from)) {
          expect(from).toBeCloseTo(at, 8);
          expect(to).toBeGreaterThan(from);
          at = to;
        }
        expect(at).toBeCloseTo(1, 8);
        for (let i = 0; i < 40; i++) {
          const s = (i + 0.5) / 40;
          const p: PointM = [a[0] + s * (b[0] - a[0]), a[1] + s * (b[1] - a[1])];
          const rings = areas.flatMap(({ ringM, cutoutsM }) => [ringM, ...cutoutsM]);
          if (rings.some((ring) => toSides(ring, p) < 1e-7)) continue;
          const isOn = areas.some((area) => isInsideRegion(area, p[0], p[1]));
          expect(covered.some(({ from, to }) => s > from && s < to)).toBe(isOn);
        }
      }),
      { numRuns: 200, seed: SEED },
    );
  });

  it('do not move with the board', () => {
    fc.assert(
      fc.property(point, point, regions, point, (a, b, areas, [dx, dy]) => {
        fc.pre(Math.hypot(b[0] - a[0], b[1] - a[1]) > 1e-2);
        const shift = ([x, y]: PointM): PointM => [x + dx, y + dy];
        const moved = areas.map(({ ringM, cutoutsM }) => ({
          ringM: ringM.map(shift),
          cutoutsM: cutoutsM.map((ring) => ring.map(shift)),
        }));
        const total = (stretches: readonly { from: number; to: number }[]) =>
          stretches.reduce((sum, { from, to }) => sum + to - from, 0);
        expect(total(coveredStretches(shift(a), shift(b), moved))).toBeCloseTo(total(coveredStretches(a, b, areas)), 6);
      }),
      { numRuns: 100, seed: SEED },
    );
  });
});
