import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Board, Point3M } from '../../app/board/board.ts';
import {
  boundaryRadiusM,
  scanRadiusM,
  siteFrame,
  TABLE_HEIGHT_M,
  toSitePoint,
  toSiteVector,
} from '../../app/site/site.ts';
import { boardFile } from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';

/** Outline from (−20, 7) to (50, 51) mm with a bite out of a corner; 1.2 mm thick. */
const board: Board = boardOf(
  boardFile({
    outline: [
      {
        pointsMm: [
          [-20, 7],
          [50, 7],
          [50, 30],
          [30, 51],
          [-20, 51],
        ],
      },
    ],
  }),
);
const coordinate = fc.double({ min: -2, max: 2, noNaN: true });
const point = fc.tuple(coordinate, coordinate, coordinate);
const orientations = ['flat', 'upright'] as const;
const distance = (a: Point3M, b: Point3M) => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);

describe('board axes on the site', () => {
  it('flat: underside at 0.8 m, centre of the outline’s box on the axis', () => {
    const frame = siteFrame(board, 'flat');
    const [x, y, z] = toSitePoint(frame, [0.015, 0.029, 0]);
    for (const [actual, expected] of [
      [x, 0],
      [y, 0],
      [z, TABLE_HEIGHT_M],
    ] as const)
      expect(actual).toBeCloseTo(expected, 12);
    expect(toSitePoint(frame, [0.115, 0.029, 0.0012])[0]).toBeCloseTo(0.1, 12);
    expect(toSitePoint(frame, [0.015, 0.129, 0.0012])[1]).toBeCloseTo(0.1, 12);
    expect(toSitePoint(frame, [0.015, 0.129, 0.0012])[2]).toBeCloseTo(0.8012, 12);
  });

  it('upright: −y edge down at the table height, +x horizontal, the board’s middle on the axis', () => {
    const frame = siteFrame(board, 'upright');
    expect(toSitePoint(frame, [0.015, 0.007, 0.0006])[2]).toBeCloseTo(TABLE_HEIGHT_M, 12);
    expect(toSitePoint(frame, [0.015, 0.007, 0.0006])[1]).toBeCloseTo(0, 12);
    // Seen from the top side (from site −y) x runs to the right and y up.
    const [x, y, z] = toSitePoint(frame, [0.02, 0.051, 0.0012]);
    expect(x).toBeCloseTo(0.005, 12);
    expect(y).toBeCloseTo(-0.0006, 12);
    expect(z).toBeCloseTo(0.844, 12);
    // The ground is at y = y_min − 800 mm.
    expect(toSitePoint(frame, [0, 0.007 - 0.8, 0])[2]).toBeCloseTo(0, 12);
  });

  it.each(orientations)(
    '%s is a rotation with a shift: lengths kept, right-handed, vectors as points',
    (orientation) => {
      const frame = siteFrame(board, orientation);
      fc.assert(
        fc.property(point, point, (a, b) => {
          const [siteA, siteB] = [toSitePoint(frame, a), toSitePoint(frame, b)];
          expect(distance(siteA, siteB)).toBeCloseTo(distance(a, b), 12);
          const step = toSiteVector(orientation, [b[0] - a[0], b[1] - a[1], b[2] - a[2]]);
          expect(distance([siteB[0] - siteA[0], siteB[1] - siteA[1], siteB[2] - siteA[2]], step)).toBeLessThan(1e-12);
        }),
        { numRuns: 100, seed: 20261204 },
      );
      const [u, v, w] = [
        toSiteVector(orientation, [1, 0, 0]),
        toSiteVector(orientation, [0, 1, 0]),
        toSiteVector(orientation, [0, 0, 1]),
      ];
      // u × v = w
      expect(
        [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]].map((n) => n + 0),
      ).toEqual(w.map((n) => n + 0));
    },
  );
});

describe('radius of board and cables about the axis', () => {
  const flat = siteFrame(board, 'flat');
  const upright = siteFrame(board, 'upright');

  it('flat: the farthest corner; upright: half the width, and half the thickness beside it', () => {
    expect(boundaryRadiusM(board, flat, [])).toBeCloseTo(Math.hypot(0.035, 0.022), 12);
    expect(boundaryRadiusM(board, upright, [])).toBeCloseTo(Math.hypot(0.035, 0.0006), 12);
  });

  it('the farthest point of any cable, in the plane of the turntable only', () => {
    const cable = (pointsM: Point3M[]) => ({
      name: 'c',
      pointsM,
      radiusM: 1e-3,
      farEnd: 'open' as const,
      seriesOhm: 0,
    });
    const points: Point3M[] = [
      [0.015, 0.029, 0],
      [0.415, 0.329, -0.6],
    ];
    expect(boundaryRadiusM(board, flat, [cable(points)])).toBeCloseTo(0.5, 12);
    // Upright 0.4 m along x and 0.6 m along −(−z) stay horizontal.
    expect(boundaryRadiusM(board, upright, [cable(points)])).toBeCloseTo(Math.hypot(0.4, 0.6006), 12);
    expect(boundaryRadiusM(board, flat, [cable([points[0]!, [0.015, 0.029, -0.7]])])).toBeCloseTo(
      Math.hypot(0.035, 0.022),
      12,
    );
  });

  it('the antenna stands at the distance from there, or from the axis', () => {
    const request = { kind: 'ground-plane', distanceM: 3, orientation: 'flat' } as const;
    expect(scanRadiusM({ ...request, measuredFrom: 'boundary' }, 0.4)).toBeCloseTo(3.4, 12);
    expect(scanRadiusM({ ...request, measuredFrom: 'center' }, 0.4)).toBe(3);
  });
});
