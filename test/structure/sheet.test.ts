import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PointM } from '../../app/board/board.ts';
import type { Region } from '../../app/geometry/polygon.ts';
import { chooseGrid, coarseSlot } from '../../app/structure/cell-grid.ts';
import { largestParts } from '../../app/structure/copper-parts.ts';
import { copperRuns } from '../../app/structure/edge-profile.ts';
import { walkGrid } from '../../app/structure/grid-walk.ts';
import { openSlotsM } from '../../app/structure/open-slots.ts';
import { cellAtIndex, cellUnder, type Sheet } from '../../app/structure/sheet.ts';
import { rectangle, rectangleRing, sheetOf } from './support.ts';

const linkCount = ({ conductsRight, conductsUp }: Sheet): number =>
  conductsRight.reduce((sum, one) => sum + one, 0) + conductsUp.reduce((sum, one) => sum + one, 0);

describe('raster of planes', () => {
  it('full rectangle: 172 links for 60 × 40 mm and 1228 for 160 × 100 mm at 5 mm', () => {
    // (n − 1)·m + n·(m − 1), and the design document's own numbers.
    expect(linkCount(sheetOf([rectangle(0.06, 0.04)], 0.06, 0.04, 5e-3))).toBe(172);
    expect(linkCount(sheetOf([rectangle(0.16, 0.1)], 0.16, 0.1, 5e-3))).toBe(1228);
  });

  it('a split of 0.2 mm cuts every link across it, a plane on another layer heals it', () => {
    const left = { ringM: rectangleRing(0, 0, 0.0299, 0.04), cutoutsM: [] };
    const right = { ringM: rectangleRing(0.0301, 0, 0.06, 0.04), cutoutsM: [] };
    const split = sheetOf([left, right], 0.06, 0.04, 5e-3);
    expect(split.cellCount).toBe(96);
    expect(linkCount(split)).toBe(172 - 8);
    expect(split.facing).toHaveLength(8);
    for (const { across, missingCells, widthM } of split.facing) {
      expect([across, missingCells]).toEqual(['x', 0]);
      expect(widthM).toBeCloseTo(0.2e-3, 9);
    }
    const bridge = { ringM: rectangleRing(0.02, 0.0101, 0.04, 0.0199), cutoutsM: [] };
    expect(linkCount(sheetOf([left, right, bridge], 0.06, 0.04, 5e-3))).toBe(172 - 6);
    expect(largestParts(split)).toBe(2);
    expect(largestParts(sheetOf([left, right, bridge], 0.06, 0.04, 5e-3))).toBe(1);
  });

  it('a slot as long as three rows cuts three links; clearances of vias cut none', () => {
    const slot = rectangleRing(0.0299, 0.01, 0.0301, 0.025);
    expect(linkCount(sheetOf([rectangle(0.06, 0.04, [slot])], 0.06, 0.04, 5e-3))).toBe(172 - 3);
    const clearances = [0.0025, 0.0125, 0.0299].map((x) => rectangleRing(x, 0.0115, x + 1e-3, 0.0125));
    expect(linkCount(sheetOf([rectangle(0.06, 0.04, clearances)], 0.06, 0.04, 5e-3))).toBe(172);
  });

  it('a wide opening leaves cells out and says how wide it is', () => {
    const opening = rectangleRing(0.0204, 0.01, 0.0287, 0.03);
    const sheet = sheetOf([rectangle(0.06, 0.04, [opening])], 0.06, 0.04, 5e-3);
    // Centres at 22.5 and 27.5 mm, rows 12.5 to 27.5 mm: eight cells without copper.
    expect(sheet.cellCount).toBe(96 - 8);
    const inX = sheet.facing.filter(({ across }) => across === 'x');
    expect(inX).toHaveLength(4);
    for (const { missingCells, widthM } of inX) {
      expect(missingCells).toBe(2);
      expect(widthM).toBeCloseTo(8.3e-3, 9);
    }
  });

  it('turned by a quarter it has the same links', () => {
    const slot: PointM[] = [
      [0.011, 0.006],
      [0.034, 0.019],
      [0.034, 0.0195],
      [0.011, 0.0065],
    ];
    const turn = (ring: readonly PointM[]): PointM[] => ring.map(([x, y]) => [0.04 - y, x]);
    const one = sheetOf([rectangle(0.06, 0.04, [slot])], 0.06, 0.04, 5e-3);
    const other = sheetOf([{ ringM: turn(rectangleRing(0, 0, 0.06, 0.04)), cutoutsM: [turn(slot)] }], 0.04, 0.06, 5e-3);
    expect(linkCount(one)).toBeLessThan(172);
    expect(linkCount(other)).toBe(linkCount(one));
    expect(other.facing).toHaveLength(one.facing.length);
  });

  it('refuses planes without a copper cell', () => {
    expect(() => sheetOf([rectangle(0.001, 0.001)], 0.06, 0.04, 5e-3)).toThrow(/copper/);
  });

  it('finds the cell under a point, or the nearest within three quarters of a cell', () => {
    const sheet = sheetOf([rectangle(0.06, 0.04)], 0.06, 0.04, 5e-3);
    expect(cellUnder(sheet, 3.2, 1.9)).toBe(cellAtIndex(sheet, 3, 1));
    expect(cellUnder(sheet, -0.2, 1.5)).toBe(cellAtIndex(sheet, 0, 1));
    expect(cellUnder(sheet, -0.3, 1.5)).toBe(-1);
  });

  it('runs of copper end at slots and outlines', () => {
    const slot = rectangleRing(0.0299, 0.01, 0.0301, 0.025);
    const sheet = sheetOf([rectangle(0.06, 0.04, [slot])], 0.06, 0.04, 5e-3);
    const runs = copperRuns(sheet);
    const cell = cellAtIndex(sheet, 7, 3);
    expect([runs.firstColumn[cell], runs.endColumn[cell], runs.firstRow[cell], runs.endRow[cell]]).toEqual([
      6, 12, 0, 8,
    ]);
    const above = cellAtIndex(sheet, 7, 6);
    expect([runs.firstColumn[above], runs.endColumn[above]]).toEqual([0, 12]);
  });
});

