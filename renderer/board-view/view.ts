import type { PointM } from '../../app/board/board.ts';

/**
 * Between the board and the screen: pxScreen = middle ± (world − centre)·pxPerM, y upwards on the board and downwards on the
 * screen; from the bottom x is mirrored. All in CSS pixels.
 */
export interface View {
  readonly centerXM: number;
  readonly centerYM: number;
  readonly pxPerM: number;
  readonly isFromBottom: boolean;
}

export interface Size {
  readonly widthPx: number;
  readonly heightPx: number;
}

export interface ScreenPoint {
  readonly x: number;
  readonly y: number;
}

/** Axis-parallel box on the board, m. */
export interface BoxM {
  readonly lowXM: number;
  readonly lowYM: number;
  readonly highXM: number;
  readonly highYM: number;
}

/** From a metre of cable on a small picture to a tenth of a trace's width. */
const LEAST_PX_PER_M = 20;
const MOST_PX_PER_M = 2e6;
/** Share of the picture that stays free about what is fitted, on each side. */
const RIM = 0.05;
const LEAST_FIT_M = 2e-3;

const sideOf = ({ isFromBottom }: View): 1 | -1 => (isFromBottom ? -1 : 1);

export const clampScale = (pxPerM: number): number => Math.min(MOST_PX_PER_M, Math.max(LEAST_PX_PER_M, pxPerM));

export function toScreen(view: View, size: Size, [xM, yM]: PointM): ScreenPoint {
  return {
    x: size.widthPx / 2 + sideOf(view) * (xM - view.centerXM) * view.pxPerM,
    y: size.heightPx / 2 - (yM - view.centerYM) * view.pxPerM,
  };
}

export function toWorld(view: View, size: Size, { x, y }: ScreenPoint): PointM {
  return [
    view.centerXM + (sideOf(view) * (x - size.widthPx / 2)) / view.pxPerM,
    view.centerYM - (y - size.heightPx / 2) / view.pxPerM,
  ];
}

/** Moves what is seen by a way on the screen. */
export const panned = (view: View, dxPx: number, dyPx: number): View => ({
  ...view,
  centerXM: view.centerXM - (sideOf(view) * dxPx) / view.pxPerM,
  centerYM: view.centerYM + dyPx / view.pxPerM,
});

/** Larger or smaller by a factor; what lies under a point of the screen stays there. */
export function zoomedAt(view: View, size: Size, at: ScreenPoint, factor: number): View {
  const pxPerM = clampScale(view.pxPerM * factor);
  const [xM, yM] = toWorld(view, size, at);
  const zoomed = { ...view, pxPerM };
  const [nowXM, nowYM] = toWorld(zoomed, size, at);
  return { ...zoomed, centerXM: view.centerXM + xM - nowXM, centerYM: view.centerYM + yM - nowYM };
}

/** The whole box in the picture with a rim; what is smaller than 2 mm is shown as if it were 2 mm. */
export function fitted(box: BoxM, size: Size, isFromBottom: boolean): View {
  const widthM = Math.max(LEAST_FIT_M, box.highXM - box.lowXM);
  const heightM = Math.max(LEAST_FIT_M, box.highYM - box.lowYM);
  const room = 1 - 2 * RIM;
  return {
    centerXM: (box.lowXM + box.highXM) / 2,
    centerYM: (box.lowYM + box.highYM) / 2,
    pxPerM: clampScale(Math.min((size.widthPx * room) / widthM, (size.heightPx * room) / heightM)),
    isFromBottom,
  };
}

/** What of the board the picture shows. */
export function seenBox(view: View, size: Size): BoxM {
  const halfWidthM = size.widthPx / 2 / view.pxPerM;
  const halfHeightM = size.heightPx / 2 / view.pxPerM;
  return {
    lowXM: view.centerXM - halfWidthM,
    lowYM: view.centerYM - halfHeightM,
    highXM: view.centerXM + halfWidthM,
    highYM: view.centerYM + halfHeightM,
  };
}

export interface Shift {
  readonly dxPx: number;
  readonly dyPx: number;
  readonly scale: number;
}

/** How a picture drawn for one view must be moved and enlarged about its middle to fit another view of the same side. */
export const shiftBetween = (drawn: View, wanted: View): Shift => ({
  dxPx: sideOf(drawn) * (drawn.centerXM - wanted.centerXM) * wanted.pxPerM,
  dyPx: -(drawn.centerYM - wanted.centerYM) * wanted.pxPerM,
  scale: wanted.pxPerM / drawn.pxPerM,
});

/** Part of the way from one view to another: the scale in equal ratios, the middle in step with it. */
export function between(from: View, to: View, share: number): View {
  if (share >= 1) return to;
  const ratio = to.pxPerM / from.pxPerM;
  const pxPerM = from.pxPerM * ratio ** share;
  // In step with the picture's width, so that the goal moves straight over the screen.
  const way = Math.abs(ratio - 1) < 1e-6 ? share : (1 / from.pxPerM - 1 / pxPerM) / (1 / from.pxPerM - 1 / to.pxPerM);
  return {
    centerXM: from.centerXM + (to.centerXM - from.centerXM) * way,
    centerYM: from.centerYM + (to.centerYM - from.centerYM) * way,
    pxPerM,
    isFromBottom: to.isFromBottom,
  };
}
