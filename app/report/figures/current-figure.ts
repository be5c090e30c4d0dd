import type { Board, Net } from '../../board/board.ts';
import type { StructureCurrentMap } from '../../estimate/result.ts';
import { amplitudeToDb, uaToA } from '../../units/convert.ts';
import { quantityText } from '../format.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { middleOfLongestPiece } from './board-figure.ts';
import { type BoardFrame, boardExtent, boardFrame, rulerMarkup, scaleBar } from './board-frame.ts';
import { type CellRun, cellRuns } from './cell-runs.ts';
import { outlineMarkup } from './copper.ts';
import { LEVEL_COLOURS, LEVEL_STEP_DB } from './level-colours.ts';
import { linePath, px, ringPath, type Xy } from './path.ts';
import { type LabelRequest, placeLabels } from './place-labels.ts';

const WIDTH = 760;
const LEFT = 40;
const TOP = 8;
const MAX_WIDTH = 590;
const MAX_HEIGHT = 212;
const LABEL_PX = 10;
const NAME_LENGTH = 22;
const BAR_WIDTH = 12;
const MOST_BAR_HEIGHT = 204;
const BAR_TITLE = 20;
/** The colour bar ends at a multiple of this. */
const ROUND_DB = 5;
/** Steps of the colour bar between two numbers. */
const STEPS_PER_NUMBER = 4;

/** What drives the map most: drawn over it. */
export interface DrawnOver {
  readonly name: string;
  readonly net?: Net | undefined;
  readonly loopM?: Board['loops'][number]['pointsM'] | undefined;
}

/** Level of a sheet current density (rms), dB above 1 µA/m. */
const densityDb = (densityRmsAPerM: number): number => amplitudeToDb(densityRmsAPerM / uaToA(1));

/** The board from the top, its cells coloured by the density of the plane's current; absent when there is none. */
export function currentFigure(map: StructureCurrentMap, board: Board, over: DrawnOver | undefined): Markup | undefined {
  const strongestDb = densityDb(map.cells.reduce((most, { densityRmsAPerM }) => Math.max(most, densityRmsAPerM), 0));
  if (!Number.isFinite(strongestDb) || !(map.cellM > 0)) return undefined;
  const topDb = Math.ceil(strongestDb / ROUND_DB) * ROUND_DB;
  const frame = boardFrame(boardExtent(board), [LEFT, TOP], [MAX_WIDTH, MAX_HEIGHT]);
  const { box } = frame;
  const view = [box.left, box.top, box.right - box.left, box.bottom - box.top].map(px);
  return markup`<svg class="figure" viewBox="0 0 ${WIDTH} ${px(box.bottom + 34)}" role="img" aria-label="Current density on the plane, from the top">
${rulerMarkup(frame)}
<svg x="${view[0]!}" y="${view[1]!}" width="${view[2]!}" height="${view[3]!}" viewBox="${view.join(' ')}">
${cellsMarkup(map, topDb, frame)}
${outlineMarkup(board, frame)}
${over && overMarkup(over, frame)}
${cableMarkup(map, frame)}
</svg>
${labels(map, over, frame)}
${colourBar(topDb, [box.right + 16, box.top], Math.min(MOST_BAR_HEIGHT, box.bottom - box.top))}
${scaleBar(frame.pxPerM, [box.left, box.bottom + 26], 120, 'mm')}
</svg>`;
}

/** One path a colour, in units of cells with y up. */
function cellsMarkup({ cells, cellM }: StructureCurrentMap, topDb: number, frame: BoardFrame): Markup {
  const lowX = cells.reduce((low, { atM }) => Math.min(low, atM[0]), Infinity);
  const lowY = cells.reduce((low, { atM }) => Math.min(low, atM[1]), Infinity);
  const placed = cells.map(({ atM, densityRmsAPerM }) => ({
    column: Math.round((atM[0] - lowX) / cellM),
    row: Math.round((atM[1] - lowY) / cellM),
    step: colourStep(densityDb(densityRmsAPerM), topDb),
  }));
  const [x, y] = frame.at([lowX - cellM / 2, lowY - cellM / 2]);
  const scale = cellM * frame.pxPerM;
  return markup`<g class="cells" transform="translate(${px(x)} ${px(y)}) scale(${String(scale)} ${String(-scale)})">${[
    ...cellRuns(placed),
  ].map(([step, runs]) => markup`<path class="s${step}" d="${runs.map(runPath).join('')}"/>`)}</g>`;
}

const runPath = ({ column, row, width, height }: CellRun): string => `M${column} ${row}h${width}v${height}h${-width}z`;

