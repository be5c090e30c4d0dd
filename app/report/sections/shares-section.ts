import type { Contributor, EstimateResult, ResultPoint } from '../../estimate/result.ts';
import { KIND_REMARK, pathsOf, pathText } from '../contributor-text.ts';
import { BAR_SPAN_DB, levelBar } from '../figures/bars.ts';
import { frequencyText, levelText, marginText } from '../format.ts';
import { type Markup, markup, nameMarkup } from '../markup.ts';
import { DETECTOR_SHORT } from '../text-table.ts';
import { worstOfEachFrequency } from '../worst-readings.ts';
import { printed } from './number.ts';

/** Frequencies taken apart, contributors and paths listed for each. */
const MOST_FREQUENCIES = 6;
const MOST_CONTRIBUTORS = 5;
const MOST_PATHS = 5;

/** What the worst lines are made of: contributor by path, as bars in dB with the law of their sum. */
export function sharesSection(result: EstimateResult): Markup {
  const worst = worstOfEachFrequency(result.points).slice(0, MOST_FREQUENCIES);
  if (worst.every(({ contributors }) => contributors.length === 0)) return markup``;
  return markup`<section><h2>What the worst lines are made of</h2>
<p class="note lead">Levels at the height, angle and polarisation of each maximum. The light bars under a contributor are its paths: trace pair, plane, each cable. Within one clock domain contributors, and the paths of each, add as phasors: they may cancel, so that a part can be larger than the sum; different domains add as powers. A full bar is the strongest part, an empty one ${BAR_SPAN_DB} dB below it; what is weaker is not listed.</p>
<div class="shares">${worst.map((point) => shareBlock(point))}</div></section>`;
}

function shareBlock(point: ResultPoint): Markup {
  const topDb = point.contributors
    .flatMap((contributor) => [
      contributor.levelDbuvPerM,
      ...pathsOf(contributor).map(({ levelDbuvPerM }) => levelDbuvPerM),
    ])
    .reduce((one, other) => Math.max(one, other), point.levelDbuvPerM);
  const shown = point.contributors
    .slice(0, MOST_CONTRIBUTORS)
    .filter(({ levelDbuvPerM }) => levelDbuvPerM > topDb - BAR_SPAN_DB);
  const left = point.contributors.length - shown.length;
  return markup`<table class="share"><thead><tr><th>${frequencyText(point.frequencyHz)} <span class="quiet">${DETECTOR_SHORT[point.detector]}, margin ${printed(marginText(point.marginDb))} dB</span></th><th class="n">${printed(levelText(point.levelDbuvPerM))}</th><th class="quiet">dBµV/m</th></tr></thead>
<tbody>${shown.map((contributor) => contributorRows(contributor, topDb))}${
    left > 0 && markup`<tr class="path"><td colspan="3">${left} weaker in the JSON result</td></tr>`
  }</tbody></table>`;
}

function contributorRows(contributor: Contributor, topDb: number): Markup {
  const paths = pathsOf(contributor).filter(({ levelDbuvPerM }) => levelDbuvPerM > topDb - BAR_SPAN_DB);
  const isSame = paths.length === 1 && paths[0]!.levelDbuvPerM === contributor.levelDbuvPerM;
  const remark = contributor.kind === 'net' && isSame ? pathText(paths[0]!.name) : KIND_REMARK[contributor.kind];
  return markup`<tr><td>${nameMarkup(contributor.name, 30)} <span class="quiet">${remark}</span></td><td class="n">${printed(levelText(contributor.levelDbuvPerM))}</td><td class="bars">${levelBar(contributor.levelDbuvPerM, topDb, 'bar-whole')}</td></tr>${
    !isSame &&
    paths
      .slice(0, MOST_PATHS)
      .map(
        ({ name, levelDbuvPerM }) =>
          markup`<tr class="path"><td>${nameMarkup(pathText(name), 30)}</td><td class="n">${printed(levelText(levelDbuvPerM))}</td><td class="bars">${levelBar(levelDbuvPerM, topDb, 'bar-path')}</td></tr>`,
      )
  }`;
}