describe('way over a grid', () => {
  it('covers the piece once, each part in its square', () => {
    const coordinate = fc.double({ min: -0.05, max: 0.05, noNaN: true });
    fc.assert(
      fc.property(coordinate, coordinate, coordinate, coordinate, (ax, ay, bx, by) => {
        fc.pre(Math.hypot(bx - ax, by - ay) > 1e-4);
        const length = Math.hypot(bx - ax, by - ay);
        const parts = walkGrid([ax, ay], [bx, by], -0.02, 0.003, 7e-3);
        let at = 0;
        for (const { column, row, fromM, toM } of parts) {
          expect(Math.abs(fromM - at)).toBeLessThan(1e-9);
          at = toM;
          for (const s of [fromM + 1e-4 * (toM - fromM), toM - 1e-4 * (toM - fromM)]) {
            const x = (ax + ((bx - ax) * s) / length + 0.02) / 7e-3;
            const y = (ay + ((by - ay) * s) / length - 0.003) / 7e-3;
            expect(x).toBeGreaterThan(column - 1e-6);
            expect(x).toBeLessThan(column + 1 + 1e-6);
            expect(y).toBeGreaterThan(row - 1e-6);
            expect(y).toBeLessThan(row + 1 + 1e-6);
          }
        }
        expect(Math.abs(at - length)).toBeLessThan(1e-9);
      }),
      { seed: 42, numRuns: 300 },
    );
  });
});

