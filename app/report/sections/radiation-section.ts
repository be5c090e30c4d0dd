import type { EstimateResult } from '../../estimate/result.ts';
import type { ReportLimitLine } from '../figures/limit-lines.ts';
import { mechanismStrip, stripRangeDb, undrawnMechanisms } from '../figures/mechanism-strip.ts';
import { bandText, countText, frequencyText, levelText, marginText } from '../format.ts';
import { type Markup, markup, nameMarkup, shortName } from '../markup.ts';
import { type Mechanism, mechanismText } from '../mechanisms.ts';
import { type RadiatingLine, type Radiation, radiationOf } from '../radiation.ts';
import { type RulingBand, rulingBands } from '../ruling-bands.ts';
import { printed } from './number.ts';

/** Bands named in the sentence; the table has them all. */
const NAMED_BANDS = 6;
const NAME_LENGTH = 30;

/** Which mechanism rules in which band: a sentence, a strip with one row a mechanism, a table of the bands. */
export function radiationSection(result: EstimateResult, limitLines: readonly ReportLimitLine[]): Markup {
  const radiation = radiationOf(result);
  if (radiation.lines.length === 0) return markup``;
  const bands = rulingBands(radiation);
  const undrawn = undrawnMechanisms(radiation);
  const [lowDb, highDb] = stripRangeDb(radiation);
  return markup`<section class="keep"><h2>What radiates</h2>
<p>What rules: <strong>${sentence(bands)}</strong>.${unsolvedSentence(radiation)}</p>
<figure>${mechanismStrip(radiation, bands, result, limitLines)}
<figcaption><span>Bars: each mechanism at each line, from ${printed(String(lowDb))} to ${highDb > 0 ? `+${highDb}` : '0'} dB against the limit; heavy where it is the strongest.</span><span>Line under a row: the band in which it rules.</span>${
    undrawn > 0 && markup`<span>${countText(undrawn, 'weaker mechanism')} not drawn.</span>`
  }</figcaption></figure>
${bandTable(bands)}
<p class="note">What all contributors radiate through one mechanism is added as powers, as if their phases were unrelated, at the antenna position of each line's maximum. The mechanisms of one contributor add as phasors and may cancel: a row can lie above the line's own level.${uncountedSentence(radiation)} Bands are cut in sixths of an octave, where the strongest lines decide; a change that wins less than 6 dB in sum makes no band of its own.</p></section>`;
}

function sentence(bands: readonly RulingBand[]): Markup {
  const left = bands.length - NAMED_BANDS;
  return markup`${bands
    .slice(0, NAMED_BANDS)
    .map(({ fromHz, toHz, mechanism }, i) => markup`${i > 0 && '; '}${bandText(fromHz, toHz)} ${nameOf(mechanism)}`)}${
    left > 0 && `; ${countText(left, 'more band')} above`
  }`;
}

const nameOf = (mechanism: Mechanism): Markup =>
  nameMarkup(mechanismText(mechanism, (name) => shortName(name, NAME_LENGTH)));

function unsolvedSentence({ unsolvedFromHz }: Radiation): Markup | false {
  if (unsolvedFromHz === undefined) return false;
  const missing = 'the currents that the board drives over its planes and into its cables are missing';
  return unsolvedFromHz === 0
    ? markup` Planes and cables were not solved: ${missing}. Above some 100 MHz, and with any cable, they usually rule.`
    : markup` Planes and cables were solved below ${frequencyText(unsolvedFromHz)} only: from there up ${missing}.`;
}

function uncountedSentence({ uncountedLines, countedMarginDb }: Radiation): string {
  if (uncountedLines === 0) return '';
  return ` ${countText(uncountedLines, 'line')} with more than ${countedMarginDb} dB of margin ${uncountedLines === 1 ? 'does' : 'do'} not count.`;
}

function bandTable(bands: readonly RulingBand[]): Markup {
  return markup`<table class="bands"><thead><tr><th>Band</th><th>What rules</th><th>Strongest in</th><th>Worst line</th><th class="n">Margin, dB</th><th>Next to it at that line</th></tr></thead><tbody>${bands.map(bandRow)}</tbody></table>`;
}

function bandRow({ fromHz, toHz, mechanism, lines, ruledCount }: RulingBand): Markup {
  const worst = lines.reduce((one, other) => (other.marginDb < one.marginDb ? other : one));
  return markup`<tr><td class="whole">${bandText(fromHz, toHz)}</td><td class="strong">${nameOf(mechanism)}</td><td class="whole">${ruledCount} of ${countText(lines.length, 'line')}</td><td class="whole">${frequencyText(worst.frequencyHz)}</td><td class="n">${printed(marginText(worst.marginDb))}</td><td>${nextText(worst, mechanism)}</td></tr>`;
}

/** The strongest other mechanism at a line, by how much it is weaker or stronger. */
function nextText({ excessDb }: RadiatingLine, mechanism: Mechanism): Markup | string {
  const ownDb = excessDb.get(mechanism) ?? -Infinity;
  const others = [...excessDb].filter(([other]) => other !== mechanism);
  if (others.length === 0) return '—';
  const [next, nextDb] = others.reduce((one, other) => (other[1] > one[1] ? other : one));
  if (!Number.isFinite(ownDb)) return nameOf(next);
  const lead = ownDb - nextDb;
  return markup`${nameOf(next)}, ${levelText(Math.abs(lead))} dB ${lead < 0 ? 'stronger' : 'weaker'}`;
}
