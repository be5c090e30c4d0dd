import type { Board, Net, PointM } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { type BoardFrame, boardExtent, boardFrame, rulerMarkup, scaleBar } from './board-frame.ts';
import { outlineMarkup, planesMarkup, tracesMarkup, viasMarkup } from './copper.ts';
import { linePath, px, ringPath, type Xy } from './path.ts';
import { type Box, boxAround, type LabelRequest, placeLabels } from './place-labels.ts';
import { rankDrivenNets } from './rank-nets.ts';

const WIDTH = 760;
const LEFT = 40;
const TOP = 8;
const MAX_WIDTH = 700;
const MAX_HEIGHT = 470;
const LABEL_PX = 10;
const NAME_LENGTH = 22;
/** Driven nets with a name on the picture; pins, loops, cables and findings come on top. */
export const NAMED_NETS = 8;
/** Findings with a number on the picture. */
export const NUMBERED_FINDINGS = 40;

/** The board from the top with every layer: copper grey; driven nets, pins, loops, cables and findings emphasised. */
export function boardFigure(board: Board, result: EstimateResult): Markup {
  const frame = boardFrame(boardExtent(board), [LEFT, TOP], [MAX_WIDTH, MAX_HEIGHT]);
  const driven = rankDrivenNets(board, result);
  const isDriven = new Set(driven);
  const quiet = board.nets.filter((net) => !isDriven.has(net));
  const { box } = frame;
  const everyLayer = () => true;
  // A solder mask may come before the top copper.
  const topIndex = board.stackup.findIndex(({ kind }) => kind === 'copper');
  const isTop = (layerIndex: number) => layerIndex === topIndex;
  const isBelow = (layerIndex: number) => layerIndex !== topIndex;
  const height = box.bottom + 34;
  return markup`<svg class="figure" viewBox="0 0 ${WIDTH} ${px(height)}" role="img" aria-label="Board from the top, driven nets emphasised">
<defs><clipPath id="board-clip"><rect x="${px(box.left)}" y="${px(box.top)}" width="${px(box.right - box.left)}" height="${px(box.bottom - box.top)}"/></clipPath></defs>
${rulerMarkup(frame)}
<g clip-path="url(#board-clip)">
${planesMarkup(board.planes, frame, everyLayer)}
${tracesMarkup(quiet, frame, 'copper', everyLayer)}
${viasMarkup(quiet, frame, 'via')}
${outlineMarkup(board, frame)}
${cableLines(board, frame)}
${loopLines(board, frame)}
${tracesMarkup(driven, frame, 'driven below', isBelow, 1.6)}
${tracesMarkup(driven, frame, 'driven', isTop, 1.6)}
${viasMarkup(driven, frame, 'driven-via')}
${pinMarks(board, frame)}
</g>
${findingMarks(result, frame)}
${labels(board, result, driven, frame)}
${scaleBar(frame.pxPerM, [box.left, box.bottom + 26], 120, 'mm')}
</svg>`;
}

const flat = (points: readonly (readonly [number, number, number])[], frame: BoardFrame): Xy[] =>
  points.map(([xM, yM]) => frame.at([xM, yM]));

function cableLines(board: Board, frame: BoardFrame): Markup {
  return markup`${board.cables.map(({ pointsM }) => {
    const points = flat(pointsM, frame);
    const [x, y] = points[0]!;
    return markup`<path class="cable" d="${linePath(points)}"/><path class="cable-joint" d="M${px(x - 3)} ${px(y - 3)}h6v6h-6Z"/>`;
  })}`;
}

const loopLines = (board: Board, frame: BoardFrame): Markup =>
  markup`${board.loops.map(({ pointsM }) => markup`<path class="loop" d="${ringPath(flat(pointsM, frame))}"/>`)}`;

/** Drive pins filled, load pins hollow. */
function pinMarks(board: Board, frame: BoardFrame): Markup {
  const square = (pins: readonly PointM[]) =>
    pins
      .map(frame.at)
      .map(([x, y]) => `M${px(x - 2.6)} ${px(y - 2.6)}h5.2v5.2h-5.2Z`)
      .join('');
  return markup`<path class="pin load" d="${square(pinPlaces(board, board.loads))}"/><path class="pin drive" d="${square(pinPlaces(board, board.drives))}"/>`;
}

