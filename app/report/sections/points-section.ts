import type { EstimateResult, ResultPoint } from '../../estimate/result.ts';
import { inlineMark } from '../figures/marks.ts';
import { fixed, levelText, marginText, mhzText } from '../format.ts';
import { type Markup, markup } from '../markup.ts';
import { DETECTOR_SHORT } from '../text-table.ts';
import { type Standing, standingOf } from '../verdict.ts';
import { mainMarkup } from './main-markup.ts';
import { numberCell } from './number.ts';

/** Rows before the table stops. */
const MOST_ROWS = 60;

const STANDING_WORD: Readonly<Record<Standing, string>> = { over: 'over', short: 'short', fine: 'fine' };

/** The worst readings in numbers. */
export function pointsSection(result: EstimateResult): Markup {
  const { points } = result;
  if (points.length === 0) return markup``;
  const shown = points.slice(0, MOST_ROWS);
  const left = points.length - shown.length;
  return markup`<section><h2>Worst lines</h2>
<table class="points"><thead><tr><th></th><th class="n">Frequency<br/>MHz</th><th>Det.</th><th class="n">Level<br/>dBµV/m</th><th class="n">Limit<br/>dBµV/m</th><th class="n">Margin<br/>dB</th><th class="n">Horiz.<br/>dBµV/m</th><th class="n">Vert.<br/>dBµV/m</th><th class="n">Bound<br/>dBµV/m</th><th>Pol.</th><th class="n">Height<br/>m</th><th class="n">Angle<br/>°</th><th>Main contributor</th></tr></thead>
<tbody>${shown.map((point) => row(point, result.limit.requiredMarginDb))}</tbody></table>
<p class="note">Worst margin first, ties by frequency.${left > 0 && ` The ${left} readings that follow have larger margins; they are in the JSON result.`} QP quasi-peak, AV average, PK peak. Bound: linear sum of all contributors at the maximum. Angle: azimuth of the antenna in board axes, counter-clockwise from +x seen from the top.</p></section>`;
}

function row(point: ResultPoint, requiredMarginDb: number): Markup {
  const standing = standingOf(point, requiredMarginDb);
  return markup`<tr><td>${inlineMark(standing, STANDING_WORD[standing])}</td>${numberCell(mhzText(point.frequencyHz))}<td>${DETECTOR_SHORT[point.detector]}</td>${[
    levelText(point.levelDbuvPerM),
    levelText(point.limitDbuvPerM),
  ].map(numberCell)}<td class="n strong">${marginText(point.marginDb).replace('-', '−')}</td>${[
    levelText(point.horizontalDbuvPerM),
    levelText(point.verticalDbuvPerM),
    levelText(point.upperBoundDbuvPerM),
  ].map(numberCell)}<td>${point.polarization === 'horizontal' ? 'H' : 'V'}</td>${[
    fixed(point.antennaHeightM, 2),
    fixed(point.turntableDeg, 0),
  ].map(numberCell)}<td>${mainMarkup(point)}</td></tr>`;
}
