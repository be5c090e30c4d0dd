import type { Board, Net, Plane } from '../../board/board.ts';
import { type Markup, markup } from '../markup.ts';
import type { BoardFrame } from './board-frame.ts';
import { linePath, px, ringPath } from './path.ts';

/** Copper as quiet greys: planes, then traces. One path a layer and width, so that thousands of traces stay small. */

type LayerTest = (layerIndex: number) => boolean;

const MIN_STROKE_PX = 0.6;

export const outlineMarkup = (board: Board, frame: BoardFrame): Markup =>
  markup`<path class="outline" d="${board.outlineM.map((ring) => ringPath(ring.map(frame.at))).join('')}"/>`;

export function planesMarkup(planes: readonly Plane[], frame: BoardFrame, isShown: LayerTest): Markup {
  const shown = planes.filter(({ layerIndex }) => isShown(layerIndex));
  return markup`${shown.map(
    ({ ringM, cutoutsM }) =>
      markup`<path class="plane" d="${[ringM, ...cutoutsM].map((ring) => ringPath(ring.map(frame.at))).join('')}"/>`,
  )}`;
}

/** Traces and vias of the nets, strokes as wide as the copper but never too thin to see. */
export function tracesMarkup(
  nets: readonly Net[],
  frame: BoardFrame,
  className: string,
  isShown: LayerTest,
  minPx = MIN_STROKE_PX,
): Markup {
  const byWidth = new Map<string, string[]>();
  const add = (widthPx: number, path: string) => {
    const key = px(Math.max(minPx, widthPx));
    const paths = byWidth.get(key);
    if (paths) paths.push(path);
    else byWidth.set(key, [path]);
  };
  for (const { traces } of nets) {
    for (const { layerIndex, widthM, pointsM } of traces) {
      if (isShown(layerIndex)) add(widthM * frame.pxPerM, linePath(pointsM.map(frame.at)));
    }
  }
  return markup`<g class="${className}">${[...byWidth].map(([width, paths]) => markup`<path stroke-width="${width}" d="${paths.join('')}"/>`)}</g>`;
}

export function viasMarkup(nets: readonly Net[], frame: BoardFrame, className: string): Markup | false {
  const path = nets
    .flatMap(({ vias }) => vias)
    .map(({ atM, drillM }) => {
      const [x, y] = frame.at(atM);
      const r = px(Math.max(0.8, (drillM * frame.pxPerM) / 2));
      return `M${px(x - Number(r))} ${px(y)}a${r} ${r} 0 1 0 ${px(2 * Number(r))} 0a${r} ${r} 0 1 0 ${px(-2 * Number(r))} 0`;
    })
    .join('');
  return path !== '' && markup`<path class="${className}" d="${path}"/>`;
}