function pinPlaces(board: Board, uses: readonly { readonly net: string; readonly pin: string }[]): PointM[] {
  const nets = new Map(board.nets.map((net) => [net.name, net]));
  return uses.flatMap(({ net, pin }) => {
    const found = nets.get(net)?.pins.find(({ name }) => name === pin);
    return found ? [found.atM] : [];
  });
}

/** Findings by their number in the table. */
function findingMarks(result: EstimateResult, frame: BoardFrame): Markup {
  return markup`${result.findings.slice(0, NUMBERED_FINDINGS).map(({ atM }, i) => {
    const [x, y] = frame.at(atM);
    return markup`<g class="finding"><circle cx="${px(x)}" cy="${px(y)}" r="7"/><text class="middle" x="${px(x)}" y="${px(y + 3.3)}">${i + 1}</text></g>`;
  })}`;
}

/** Names in order of weight: what emits most, then loops and cables, then the pins. */
function labels(board: Board, result: EstimateResult, driven: readonly Net[], frame: BoardFrame): Markup {
  const named = driven.slice(0, NAMED_NETS);
  const label = (name: string, anchor: Xy): LabelRequest => ({ text: shortName(name, NAME_LENGTH), anchor });
  const requests = [
    ...board.cables.map(({ name, pointsM }) => label(name, flat(pointsM, frame)[0]!)),
    ...named.flatMap((net) => {
      const anchor = middleOfLongestPiece(net);
      return anchor ? [label(net.name, frame.at(anchor))] : [];
    }),
    ...board.loops.map(({ name, pointsM }) => label(name, centreOf(flat(pointsM, frame)))),
  ];
  const names = new Set(named.map(({ name }) => name));
  const pins = [...board.drives, ...board.loads].filter(({ net }) => names.has(net));
  const pinRequests = pins.flatMap((use) => pinPlaces(board, [use]).map((atM) => label(use.pin, frame.at(atM))));
  const obstacles: Box[] = [
    ...result.findings.slice(0, NUMBERED_FINDINGS).map(({ atM }) => boxAround(frame.at(atM), 8)),
    ...pinRequests.map(({ anchor }) => boxAround(anchor, 3)),
  ];
  const lines = [
    ...named.flatMap(({ traces }) => traces.map(({ pointsM }) => pointsM.map(frame.at))),
    ...board.cables.map(({ pointsM }) => flat(pointsM, frame)),
    ...board.loops.map(({ pointsM }) => flat([...pointsM, pointsM[0]!], frame)),
  ];
  const placed = placeLabels([...requests, ...pinRequests], {
    bounds: { ...frame.box, right: WIDTH - 4 },
    fontPx: LABEL_PX,
    obstacles,
    lines,
  });
  return markup`${placed.map(
    ({ text, anchor, at, leaderTo }, i) =>
      markup`${
        leaderTo && markup`<path class="leader" d="${linePath([anchor, leaderTo])}"/>`
      }<text class="label halo${i < requests.length ? '' : ' minor'}" x="${px(at[0])}" y="${px(at[1])}">${text}</text>`,
  )}`;
}

/** Where a net's name is put first. */
export function middleOfLongestPiece({ traces }: Net): PointM | undefined {
  let longest = -1;
  let middle: PointM | undefined;
  for (const { pointsM } of traces) {
    for (let i = 1; i < pointsM.length; i++) {
      const [ax, ay] = pointsM[i - 1]!;
      const [bx, by] = pointsM[i]!;
      const length = Math.hypot(bx - ax, by - ay);
      if (length <= longest) continue;
      longest = length;
      middle = [(ax + bx) / 2, (ay + by) / 2];
    }
  }
  return middle;
}

const centreOf = (points: readonly Xy[]): Xy => [
  points.reduce((sum, [x]) => sum + x, 0) / points.length,
  points.reduce((sum, [, y]) => sum + y, 0) / points.length,
];
