import type { EstimateResult } from '../../estimate/result.ts';
import { type Markup, markup } from '../markup.ts';
import { type Standing, standingOf } from '../verdict.ts';
import { linearScale } from './axis.ts';
import type { ReportLimitLine } from './limit-lines.ts';
import { markGroup } from './marks.ts';
import { px, type Xy } from './path.ts';
import type { Box } from './place-labels.ts';
import { FIGURE_WIDTH, frequencyNumbers, frequencyScale, gridMarkup, PLOT_LEFT, PLOT_RIGHT } from './spectrum-frame.ts';
import { keepApart, thinPoints } from './thin-points.ts';

const HEIGHT = 146;
const BOX: Box = { left: PLOT_LEFT, top: 22, right: PLOT_RIGHT, bottom: 120 };
/** Larger margins are not drawn. */
const DEEPEST_DB = 40;
/** More ticks than this are drawn as stubs of this length. */
const DENSE_COUNT = 200;
const STUB_PX = 3;

/** Margin of every line to its own limit, limits of all bands and detectors on one level: ticks up are over, down are under. */
export function marginStrip(result: EstimateResult, lines: readonly ReportLimitLine[]): Markup {
  const frequency = frequencyScale(result, lines);
  const { requiredMarginDb } = result.limit;
  const worstDb = Math.max(0, -(result.worst?.marginDb ?? 0));
  const above = Math.max(10, Math.ceil((worstDb + 4) / 10) * 10);
  const scale = linearScale(-DEEPEST_DB, above, BOX.bottom, BOX.top);
  const zeroY = scale.at(0);
  const points = thinPoints(result.points, frequency);
  const ends = (standing: Standing): Xy[] =>
    points
      .filter((point) => point.marginDb <= DEEPEST_DB && standingOf(point, requiredMarginDb) === standing)
      .map((point): Xy => [frequency.at(point.frequencyHz), scale.at(-point.marginDb)]);
  // Side by side, whole ticks would be a wall that hides which are short: then only their ends are drawn.
  const isDense = points.length > DENSE_COUNT;
  const ticks = (places: readonly Xy[]) =>
    places
      .map(
        ([x, y]) =>
          `M${px(x)} ${px(isDense ? y - Math.sign(y - zeroY) * Math.min(STUB_PX, Math.abs(y - zeroY)) : zeroY)}V${px(y)}`,
      )
      .join('');
  const band = scale.at(-Math.min(requiredMarginDb, DEEPEST_DB)) - zeroY;
  return markup`<svg class="figure" viewBox="0 0 ${FIGURE_WIDTH} ${HEIGHT}" role="img" aria-label="Margin to the limit over frequency">
${gridMarkup(frequency, scale, BOX, 10, 'dB to the limit')}
${frequencyNumbers(frequency, BOX.bottom + 15)}
${band > 0 && markup`<rect class="band" fill="url(#hatch)" x="${px(BOX.left)}" y="${px(zeroY)}" width="${px(BOX.right - BOX.left)}" height="${px(band)}"/>`}
${(['fine', 'short', 'over'] as const).map((standing) => markup`<path class="tick ${standing}" d="${ticks(ends(standing))}"/>`)}
<path class="limit qp" d="M${px(BOX.left)} ${px(zeroY)}H${px(BOX.right)}"/>
${(['short', 'over'] as const).map((standing) => markGroup(standing, keepApart(ends(standing).sort(([, one], [, other]) => one - other))))}
<text class="label" x="${px(BOX.right + 6)}" y="${px(zeroY + 3.5)}">limit</text>
${band > 8 && markup`<text class="unit" x="${px(BOX.right + 6)}" y="${px(zeroY + band + 6)}">required margin</text>`}
</svg>`;
}