describe('choice of cells', () => {
  it('fits the outline with whole cells, within λ/20', () => {
    for (const [w, h] of [
      [0.06, 0.04],
      [0.1, 0.06],
      [0.16, 0.1],
      [0.3, 0.2],
      [0.0573, 0.0419],
    ] as const) {
      const { cellM, columns, rows } = chooseGrid([rectangle(w, h)], 1e9);
      expect(cellM).toBeLessThanOrEqual(0.3 / 20);
      expect(columns * cellM).toBeCloseTo(w, 9);
      expect(Math.abs(rows * cellM - h)).toBeLessThan(0.1 * cellM);
      expect(columns * rows).toBeLessThan(700);
    }
  });

  it('takes smaller cells for a slot, and until a narrow neck holds', () => {
    const plain = chooseGrid([rectangle(0.1, 0.06)], 1e9).cellM;
    const slot = rectangleRing(0.05, 0.01, 0.0502, 0.04);
    expect(chooseGrid([rectangle(0.1, 0.06, [slot])], 1e9).cellM).toBeLessThanOrEqual(0.031 / 10);
    // Two halves of 40 mm joined by a neck 2 mm wide that lies between two rows of the plain grid.
    const neck: PointM[] = [
      [0, 0],
      [0.04, 0],
      [0.04, 0.0241],
      [0.06, 0.0241],
      [0.06, 0],
      [0.1, 0],
      [0.1, 0.06],
      [0.06, 0.06],
      [0.06, 0.0261],
      [0.04, 0.0261],
      [0.04, 0.06],
      [0, 0.06],
    ];
    const plane = { ringM: neck, cutoutsM: [] };
    expect(largestParts(sheetOf([plane], 0.1, 0.06, plain))).toBe(2);
    const { cellM } = chooseGrid([plane], 1e9);
    expect(largestParts(sheetOf([plane], 0.1, 0.06, cellM))).toBe(1);
  });

  it('a slot cut in from the edge counts like a closed one, a shallow or wide one does not', () => {
    const plain = chooseGrid([rectangle(0.1, 0.06)], 1e9).cellM;
    const notched = (depthM: number, widthM: number) => {
      const [low, high] = [0.05 - widthM / 2, 0.05 + widthM / 2];
      const ringM: PointM[] = [
        [0, 0],
        [low, 0],
        [low, depthM],
        [high, depthM],
        [high, 0],
        [0.1, 0],
        [0.1, 0.06],
        [0, 0.06],
      ];
      return { ringM, cutoutsM: [] };
    };
    const cellOf = (plane: Region) => chooseGrid([plane], 1e9).cellM;
    // Half the height; the raster counts whole cells, and 900 cells are the least side of 2.6 mm.
    for (const widthM of [0.3e-3, 2e-3, 6e-3]) expect(cellOf(notched(0.03, widthM))).toBeLessThanOrEqual(0.0345 / 10);
    expect(cellOf(notched(0.007, 0.3e-3))).toBe(plain);
    expect(cellOf(notched(0.03, 25e-3))).toBe(plain);
    // From edge to edge there is no end to go around.
    const halves = [0, 0.0502].map((xM) => ({ ringM: rectangleRing(xM, 0, xM + 0.0498, 0.03), cutoutsM: [] }));
    expect(openSlotsM(sheetOf(halves, 0.1, 0.03, 5e-3))).toEqual([]);
    expect(chooseGrid(halves, 1e9).cellM).toBe(chooseGrid([rectangle(0.1, 0.03)], 1e9).cellM);
    // Turned, at the inner edge of an L, aslant.
    const turned = notched(0.03, 0.3e-3).ringM.map(([x, y]): PointM => [y, x]);
    expect(cellOf({ ringM: turned, cutoutsM: [] })).toBeCloseTo(cellOf(notched(0.03, 0.3e-3)), 12);
    const lShape: PointM[] = [
      [0, 0],
      [0.1, 0],
      [0.1, 0.03],
      [0.0503, 0.03],
      [0.0503, 0.01],
      [0.0499, 0.01],
      [0.0499, 0.03],
      [0.04, 0.03],
      [0.04, 0.08],
      [0, 0.08],
    ];
    expect(cellOf({ ringM: lShape, cutoutsM: [] })).toBeLessThan(0.0036);
    const slanted: PointM[] = [
      [0, 0],
      [0.03, 0],
      [0.055, 0.025],
      [0.0553, 0.0247],
      [0.0306, 0],
      [0.1, 0],
      [0.1, 0.06],
      [0, 0.06],
    ];
    expect(openSlotsM(sheetOf([{ ringM: slanted, cutoutsM: [] }], 0.1, 0.06, 5e-3))).toHaveLength(1);
  });

  it('says when a slot has too few cells', () => {
    const slot = [rectangle(0.1, 0.06, [rectangleRing(0.05, 0.02, 0.0502, 0.04)])];
    const own = chooseGrid(slot, 1e9);
    // 2 mm would be wanted; memory allows 2.5.
    expect(own.cellM).toBeGreaterThan(0.0024);
    expect(coarseSlot(slot, chooseGrid(slot, 1e9, 2e-3))).toBeNull();
    expect(coarseSlot(slot, chooseGrid(slot, 1e9, 5e-3))!.cells).toBeCloseTo(20.001 / 5, 3);
    expect(coarseSlot([rectangle(0.1, 0.06)], own)).toBeNull();
  });

  it('obeys the user’s own size', () => {
    const { cellM, columns, rows } = chooseGrid([rectangle(0.1, 0.06)], 1e9, 8e-3);
    expect([cellM, columns, rows]).toEqual([8e-3, 13, 8]);
  });
});
