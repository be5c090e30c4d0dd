import type { RingM } from '../../app/board/board.ts';
import { mToMm } from '../../app/units/convert.ts';
import type { Size, View } from './view.ts';

/**
 * Paths are kept in millimetres of the board's own axes: canvases work in single precision and take what is shorter than
 * 1/4096 of a unit for a point, which a metre would not stand.
 */

export function addLine(path: Path2D, pointsM: readonly (readonly number[])[]): void {
  for (const [i, [xM, yM]] of pointsM.entries()) {
    if (i === 0) path.moveTo(mToMm(xM!), mToMm(yM!));
    else path.lineTo(mToMm(xM!), mToMm(yM!));
  }
}

export function addRing(path: Path2D, ringM: RingM): void {
  addLine(path, ringM);
  path.closePath();
}

export function addDot(path: Path2D, [xM, yM]: readonly number[], radiusM: number): void {
  const radius = mToMm(radiusM);
  path.moveTo(mToMm(xM!) + radius, mToMm(yM!));
  path.arc(mToMm(xM!), mToMm(yM!), radius, 0, 2 * Math.PI);
}

/** A spot: stroked with a round cap it is a dot as wide as the stroke. */
export function addSpot(path: Path2D, [xM, yM]: readonly number[]): void {
  path.moveTo(mToMm(xM!), mToMm(yM!));
  // A line without length would not be drawn.
  path.lineTo(mToMm(xM!) + SPOT_MM, mToMm(yM!));
}

const SPOT_MM = 1e-3;

/** From now on the context draws in millimetres of the board. */
export function toBoardAxes(context: CanvasRenderingContext2D, view: View, size: Size, density: number): void {
  const scale = (view.pxPerM / mToMm(1)) * density;
  const side = view.isFromBottom ? -1 : 1;
  context.setTransform(
    side * scale,
    0,
    0,
    -scale,
    (size.widthPx / 2) * density - side * mToMm(view.centerXM) * scale,
    (size.heightPx / 2) * density + mToMm(view.centerYM) * scale,
  );
}

/** From now on the context draws in CSS pixels of the picture. */
export const toScreenAxes = (context: CanvasRenderingContext2D, density: number): void =>
  context.setTransform(density, 0, 0, density, 0, 0);
