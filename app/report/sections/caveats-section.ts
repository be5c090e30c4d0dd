import type { EstimateResult } from '../../estimate/result.ts';
import { byMessage, type CaveatGroup, groupCaveats } from '../caveat-groups.ts';
import { NUMBERED_FINDINGS } from '../figures/board-figure.ts';
import { countText, placeText, rangeText } from '../format.ts';
import { type Markup, markup, nameMarkup, shortName } from '../markup.ts';
import { modelText } from '../model-text.ts';

const MOST_FINDINGS = 200;
const MOST_CAVEAT_ROWS = 300;
const MOST_PLACES = 12;

/** Places on the board a reviewer can go and look at. */
export function findingsSection({ findings }: EstimateResult): Markup {
  if (findings.length === 0) return markup``;
  const shown = findings.slice(0, MOST_FINDINGS);
  const left = findings.length - shown.length;
  return markup`<section><h2>Findings on the board</h2>
<table class="findings"><thead><tr><th class="n">No.</th><th>Net</th><th>Place, mm</th><th>Layer</th><th>Finding</th></tr></thead>
<tbody>${shown.map(
    ({ net, atM, layer, message }, i) =>
      markup`<tr><td class="n">${i + 1}</td><td>${nameMarkup(net, 30)}</td><td class="whole">${placeText(atM).replaceAll('-', '−')}</td><td>${nameMarkup(layer, 24)}</td><td>${nameMarkup(message, 400)}</td></tr>`,
  )}</tbody></table>
${left > 0 && markup`<p class="note">${left} more in the JSON result.</p>`}${
  findings.length > NUMBERED_FINDINGS &&
  markup`<p class="note">The first ${NUMBERED_FINDINGS} are numbered on the board.</p>`
}</section>`;
}

/** What the model includes and leaves out, and every caveat with its range. */
export function modelSection(result: EstimateResult): Markup {
  const { included, missing } = modelText(result);
  const groups = groupCaveats(result.caveats, byMessage);
  const shown = groups.slice(0, MOST_CAVEAT_ROWS);
  return markup`<section><h2>Model and caveats</h2>
<div class="columns"><div><h3>Included</h3><ul>${included.map((text) => markup`<li>${text}</li>`)}</ul></div><div><h3>Not included</h3><ul>${missing.map((text) => markup`<li>${text}</li>`)}</ul></div></div>
<h3>${result.caveats.length === 0 ? 'No caveats' : countText(result.caveats.length, 'caveat')}</h3>
${shown.length > 0 && markup`<table><thead><tr><th>Caveat</th><th>Applies to</th><th>Range</th><th>What it means</th></tr></thead><tbody>${shown.map(caveatRow)}</tbody></table>`}${
  groups.length > shown.length && markup`<p class="note">${groups.length - shown.length} more in the JSON result.</p>`
}</section>`;
}

function caveatRow(group: CaveatGroup): Markup {
  const places = group.where.slice(0, MOST_PLACES);
  const more = group.where.length - places.length;
  return markup`<tr><td class="code">${shortName(group.code, 60)}</td><td>${
    places.length === 0 ? 'whole result' : places.map((place, i) => markup`${i > 0 && ', '}${nameMarkup(place, 60)}`)
  }${more > 0 && ` and ${more} more`}</td><td class="whole">${rangeText(group.fromHz, group.toHz)}</td><td>${nameMarkup(group.message, 500)}</td></tr>`;
}
