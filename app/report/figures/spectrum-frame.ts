import type { EstimateResult } from '../../estimate/result.ts';
import { type Markup, markup } from '../markup.ts';
import { frequencyTicks, linearScale, logScale, multiples, type Scale } from './axis.ts';
import { clipLine, type ReportLimitLine } from './limit-lines.ts';
import { px } from './path.ts';
import type { Box } from './place-labels.ts';

export const FIGURE_WIDTH = 760;
export const PLOT_LEFT = 46;
export const PLOT_RIGHT = 664;

/** The frequency axis shared by spectrum and margin strip. */
export function frequencyScale(result: EstimateResult, lines: readonly ReportLimitLine[]): Scale {
  const frequencies = result.points.map(({ frequencyHz }) => frequencyHz);
  const starts = lines.map(({ points }) => points[0]?.[0] ?? 30e6);
  // Lines of a standard may start far below the radiated range: the plot does not, unless there is something to see.
  const start =
    least([30e6, ...frequencies]) < 30e6
      ? least(frequencies)
      : Math.max(30e6, least([...starts, ...frequencies], 30e6));
  const end = Math.max(result.limit.maxHz, greatest(frequencies, 0), start * 2);
  return logScale(start, end, PLOT_LEFT, PLOT_RIGHT);
}

/** Deepest view below the lowest limit: what lies under it does not matter to anybody. */
const DEPTH_DB = 50;

/** The level axis: limits, levels and some air. */
export function levelScale(
  result: EstimateResult,
  lines: readonly ReportLimitLine[],
  frequency: Scale,
  [topPx, bottomPx]: readonly [number, number],
): Scale {
  const drawn = lines.flatMap(({ points }) =>
    clipLine(points, frequency.from, frequency.to).map(([, limitDb]) => limitDb),
  );
  const limits = drawn.length > 0 ? drawn : result.points.map(({ limitDbuvPerM }) => limitDbuvPerM);
  const levels = result.points.flatMap((point) => [
    point.horizontalDbuvPerM,
    point.verticalDbuvPerM,
    point.levelDbuvPerM,
  ]);
  const seen = levels.filter(Number.isFinite);
  const lowestLimit = least(limits, 40);
  const low = Math.max(lowestLimit - DEPTH_DB, Math.min(least(seen, lowestLimit), lowestLimit - 30));
  const high = Math.max(greatest(limits, 40), greatest(seen, 0)) + 3;
  return linearScale(Math.floor(low / 10) * 10, Math.ceil(high / 5) * 5, bottomPx, topPx);
}

/** Grid, frame and numbers of both axes. */
export function gridMarkup(frequency: Scale, level: Scale, box: Box, step: number, axisTitle: string): Markup {
  const ticks = frequencyTicks(frequency.from, frequency.to);
  const vertical = ticks.map(({ frequencyHz }) => `M${px(frequency.at(frequencyHz))} ${px(box.top)}V${px(box.bottom)}`);
  const values = multiples(level.from, level.to, step);
  const horizontal = values.map((value) => `M${px(box.left)} ${px(level.at(value))}H${px(box.right)}`);
  return markup`<path class="grid" d="${vertical.join('')}${horizontal.join('')}"/>
<rect class="frame" x="${px(box.left)}" y="${px(box.top)}" width="${px(box.right - box.left)}" height="${px(box.bottom - box.top)}"/>
${values.map((value) => markup`<text class="num end" x="${px(box.left - 5)}" y="${px(level.at(value) + 3.5)}">${String(value).replace('-', '−')}</text>`)}
<text class="unit" x="${px(box.left - 40)}" y="${px(box.top - 7)}">${axisTitle}</text>`;
}

/** Numbers of the frequency axis; one that would touch the last is left out. */
export function frequencyNumbers(frequency: Scale, y: number): Markup {
  let free = 0;
  const numbers = frequencyTicks(frequency.from, frequency.to).flatMap(({ frequencyHz, label }) => {
    const x = frequency.at(frequencyHz);
    if (label === undefined || x - label.length * 3 < free) return [];
    free = x + label.length * 3 + 4;
    return [markup`<text class="num middle" x="${px(x)}" y="${px(y)}">${label}</text>`];
  });
  return markup`${numbers}`;
}

/** Smallest and greatest without spreading thousands of arguments. */
const least = (values: readonly number[], otherwise = Infinity): number =>
  values.length === 0 ? otherwise : values.reduce((one, other) => Math.min(one, other));
const greatest = (values: readonly number[], otherwise = -Infinity): number =>
  values.length === 0 ? otherwise : values.reduce((one, other) => Math.max(one, other));
