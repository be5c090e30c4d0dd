import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readXform } from '../../../main/files/ipc2581/affine.ts';
import {
  addCurve,
  addSegment,
  beginPath,
  countPieces,
  countRadiusMismatches,
  flattenPath,
  type Path,
  type PointMm,
  pathLengthMm,
  pathVertices,
  transformPath,
} from '../../../main/files/ipc2581/path.ts';

const polylineLength = (points: readonly PointMm[]): number =>
  points.slice(1).reduce((sum, [x, y], i) => sum + Math.hypot(x - points[i]![0], y - points[i]![1]), 0);

/** Quarter circle of radius 3 about (2, 5), from east to north: counter-clockwise. */
const quarter = (): Path => {
  const path = beginPath(5, 5);
  addCurve(path, 2, 8, 2, 5, false);
  return path;
};

describe('arcs', () => {
  it('have the length radius times angle', () => {
    expect(pathLengthMm(quarter())).toBeCloseTo((3 * Math.PI) / 2, 12);
    const longWay = beginPath(5, 5);
    addCurve(longWay, 2, 8, 2, 5, true);
    expect(pathLengthMm(longWay)).toBeCloseTo((9 * Math.PI) / 2, 12);
  });

  it('turn the way they say', () => {
    // Half way round, 45° north-east of the centre, or 225° when clockwise.
    const middle = (path: Path): PointMm => {
      const points = flattenPath(path, 0.001);
      return points[Math.floor(points.length / 2)]!;
    };
    const [x, y] = middle(quarter());
    expect(x).toBeGreaterThan(2);
    expect(y).toBeGreaterThan(5);
    const longWay = beginPath(5, 5);
    addCurve(longWay, 2, 8, 2, 5, true);
    const [xLong, yLong] = middle(longWay);
    expect(xLong).toBeLessThan(2);
    expect(yLong).toBeLessThan(5);
  });

  it('with equal ends are full circles', () => {
    const circle = beginPath(7, 1);
    addCurve(circle, 7, 1, 4, 1, false);
    expect(pathLengthMm(circle)).toBeCloseTo(2 * Math.PI * 3, 12);
    const points = flattenPath(circle, 0.001);
    expect(Math.min(...points.map(([x]) => x))).toBeCloseTo(1, 2);
    expect(points[0]).toEqual(points.at(-1));
  });

  it('keep their ends when the centre does not fit, with the mean radius', () => {
    const path = beginPath(3.1, 0);
    addCurve(path, 0, 2.9, 0, 0, false);
    const points = flattenPath(path, 0.001);
    expect(points[0]).toEqual([3.1, 0]);
    expect(points.at(-1)).toEqual([0, 2.9]);
    expect(pathLengthMm(path)).toBeCloseTo((3 * Math.PI) / 2, 12);
    expect(countRadiusMismatches(path)).toBe(1);
    expect(countRadiusMismatches(quarter())).toBe(0);
  });

  it('lie within 1 µm of their chords, for any radius, angle and turn', () => {
    const arc = fc.record({
      radiusMm: fc.double({ min: 0.01, max: 200, noNaN: true }),
      startRad: fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
      sweepRad: fc.double({ min: 0.01, max: 6.2, noNaN: true }),
      clockwise: fc.boolean(),
    });
    fc.assert(
      fc.property(arc, ({ radiusMm, startRad, sweepRad, clockwise }) => {
        const endRad = startRad + (clockwise ? -sweepRad : sweepRad);
        const path = beginPath(radiusMm * Math.cos(startRad), radiusMm * Math.sin(startRad));
        addCurve(path, radiusMm * Math.cos(endRad), radiusMm * Math.sin(endRad), 0, 0, clockwise);
        const points = flattenPath(path, 0.001);
        for (let i = 1; i < points.length; i++) {
          const [p, q] = [points[i - 1]!, points[i]!];
          // A circle's point farthest from the chord is above the chord's middle: the sagitta.
          const sagittaMm = radiusMm - Math.hypot((p[0] + q[0]) / 2, (p[1] + q[1]) / 2);
          expect(sagittaMm).toBeLessThanOrEqual(0.001 * (1 + 1e-9));
          expect(Math.hypot(...p)).toBeCloseTo(radiusMm, 9);
        }
        // Closed form, and the chords are shorter by less than (sagitta)²·8/3/chord each.
        expect(pathLengthMm(path)).toBeCloseTo(radiusMm * sweepRad, 6);
        expect(polylineLength(points)).toBeLessThanOrEqual(pathLengthMm(path) + 1e-9);
      }),
      { seed: 2581, numRuns: 200 },
    );
  });
});

describe('paths', () => {
  it('count straight and curved pieces and keep their order', () => {
    const path = quarter();
    addSegment(path, 2, 11);
    addCurve(path, 2, 13, 2, 12, true);
    expect(countPieces(path)).toEqual({ segments: 1, arcs: 2 });
    expect(pathVertices(path)).toEqual([
      [5, 5],
      [2, 8],
      [2, 11],
      [2, 13],
    ]);
  });
});

describe('Xform', () => {
  const at = (attributes: Record<string, string>, x: number, y: number): PointMm =>
    pathVertices(transformPath(beginPath(x, y), readXform(attributes, 1)))[0]!;

  it('mirrors before it turns, as exported bottom-side parts come out on their pads', () => {
    // A part at 90°, mirrored: pin 1 at (−0.95, 0) in the package lies 0.95 above the part's centre on the board.
    expect(at({ rotation: '90.0', mirror: 'true' }, -0.95, 0)).toEqual([0, 0.95]);
    expect(at({ rotation: '90.0', mirror: 'FALSE' }, -0.95, 0)).toEqual([0, -0.95]);
  });

  it('scales first and shifts last', () => {
    expect(at({ rotation: '180', scale: '2', xOffset: '10', yOffset: '-1' }, 3, 4)).toEqual([4, -9]);
  });

  it('turns the arcs round when it mirrors: lengths stay, a quarter stays a quarter', () => {
    const mirrored = transformPath(quarter(), readXform({ mirror: '1', rotation: '30' }, 1));
    expect(pathLengthMm(mirrored)).toBeCloseTo((3 * Math.PI) / 2, 12);
  });
});
