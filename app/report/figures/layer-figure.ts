import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { boardExtent, boardFrame } from './board-frame.ts';
import { outlineMarkup, planesMarkup, tracesMarkup } from './copper.ts';
import { px } from './path.ts';
import { rankDrivenNets } from './rank-nets.ts';

const WIDTH = 760;
const GAP = 14;
const TITLE = 16;
const MAX_COLUMNS = 4;
const MAX_HEIGHT = 190;
const RIM = 0.01;

/** Indices of copper layers that carry a plane or a trace, top first. */
function usedLayers(board: Board): number[] {
  const used = new Set([
    ...board.planes.map(({ layerIndex }) => layerIndex),
    ...board.nets.flatMap(({ traces }) => traces.map(({ layerIndex }) => layerIndex)),
  ]);
  return [...used].sort((one, other) => one - other);
}

/** Every used copper layer by itself, all seen from the top. Absent when the board uses one layer only. */
export function layerFigure(board: Board, result: EstimateResult): Markup | undefined {
  const layers = usedLayers(board);
  if (layers.length < 2) return undefined;
  const columns = Math.min(MAX_COLUMNS, layers.length > 4 && layers.length <= 6 ? 3 : layers.length);
  const cellWidth = (WIDTH - GAP * (columns - 1)) / columns;
  const extent = boardExtent(board);
  const driven = rankDrivenNets(board, result);
  const isDriven = new Set(driven);
  const quiet = board.nets.filter((net) => !isDriven.has(net));
  const { box } = boardFrame(extent, [0, 0], [cellWidth, MAX_HEIGHT], RIM);
  const rowHeight = box.bottom + TITLE + GAP;
  const rows = Math.ceil(layers.length / columns);
  return markup`<svg class="figure" viewBox="0 0 ${WIDTH} ${px(rows * rowHeight)}" role="img" aria-label="Copper layers one by one">
${layers.map((layerIndex, i) => {
  const left = (i % columns) * (cellWidth + GAP);
  const top = Math.floor(i / columns) * rowHeight + TITLE;
  const frame = boardFrame(extent, [left, top], [cellWidth, MAX_HEIGHT], RIM);
  const isShown = (other: number) => other === layerIndex;
  return markup`<g><text class="label" x="${px(left)}" y="${px(top - 4)}">${shortName(board.stackup[layerIndex]?.name ?? '', 24)}</text>
${planesMarkup(board.planes, frame, isShown)}${tracesMarkup(quiet, frame, 'copper', isShown)}${outlineMarkup(board, frame)}${tracesMarkup(driven, frame, 'driven', isShown, 1.2)}</g>`;
})}
</svg>`;
}
