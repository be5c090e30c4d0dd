import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  between,
  fitted,
  panned,
  type Size,
  seenBox,
  shiftBetween,
  toScreen,
  toWorld,
  type View,
  zoomedAt,
} from '../../../renderer/board-view/view.ts';

/** Oracle: plane geometry worked out by hand, and what must stay in place whatever the view. */

const SIZE: Size = { widthPx: 800, heightPx: 400 };
const VIEW: View = { centerXM: 0.05, centerYM: 0.03, pxPerM: 10_000, isFromBottom: false };
const BOTTOM: View = { ...VIEW, isFromBottom: true };

const views = fc.record({
  centerXM: fc.double({ min: -1, max: 1, noNaN: true }),
  centerYM: fc.double({ min: -1, max: 1, noNaN: true }),
  pxPerM: fc.double({ min: 100, max: 1e6, noNaN: true }),
  isFromBottom: fc.boolean(),
});
const places = fc.record({
  x: fc.double({ min: 0, max: SIZE.widthPx, noNaN: true }),
  y: fc.double({ min: 0, max: SIZE.heightPx, noNaN: true }),
});
const runs = { seed: 7, numRuns: 200 };

describe('board and screen', () => {
  it('has y upwards, x to the right from the top and to the left from the bottom', () => {
    // 10 mm right of the middle and 5 mm above it, at 10 px/mm: 100 px and 50 px.
    const at = [0.06, 0.035] as const;
    expect(toScreen(VIEW, SIZE, at).x).toBeCloseTo(500, 9);
    expect(toScreen(VIEW, SIZE, at).y).toBeCloseTo(150, 9);
    expect(toScreen(BOTTOM, SIZE, at).x).toBeCloseTo(300, 9);
    expect(toScreen(BOTTOM, SIZE, at).y).toBeCloseTo(150, 9);
  });

  it('goes back where it came from', () => {
    fc.assert(
      fc.property(views, places, (view, place) => {
        const back = toScreen(view, SIZE, toWorld(view, SIZE, place));
        // Rounding of double precision, enlarged by at most 1e6 px/m.
        expect(back.x).toBeCloseTo(place.x, 6);
        expect(back.y).toBeCloseTo(place.y, 6);
      }),
      runs,
    );
  });

  it('moves copper with the pointer when it is dragged, from either side', () => {
    for (const view of [VIEW, BOTTOM]) {
      const at = [0.041, 0.022] as const;
      const before = toScreen(view, SIZE, at);
      const after = toScreen(panned(view, 30, -12), SIZE, at);
      expect(after.x - before.x).toBeCloseTo(30, 9);
      expect(after.y - before.y).toBeCloseTo(-12, 9);
    }
  });

  it('keeps what lies under the pointer when it zooms there', () => {
    fc.assert(
      fc.property(views, places, fc.double({ min: 0.2, max: 5, noNaN: true }), (view, place, factor) => {
        const zoomed = zoomedAt(view, SIZE, place, factor);
        const under = toScreen(zoomed, SIZE, toWorld(view, SIZE, place));
        expect(under.x).toBeCloseTo(place.x, 5);
        expect(under.y).toBeCloseTo(place.y, 5);
      }),
      runs,
    );
  });

  it('fits a box into its middle, as large as there is room', () => {
    // 80 mm × 20 mm in 90 % of 800 × 400: the width decides, 720 px / 80 mm = 9 px/mm.
    const view = fitted({ lowXM: 0.02, lowYM: 0.01, highXM: 0.1, highYM: 0.03 }, SIZE, true);
    expect(view.pxPerM).toBeCloseTo(9000, 6);
    expect(view.centerXM).toBeCloseTo(0.06, 12);
    expect(view.centerYM).toBeCloseTo(0.02, 12);
    expect(view.isFromBottom).toBe(true);
  });

  it('sees as much of the board as lies between the edges', () => {
    const seen = seenBox(VIEW, SIZE);
    expect(seen.lowXM).toBeCloseTo(0.01, 12);
    expect(seen.highXM).toBeCloseTo(0.09, 12);
    expect(seen.lowYM).toBeCloseTo(0.01, 12);
    expect(seen.highYM).toBeCloseTo(0.05, 12);
  });
});

describe('a picture of another view', () => {
  it('covers the wanted view when it is moved and enlarged about its middle', () => {
    fc.assert(
      fc.property(views, views, places, (drawn, other, place) => {
        const wanted = { ...other, isFromBottom: drawn.isFromBottom, pxPerM: drawn.pxPerM * 1.7 };
        const { dxPx, dyPx, scale } = shiftBetween(drawn, wanted);
        const world = toWorld(drawn, SIZE, place);
        const goal = toScreen(wanted, SIZE, world);
        // What CSS does with translate(dx, dy) scale(k) about the middle.
        const moved = {
          x: SIZE.widthPx / 2 + dxPx + scale * (place.x - SIZE.widthPx / 2),
          y: SIZE.heightPx / 2 + dyPx + scale * (place.y - SIZE.heightPx / 2),
        };
        // Views up to 2 m apart at 1e6 px/m: 1e-9 of that.
        expect(Math.abs(moved.x - goal.x)).toBeLessThan(2e-3);
        expect(Math.abs(moved.y - goal.y)).toBeLessThan(2e-3);
      }),
      runs,
    );
  });
});

describe('gliding', () => {
  const goal: View = { centerXM: 0.2, centerYM: -0.1, pxPerM: 160_000, isFromBottom: false };

  it('starts and ends where it should, and enlarges in equal ratios', () => {
    expect(between(VIEW, goal, 0).centerXM).toBeCloseTo(VIEW.centerXM, 12);
    expect(between(VIEW, goal, 1)).toEqual(goal);
    // Half the way from 10 to 160 px/mm in equal ratios: √(10·160) = 40.
    expect(between(VIEW, goal, 0.5).pxPerM).toBeCloseTo(40_000, 6);
  });

  it('keeps one place of the board still on the screen while it enlarges', () => {
    // A zoom about a fixed point: solve (p − c1)·s1 = (p − c2)·s2 for p.
    const fixedX = (VIEW.centerXM * VIEW.pxPerM - goal.centerXM * goal.pxPerM) / (VIEW.pxPerM - goal.pxPerM);
    const screen = (view: View) => (fixedX - view.centerXM) * view.pxPerM;
    for (const share of [0.2, 0.5, 0.9]) expect(screen(between(VIEW, goal, share))).toBeCloseTo(screen(VIEW), 6);
  });

  it('moves evenly when the scale stays', () => {
    const aside = { ...VIEW, centerXM: 0.15 };
    expect(between(VIEW, aside, 0.25).centerXM).toBeCloseTo(0.075, 12);
  });
});
