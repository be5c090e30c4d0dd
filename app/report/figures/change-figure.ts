import { dbText } from '../../compare/run-text.ts';
import type { Comparison, LineChange } from '../../compare/types.ts';
import { frequencyText } from '../format.ts';
import { type Markup, markup } from '../markup.ts';
import { type Standing, standingOfMargin } from '../verdict.ts';
import { linearScale, logScale, type Scale } from './axis.ts';
import { markGroup } from './marks.ts';
import { linePath, px, type Xy } from './path.ts';
import { type Box, boxAround, placeLabels } from './place-labels.ts';
import { FIGURE_WIDTH, frequencyNumbers, gridMarkup, PLOT_LEFT, PLOT_RIGHT } from './spectrum-frame.ts';
import { keepApart } from './thin-points.ts';

const HEIGHT = 330;
const BOX: Box = { left: PLOT_LEFT, top: 22, right: PLOT_RIGHT, bottom: 304 };
/** Larger margins are not drawn. */
const DEEPEST_DB = 50;
/** In a column this wide only the reading nearest to the limit, before or after, is drawn. */
const COLUMN_PX = 3;
const LABELLED = 6;
const GHOST_RADIUS_PX = 2.4;

/** A reading before and after, as places; absent on the side where there is none or it is too low to be drawn. */
interface Move {
  readonly line: LineChange;
  readonly ghost: Xy | undefined;
  readonly now: Xy | undefined;
  readonly standing: Standing;
}

/**
 * Margin of every line before (a ghost: hollow, quiet) and after (its mark), limits of all bands on one level: up is over. A hair
 * leads from ghost to mark.
 */
export function changeFigure(comparison: Comparison): Markup {
  const { lines, after } = comparison;
  const frequency = frequencyScale(lines);
  const scale = marginScale(lines);
  const moves = thinned(lines, frequency).map((line) => moveOf(line, after.requiredMarginDb, frequency, scale));
  const zeroY = scale.at(0);
  const band = scale.at(-Math.min(after.requiredMarginDb, DEEPEST_DB)) - zeroY;
  const places = (standing: Standing): Xy[] =>
    moves.flatMap((move) => (move.now && move.standing === standing ? [move.now] : []));
  return markup`<svg class="figure" viewBox="0 0 ${FIGURE_WIDTH} ${HEIGHT}" role="img" aria-label="Margin to the limit before and after, over frequency">
<defs><pattern id="change-hatch" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><path class="hatch" d="M0 0V5"/></pattern></defs>
${gridMarkup(frequency, scale, BOX, 10, 'dB to the limit')}
${frequencyNumbers(frequency, BOX.bottom + 15)}
${band > 0 && markup`<rect class="band" fill="url(#change-hatch)" x="${px(BOX.left)}" y="${px(zeroY)}" width="${px(BOX.right - BOX.left)}" height="${px(band)}"/>`}
<path class="stem" d="${moves.map(({ ghost, now }) => (ghost && now ? linePath([ghost, now]) : '')).join('')}"/>
<path class="ghost" d="${moves.map(({ ghost }) => (ghost ? ghostPath(ghost) : '')).join('')}"/>
<path class="limit qp" d="M${px(BOX.left)} ${px(zeroY)}H${px(BOX.right)}"/>
${markGroup('fine', places('fine'))}
${(['short', 'over'] as const).map((standing) => markGroup(standing, keepApart(places(standing))))}
<text class="label" x="${px(BOX.right + 6)}" y="${px(zeroY + 3.5)}">limit</text>
${band > 8 && markup`<text class="unit" x="${px(BOX.right + 6)}" y="${px(zeroY + band + 6)}">required margin</text>`}
${labels(moves)}
</svg>`;
}

function frequencyScale(lines: readonly LineChange[]): Scale {
  const [lowHz, highHz] = lines.reduce<[number, number]>(
    ([low, high], { frequencyHz }) => [Math.min(low, frequencyHz), Math.max(high, frequencyHz)],
    [30e6, 1e9],
  );
  return logScale(lowHz, highHz, PLOT_LEFT, PLOT_RIGHT);
}

function marginScale(lines: readonly LineChange[]): Scale {
  const worstDb = lines.reduce(
    (most, { before, after }) => Math.max(most, -(before?.marginDb ?? 0), -(after?.marginDb ?? 0)),
    0,
  );
  return linearScale(-DEEPEST_DB, Math.max(10, Math.ceil((worstDb + 4) / 10) * 10), BOX.bottom, BOX.top);
}

/** `lines` worst margin first: the first one in a column stays. */
function thinned(lines: readonly LineChange[], frequency: Scale): LineChange[] {
  const taken = new Set<number>();
  return lines.filter(({ frequencyHz }) => {
    const column = Math.floor(frequency.at(frequencyHz) / COLUMN_PX);
    if (taken.has(column)) return false;
    taken.add(column);
    return true;
  });
}

function moveOf(line: LineChange, requiredMarginDb: number, frequency: Scale, scale: Scale): Move {
  const x = frequency.at(line.frequencyHz);
  const placeOf = (reading: LineChange['before']): Xy | undefined =>
    reading && reading.marginDb <= DEEPEST_DB ? [x, scale.at(-reading.marginDb)] : undefined;
  const isSame = line.status === 'unchanged';
  return {
    line,
    ghost: isSame ? undefined : placeOf(line.before),
    now: placeOf(line.after),
    standing: line.after ? standingOfMargin(line.after.marginDb, requiredMarginDb) : 'fine',
  };
}

const ghostPath = ([x, y]: Xy): string =>
  `M${px(x - GHOST_RADIUS_PX)} ${px(y)}a${GHOST_RADIUS_PX} ${GHOST_RADIUS_PX} 0 1 0 ${2 * GHOST_RADIUS_PX} 0a${GHOST_RADIUS_PX} ${GHOST_RADIUS_PX} 0 1 0 ${-2 * GHOST_RADIUS_PX} 0`;

/** The worst lines, with the margin they moved by. */
function labels(moves: readonly Move[]): Markup {
  const shown = moves.slice(0, LABELLED).flatMap(({ line, ghost, now }) => {
    // The upper of both stands out of the crowd.
    const anchor = ghost && now ? (ghost[1] < now[1] ? ghost : now) : (now ?? ghost);
    if (!anchor) return [];
    const change = line.marginChangeDb;
    const by = change === null ? line.status : `${change < 0 ? 'worse' : 'better'} by ${dbText(Math.abs(change))} dB`;
    return [{ text: `${frequencyText(line.frequencyHz)}, ${line.status === 'unchanged' ? 'unchanged' : by}`, anchor }];
  });
  const obstacles = moves.flatMap(({ ghost, now }) =>
    [ghost, now].flatMap((place) => (place ? [boxAround(place, 4)] : [])),
  );
  const placed = placeLabels(shown, { bounds: BOX, fontPx: 10, obstacles });
  return markup`${placed.map(
    ({ text, anchor, at, leaderTo }) =>
      markup`${leaderTo && markup`<path class="leader" d="${linePath([anchor, leaderTo])}"/>`}<text class="label halo" x="${px(at[0])}" y="${px(at[1])}">${text}</text>`,
  )}`;
}
