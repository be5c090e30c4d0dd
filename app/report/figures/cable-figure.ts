import type { Board, Cable, Point3M } from '../../board/board.ts';
import type { StructureCurrentMap } from '../../estimate/result.ts';
import { uaToA } from '../../units/convert.ts';
import { quantityText, trimmed } from '../format.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { farEndText } from '../source-text.ts';
import { linearScale, multiples, roundStep, type Scale } from './axis.ts';
import { linePath, px, type Xy } from './path.ts';

type CableCurrent = StructureCurrentMap['cables'][number];

const WIDTH = 760;
const PANEL_WIDTH = 352;
const PANEL_GAP = WIDTH - 2 * PANEL_WIDTH;
const PANEL_HEIGHT = 142;
const PLOT_LEFT = 40;
const PLOT_RIGHT = 8;
const PLOT_TOP = 36;
const PLOT_HEIGHT = 62;
/** The cable itself runs this far under the plot's zero. */
const CABLE_BELOW = 9;
const NAME_LENGTH = 28;
/** Cables drawn; of more those with the largest current. */
export const MOST_CABLES = 6;

/** Current along every cable, one panel each, all with one ampere scale; absent without cables. */
export function cableFigure({ cables }: StructureCurrentMap, board: Board): Markup | undefined {
  const drawn = cables
    .filter(({ pointsM, currentRmsA }) => pointsM.length > 1 && pointsM.length === currentRmsA.length)
    .map((cable) => ({ cable, mostA: mostOf(cable.currentRmsA) }))
    .sort((one, other) => other.mostA - one.mostA || (one.cable.name < other.cable.name ? -1 : 1))
    .slice(0, MOST_CABLES);
  if (drawn.length === 0) return undefined;
  const topUa = Math.max(...drawn.map(({ mostA }) => mostA)) / uaToA(1);
  const rows = Math.ceil(drawn.length / 2);
  return markup`<svg class="figure" viewBox="0 0 ${WIDTH} ${rows * PANEL_HEIGHT}" role="img" aria-label="Current along the cables">${drawn.map(
    ({ cable }, i) =>
      panel(
        cable,
        board.cables.find(({ name }) => name === cable.name),
        topUa > 0 ? topUa : 1,
        [(i % 2) * (PANEL_WIDTH + PANEL_GAP), Math.floor(i / 2) * PANEL_HEIGHT],
      ),
  )}</svg>`;
}

const mostOf = (values: readonly number[]): number => values.reduce((most, value) => Math.max(most, value), 0);

function panel(cable: CableCurrent, drawn: Cable | undefined, topUa: number, [left, top]: Xy): Markup {
  const distancesM = distancesAlong(cable.pointsM);
  const lengthM = distancesM.at(-1)!;
  const zeroY = top + PLOT_TOP + PLOT_HEIGHT;
  const x = linearScale(0, Math.max(lengthM, 1e-9), left + PLOT_LEFT, left + PANEL_WIDTH - PLOT_RIGHT);
  const y = linearScale(0, topUa * 1.05, zeroY, top + PLOT_TOP);
  const curve = cable.currentRmsA.map((currentA, i): Xy => [x.at(distancesM[i]!), y.at(currentA / uaToA(1))]);
  const mostA = mostOf(cable.currentRmsA);
  const mostAtM = distancesM[cable.currentRmsA.indexOf(mostA)] ?? 0;
  const line = linePath(curve);
  return markup`<text class="label" x="${px(left)}" y="${px(top + 12)}">${shortName(cable.name, NAME_LENGTH)}</text><text class="num end" x="${px(left + PANEL_WIDTH - PLOT_RIGHT)}" y="${px(top + 12)}">largest ${quantityText(Number(mostA.toPrecision(3)), 'A')} at ${trimmed(mostAtM, 2)} m</text>
${axes(x, y)}
<path class="cable-area" d="${line}V${px(zeroY)}H${px(curve[0]![0])}Z"/><path class="cable-current" d="${line}"/>
${schematic(x, zeroY + CABLE_BELOW, drawn)}`;
}

function axes(x: Scale, y: Scale): Markup {
  const [left, right] = [x.at(x.from), x.at(x.to)];
  const [bottom, top] = [y.at(y.from), y.at(y.to)];
  const currents = multiples(0, y.to, roundStep(y.to, 3));
  const lengths = multiples(0, x.to, roundStep(x.to, 5));
  return markup`<path class="grid" d="${currents.map((ua) => `M${px(left)} ${px(y.at(ua))}H${px(right)}`).join('')}"/>
<path class="frame" d="M${px(left)} ${px(top)}V${px(bottom)}H${px(right)}"/>
${currents.map((ua) => markup`<text class="num end" x="${px(left - 5)}" y="${px(y.at(ua) + 3.5)}">${trimmed(ua, 9)}</text>`)}
<text class="unit end" x="${px(left - 5)}" y="${px(top - 5)}">µA</text>
<path class="ruler" d="${lengths.map((lengthM) => `M${px(x.at(lengthM))} ${px(bottom + CABLE_BELOW + 3)}v3`).join('')}"/>
${lengths.map((lengthM, i) => markup`<text class="num middle" x="${px(x.at(lengthM))}" y="${px(bottom + CABLE_BELOW + 16)}">${trimmed(lengthM, 6)}${i === lengths.length - 1 && ' m'}</text>`)}`;
}

/** The cable drawn straight: joint at the board, its bends, its far end. */
function schematic(x: Scale, y: number, cable: Cable | undefined): Markup {
  const [left, right] = [x.at(x.from), x.at(x.to)];
  const bends = cable ? distancesAlong(cable.pointsM).slice(1, -1) : [];
  const bendPath = bends
    .filter((distanceM) => distanceM < x.to)
    .map((distanceM) => `M${px(x.at(distanceM))} ${px(y - 3)}v6`)
    .join('');
  return markup`<path class="cable" d="M${px(left)} ${px(y)}H${px(right)}${bendPath}"/><path class="cable-joint" d="M${px(left - 3)} ${px(y - 3)}h6v6h-6Z"/>${
    cable && farEndMark(cable.farEnd, [right, y])
  }<text class="unit" x="${px(left)}" y="${px(y + 27)}">board</text>${
    cable &&
    markup`<text class="unit end" x="${px(right)}" y="${px(y + 27)}">far end ${farEndText(cable.farEnd)}</text>`
  }`;
}

/** Open: a ring; otherwise the sign of ground. */
const farEndMark = (farEnd: Cable['farEnd'], [x, y]: Xy): Markup =>
  farEnd === 'open'
    ? markup`<circle class="far-end" cx="${px(x)}" cy="${px(y)}" r="2.6"/>`
    : markup`<path class="cable" d="M${px(x)} ${px(y - 5)}v10M${px(x + 2.5)} ${px(y - 3)}v6M${px(x + 5)} ${px(y - 1)}v2"/>`;

/** Length of the chain from its first point to each point, m. */
export function distancesAlong(pointsM: readonly Point3M[]): number[] {
  let sumM = 0;
  return pointsM.map((point, i) => {
    const from = pointsM[i - 1] ?? point;
    sumM += Math.hypot(point[0] - from[0], point[1] - from[1], point[2] - from[2]);
    return sumM;
  });
}
