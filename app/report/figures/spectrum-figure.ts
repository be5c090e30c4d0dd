import type { EstimateResult, ResultPoint } from '../../estimate/result.ts';
import { frequencyText, marginText, trimmed } from '../format.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { type Standing, standingOf } from '../verdict.ts';
import type { Scale } from './axis.ts';
import { HATCH } from './hatch.ts';
import { clipLine, type ReportLimitLine } from './limit-lines.ts';
import { DASH_HALF_PX, DENSE_DASH_HALF_PX, markGroup, polarizationDash } from './marks.ts';
import { linePath, px, type Xy } from './path.ts';
import { type Box, boxAround, type LabelRequest, placeLabels } from './place-labels.ts';
import {
  FIGURE_WIDTH,
  frequencyNumbers,
  frequencyScale,
  gridMarkup,
  levelScale,
  PLOT_LEFT,
  PLOT_RIGHT,
} from './spectrum-frame.ts';
import { keepApart, thinPoints } from './thin-points.ts';

const HEIGHT = 372;
const BOX: Box = { left: PLOT_LEFT, top: 22, right: PLOT_RIGHT, bottom: 346 };
const LABEL_PX = 10;
/** Worst frequencies with a label. */
const LABELLED = 7;
/** Lines nearer than this to a worse one go without a label. */
const LABEL_APART_PX = 8;
/** More readings than this, and rings and stems would only darken the plot. */
const CALM_COUNT = 120;

const STANDINGS: readonly Standing[] = ['fine', 'short', 'over'];

/** Level of every line against the limit lines over log frequency, required margin as a hatched band. */
export function spectrumFigure(result: EstimateResult, lines: readonly ReportLimitLine[]): Markup {
  const frequency = frequencyScale(result, lines);
  const level = levelScale(result, lines, frequency, [BOX.top, BOX.bottom]);
  const points = thinPoints(result.points, frequency);
  return markup`<svg class="figure" viewBox="0 0 ${FIGURE_WIDTH} ${HEIGHT}" role="img" aria-label="Level against limit over frequency">
<defs><clipPath id="spectrum-clip"><rect x="${px(BOX.left)}" y="${px(BOX.top)}" width="${px(BOX.right - BOX.left)}" height="${px(BOX.bottom - BOX.top)}"/></clipPath>
${HATCH}</defs>
${gridMarkup(frequency, level, BOX, 10, 'dBµV/m')}
${frequencyNumbers(frequency, BOX.bottom + 15)}
<g clip-path="url(#spectrum-clip)">
${lines.map((line) => bandMarkup(line, result.limit.requiredMarginDb, frequency, level))}
${points.length <= CALM_COUNT && stems(points, frequency, level)}
${dashes(points, frequency, level)}
</g>
${limitMarkup(lines, frequency, level)}
${STANDINGS.map((standing) => markGroup(standing, markPlaces(points, standing, result, frequency, level)))}
${labelMarkup(result, points, lines, frequency, level)}
</svg>`;
}

function bandMarkup(line: ReportLimitLine, requiredMarginDb: number, frequency: Scale, level: Scale): Markup | false {
  const clipped = clipLine(line.points, frequency.from, frequency.to);
  if (clipped.length < 2 || requiredMarginDb <= 0) return false;
  const upper = clipped.map(([hz, db]): Xy => [frequency.at(hz), level.at(db)]);
  const lower = clipped.map(([hz, db]): Xy => [frequency.at(hz), level.at(db - requiredMarginDb)]).reverse();
  return markup`<path class="band" fill="url(#hatch)" d="${linePath([...upper, ...lower])}Z"/>`;
}

function stems(points: readonly ResultPoint[], frequency: Scale, level: Scale): Markup {
  const path = points
    .filter(({ levelDbuvPerM }) => levelDbuvPerM > level.from)
    .map(
      ({ frequencyHz, levelDbuvPerM }) =>
        `M${px(frequency.at(frequencyHz))} ${px(BOX.bottom)}V${px(level.at(levelDbuvPerM))}`,
    );
  return markup`<path class="stem" d="${path.join('')}"/>`;
}

function dashes(points: readonly ResultPoint[], frequency: Scale, level: Scale): Markup {
  const half = points.length <= CALM_COUNT ? DASH_HALF_PX : DENSE_DASH_HALF_PX;
  const path = (polarization: 'horizontal' | 'vertical') =>
    points
      .map((point) => ({
        x: frequency.at(point.frequencyHz),
        levelDb: polarization === 'horizontal' ? point.horizontalDbuvPerM : point.verticalDbuvPerM,
      }))
      .filter(({ levelDb }) => levelDb > level.from)
      .map(({ x, levelDb }) => polarizationDash(polarization, x, level.at(levelDb), half))
      .join('');
  return markup`<path class="pol-h" d="${path('horizontal')}"/><path class="pol-v" d="${path('vertical')}"/>`;
}