/** Colour of a level: the last step ends at the top; what lies below the first has its colour. */
export function colourStep(levelDb: number, topDb: number): number {
  const below = Math.floor((topDb - levelDb) / LEVEL_STEP_DB);
  return Math.max(0, LEVEL_COLOURS.length - 1 - Math.max(0, below));
}

/** A line with a rim, seen on any colour. */
const rimmed = (path: string, className: string): Markup =>
  markup`<path class="casing" d="${path}"/><path class="${className}" d="${path}"/>`;

function overMarkup({ net, loopM }: DrawnOver, frame: BoardFrame): Markup {
  const traces = net?.traces.map(({ pointsM }) => linePath(pointsM.map(frame.at))).join('') ?? '';
  const loop = loopM ? ringPath(loopM.map(([xM, yM]) => frame.at([xM, yM]))) : '';
  return markup`${traces + loop !== '' && rimmed(traces + loop, 'over-line')}`;
}

const flat = (points: readonly (readonly [number, number, number])[], frame: BoardFrame): Xy[] =>
  points.map(([xM, yM]) => frame.at([xM, yM]));

const cableMarkup = ({ cables }: StructureCurrentMap, frame: BoardFrame): Markup =>
  markup`${cables.flatMap(({ pointsM }) => {
    if (pointsM.length === 0) return [];
    const points = flat(pointsM, frame);
    const [x, y] = points[0]!;
    return [
      rimmed(linePath(points), 'cable'),
      markup`<path class="cable-joint rimmed" d="M${px(x - 3.5)} ${px(y - 3.5)}h7v7h-7Z"/>`,
    ];
  })}`;

function labels({ cables }: StructureCurrentMap, over: DrawnOver | undefined, frame: BoardFrame): Markup {
  const requests: LabelRequest[] = cables
    .filter(({ pointsM }) => pointsM.length > 0)
    .map(({ name, pointsM }) => ({ text: shortName(name, NAME_LENGTH), anchor: flat(pointsM.slice(0, 1), frame)[0]! }));
  const anchor = over && anchorOf(over, frame);
  if (over && anchor) requests.push({ text: shortName(over.name, NAME_LENGTH), anchor });
  const lines = [
    ...(over?.net?.traces.map(({ pointsM }) => pointsM.map(frame.at)) ?? []),
    ...(over?.loopM ? [flat(over.loopM, frame)] : []),
    ...cables.map(({ pointsM }) => flat(pointsM, frame)),
  ];
  const placed = placeLabels(requests, { bounds: frame.box, fontPx: LABEL_PX, lines });
  return markup`${placed.map(
    ({ text, anchor: from, at, leaderTo }) =>
      markup`${leaderTo && markup`<path class="leader" d="${linePath([from, leaderTo])}"/>`}<text class="label halo" x="${px(at[0])}" y="${px(at[1])}">${text}</text>`,
  )}`;
}

function anchorOf({ net, loopM }: DrawnOver, frame: BoardFrame): Xy | undefined {
  const middle = net && middleOfLongestPiece(net);
  return middle ? frame.at(middle) : loopM && flat(loopM, frame)[0];
}

/** Colours with their levels, and the same in amperes per metre. */
function colourBar(topDb: number, [left, top]: Xy, height: number): Markup {
  const count = LEVEL_COLOURS.length;
  const first = top + BAR_TITLE;
  const step = (height - BAR_TITLE) / count;
  const numbers = Array.from({ length: count / STEPS_PER_NUMBER + 1 }, (_, i) => i * STEPS_PER_NUMBER);
  return markup`<text class="unit" x="${px(left)}" y="${px(top + 7)}">dBµA/m, rms</text>
<g class="colour-bar">${LEVEL_COLOURS.map((_, i) => markup`<rect class="s${count - 1 - i}" x="${px(left)}" y="${px(first + i * step)}" width="${BAR_WIDTH}" height="${px(step)}"/>`)}</g>
${numbers.map((below) => {
  const levelDb = topDb - below * LEVEL_STEP_DB;
  const y = first + below * step;
  return markup`<path class="ruler" d="M${px(left + BAR_WIDTH)} ${px(y)}h4"/><text class="num" x="${px(left + BAR_WIDTH + 7)}" y="${px(y + 3.5)}">${String(levelDb).replace('-', '−')} (${quantityText(roughly(uaToA(10 ** (levelDb / 20))), 'A/m')})</text>`;
})}`;
}

/** Two digits are enough beside a level. */
const roughly = (value: number): number => Number(value.toPrecision(2));
