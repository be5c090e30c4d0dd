import type { Board, PointM, RingM } from '../../board/board.ts';
import { mToMm } from '../../units/convert.ts';
import { trimmed } from '../format.ts';
import { type Markup, markup } from '../markup.ts';
import { linearScale, multiples, roundStep, type Scale } from './axis.ts';
import { px, type Xy } from './path.ts';
import type { Box } from './place-labels.ts';

/** Where the board lies in a picture: seen from the top, y up, one scale for both axes. */
export interface BoardFrame {
  readonly box: Box;
  readonly x: Scale;
  readonly y: Scale;
  readonly pxPerM: number;
  readonly at: (point: PointM) => Xy;
}

interface Extent {
  readonly lowX: number;
  readonly highX: number;
  readonly lowY: number;
  readonly highY: number;
}

/** Box about outline, traces and loops, m. Cables are not in it: they may be metres long. */
export function boardExtent(board: Board): Extent {
  let lowX = Infinity;
  let highX = -Infinity;
  let lowY = Infinity;
  let highY = -Infinity;
  const include = (xM: number, yM: number) => {
    lowX = Math.min(lowX, xM);
    highX = Math.max(highX, xM);
    lowY = Math.min(lowY, yM);
    highY = Math.max(highY, yM);
  };
  const rings: readonly RingM[] = [
    ...board.outlineM,
    ...board.nets.flatMap(({ traces }) => traces.map(({ pointsM }) => pointsM)),
  ];
  for (const ring of rings) for (const [xM, yM] of ring) include(xM, yM);
  for (const { pointsM } of board.loops) for (const [xM, yM] of pointsM) include(xM, yM);
  return lowX <= highX ? { lowX, highX, lowY, highY } : { lowX: 0, highX: 0.01, lowY: 0, highY: 0.01 };
}

/** Fits the board into a box with a rim around it where cables leave and labels find room. */
export function boardFrame(extent: Extent, [left, top]: Xy, [maxWidth, maxHeight]: Xy, rimShare = 0.07): BoardFrame {
  const widthM = Math.max(extent.highX - extent.lowX, 1e-4);
  const heightM = Math.max(extent.highY - extent.lowY, 1e-4);
  const rimM = rimShare * Math.max(widthM, heightM);
  const pxPerM = Math.min(maxWidth / (widthM + 2 * rimM), maxHeight / (heightM + 2 * rimM));
  const lowX = extent.lowX - rimM;
  const lowY = extent.lowY - rimM;
  const spanX = widthM + 2 * rimM;
  const spanY = heightM + 2 * rimM;
  const box = { left, top, right: left + spanX * pxPerM, bottom: top + spanY * pxPerM };
  const x = linearScale(lowX, lowX + spanX, box.left, box.right);
  const y = linearScale(lowY, lowY + spanY, box.bottom, box.top);
  return { box, x, y, pxPerM, at: ([xM, yM]) => [x.at(xM), y.at(yM)] };
}

/** Ticks in millimetres of the board's own axes along the left and lower edge, so that a place can be found. */
export function rulerMarkup({ box, x, y }: BoardFrame): Markup {
  const stepMm = roundStep(mToMm(Math.max(x.to - x.from, y.to - y.from)), 10);
  const along = (scale: Scale) =>
    multiples(mToMm(scale.from), mToMm(scale.to), stepMm).map((valueMm) => ({
      valueMm,
      at: scale.at(valueMm / mToMm(1)),
    }));
  const lower = along(x);
  const upright = along(y);
  const ticks = [
    ...lower.map(({ at }) => `M${px(at)} ${px(box.bottom)}v4`),
    ...upright.map(({ at }) => `M${px(box.left)} ${px(at)}h-4`),
  ].join('');
  const number = (valueMm: number) => trimmed(valueMm, 6).replace('-', '−');
  return markup`<rect class="frame" x="${px(box.left)}" y="${px(box.top)}" width="${px(box.right - box.left)}" height="${px(box.bottom - box.top)}"/>
<path class="ruler" d="${ticks}"/>
${lower.map(({ valueMm, at }) => markup`<text class="num middle" x="${px(at)}" y="${px(box.bottom + 15)}">${number(valueMm)}</text>`)}
${upright.map(({ valueMm, at }) => markup`<text class="num end" x="${px(box.left - 7)}" y="${px(at + 3.5)}">${number(valueMm)}</text>`)}`;
}

/** A bar of a round length with its length in words; its left end at a place. */
export function scaleBar(pxPerM: number, [left, y]: Xy, maxWidth: number, unit: 'mm' | 'm'): Markup {
  const perUnit = unit === 'mm' ? pxPerM / mToMm(1) : pxPerM;
  const length = roundStep(maxWidth / perUnit, 1.999);
  const end = left + length * perUnit;
  return markup`<path class="ruler scale-bar" d="M${px(left)} ${px(y - 3)}v6M${px(left)} ${px(y)}H${px(end)}M${px(end)} ${px(y - 3)}v6"/><text class="num" x="${px(end + 5)}" y="${px(y + 3.5)}">${trimmed(length, 6)} ${unit}</text>`;
}