function markPlaces(
  points: readonly ResultPoint[],
  standing: Standing,
  result: EstimateResult,
  frequency: Scale,
  level: Scale,
): Xy[] {
  if (standing === 'fine' && points.length > CALM_COUNT) return [];
  const shown = points
    .filter(
      (point) => standingOf(point, result.limit.requiredMarginDb) === standing && point.levelDbuvPerM > level.from,
    )
    .sort((one, other) => one.marginDb - other.marginDb)
    .map((point): Xy => [frequency.at(point.frequencyHz), level.at(point.levelDbuvPerM)]);
  return points.length <= CALM_COUNT ? shown : keepApart(shown);
}

const LIMIT_CLASS = { 'quasi-peak': 'limit qp', average: 'limit av', peak: 'limit pk' } as const;
const DETECTOR_WORD = { 'quasi-peak': 'quasi-peak', average: 'average', peak: 'peak' } as const;

/** Limit lines, each named at its end: in the margin when it runs to the edge, else above its last piece. */
function limitMarkup(lines: readonly ReportLimitLine[], frequency: Scale, level: Scale): Markup {
  let lowestFree = BOX.bottom;
  const drawn = lines
    .map((line) => ({ line, clipped: clipLine(line.points, frequency.from, frequency.to) }))
    .filter(({ clipped }) => clipped.length >= 2)
    .sort((one, other) => one.clipped.at(-1)![1] - other.clipped.at(-1)![1]);
  return markup`${drawn.map(({ line, clipped }) => {
    const path = linePath(clipped.map(([hz, db]): Xy => [frequency.at(hz), level.at(db)]));
    const [endHz, endDb] = clipped.at(-1)!;
    const endX = frequency.at(endHz);
    const endY = level.at(endDb);
    const stroke = markup`<path class="${LIMIT_CLASS[line.detector]}" d="${path}"/>`;
    const value = `${trimmed(endDb, 1)} dBµV/m`;
    if (endX < BOX.right - 1) {
      return markup`${stroke}<text class="label end" x="${px(endX - 4)}" y="${px(endY - 5)}">${shortName(line.label, 30)}</text>`;
    }
    const y = Math.min(endY + 3.5, lowestFree);
    lowestFree = y - 26;
    return markup`${stroke}<text class="label" x="${px(BOX.right + 6)}" y="${px(y)}">${value}</text><text class="unit" x="${px(BOX.right + 6)}" y="${px(y + 11)}">${DETECTOR_WORD[line.detector]} limit</text>`;
  })}`;
}

/** Frequencies beside the worst lines, where there is room; the worst with its margin. */
function labelMarkup(
  result: EstimateResult,
  drawn: readonly ResultPoint[],
  lines: readonly ReportLimitLine[],
  frequency: Scale,
  level: Scale,
): Markup {
  const placeOf = (point: ResultPoint): Xy => [frequency.at(point.frequencyHz), level.at(point.levelDbuvPerM)];
  const named = new Map<number, LabelRequest>();
  for (const point of result.points) {
    if (named.size >= LABELLED) break;
    if (named.has(point.frequencyHz) || point.levelDbuvPerM <= level.from) continue;
    const [x] = placeOf(point);
    if ([...named.values()].some(({ anchor }) => Math.abs(anchor[0] - x) < LABEL_APART_PX)) continue;
    const margin = named.size === 0 ? `, ${marginText(point.marginDb).replace('-', '−')} dB` : '';
    named.set(point.frequencyHz, { text: `${frequencyText(point.frequencyHz)}${margin}`, anchor: placeOf(point) });
  }
  const isCalm = drawn.length <= CALM_COUNT;
  const marks = drawn
    .filter((point) => isCalm || standingOf(point, result.limit.requiredMarginDb) !== 'fine')
    .map((point) => boxAround(placeOf(point), 4));
  const anchors = [...named.values()].map(({ anchor }) => boxAround(anchor, 6));
  const obstacles = [...limitBoxes(lines, frequency, level), ...marks, ...anchors];
  const placed = placeLabels([...named.values()], { bounds: BOX, fontPx: LABEL_PX, obstacles });
  return markup`${placed.map(
    ({ text, anchor, at, leaderTo }) =>
      markup`${
        leaderTo && markup`<path class="leader" d="${linePath([anchor, leaderTo])}"/>`
      }<text class="label halo" x="${px(at[0])}" y="${px(at[1])}">${text}</text>`,
  )}`;
}

/** Pieces of the limit lines as boxes, so that no label lies on them. */
function limitBoxes(lines: readonly ReportLimitLine[], frequency: Scale, level: Scale): Box[] {
  return lines.flatMap(({ points }) => {
    const clipped = clipLine(points, frequency.from, frequency.to);
    return clipped.slice(1).map(([hz, db], i): Box => {
      const [fromHz, fromDb] = clipped[i]!;
      return {
        left: frequency.at(fromHz) - 2,
        right: frequency.at(hz) + 2,
        top: level.at(Math.max(db, fromDb)) - 2,
        bottom: level.at(Math.min(db, fromDb)) + 2,
      };
    });
  });
}
