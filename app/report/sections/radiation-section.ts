import type { EstimateResult } from '../../estimate/result.ts';
import { type Column, joined, name, note, paragraph, type Section, strong, type Text, table } from '../blocks.ts';
import type { ReportLimitLine } from '../figures/limit-lines.ts';
import { mechanismStrip, stripRangeDb, undrawnMechanisms } from '../figures/mechanism-strip.ts';
import { bandText, countText, frequencyText, levelText, marginText } from '../format.ts';
import { shortName } from '../markup.ts';
import { type Mechanism, mechanismText } from '../mechanisms.ts';
import { printed } from '../number.ts';
import { type RadiatingLine, type Radiation, radiationOf } from '../radiation.ts';
import { type RulingBand, rulingBands } from '../ruling-bands.ts';

/** Bands named in the sentence; the table has them all. */
const NAMED_BANDS = 6;
const NAME_LENGTH = 30;

/** Which mechanism rules in which band: a sentence, a strip with one row a mechanism, a table of the bands. */
export function radiationSection(result: EstimateResult, limitLines: readonly ReportLimitLine[]): Section {
  const title = 'What radiates';
  const radiation = radiationOf(result);
  if (radiation.lines.length === 0) return { title, blocks: [] };
  const bands = rulingBands(radiation);
  const undrawn = undrawnMechanisms(radiation);
  const [lowDb, highDb] = stripRangeDb(radiation);
  return {
    title,
    isKept: true,
    blocks: [
      paragraph('What rules: ', strong(rulingSentence(bands)), '.', unsolvedSentence(radiation)),
      {
        kind: 'figure',
        pictures: [mechanismStrip(radiation, bands, result, limitLines)],
        captions: [
          `Bars: each mechanism at each line, from ${printed(String(lowDb))} to ${highDb > 0 ? `+${highDb}` : '0'} dB against the limit; heavy where it is the strongest.`,
          'Line under a row: the band in which it rules.',
          ...(undrawn > 0 ? [`${countText(undrawn, 'weaker mechanism')} not drawn.`] : []),
        ],
      },
      table(BAND_COLUMNS, bands.map(bandRow), 'bands'),
      note(
        `What all contributors radiate through one mechanism is added as powers, as if their phases were unrelated, at the antenna position of each line's maximum. The mechanisms of one contributor add as phasors and may cancel: a row can lie above the line's own level.${uncountedSentence(radiation)} Bands are cut in sixths of an octave, where the strongest lines decide; a change that wins less than 6 dB in sum makes no band of its own.`,
      ),
    ],
  };
}

/** "30–210 MHz valve cable; 210–640 MHz plane". */
export function rulingSentence(bands: readonly RulingBand[]): Text {
  const left = bands.length - NAMED_BANDS;
  const named = bands
    .slice(0, NAMED_BANDS)
    .map(({ fromHz, toHz, mechanism }) => [`${bandText(fromHz, toHz)} `, nameOf(mechanism)]);
  return [joined(named, '; '), left > 0 && `; ${countText(left, 'more band')} above`];
}

const nameOf = (mechanism: Mechanism): Text => name(mechanismText(mechanism, (cable) => shortName(cable, NAME_LENGTH)));

function unsolvedSentence({ unsolvedFromHz }: Radiation): Text {
  if (unsolvedFromHz === undefined) return false;
  const missing = 'the currents that the board drives over its planes and into its cables are missing';
  return unsolvedFromHz === 0
    ? ` Planes and cables were not solved: ${missing}. Above some 100 MHz, and with any cable, they usually rule.`
    : ` Planes and cables were solved below ${frequencyText(unsolvedFromHz)} only: from there up ${missing}.`;
}

function uncountedSentence({ uncountedLines, countedMarginDb }: Radiation): string {
  if (uncountedLines === 0) return '';
  return ` ${countText(uncountedLines, 'line')} with more than ${countedMarginDb} dB of margin ${uncountedLines === 1 ? 'does' : 'do'} not count.`;
}

const BAND_COLUMNS: readonly Column[] = [
  { head: 'Band', width: 14, isWhole: true },
  { head: 'What rules', width: 20, isStrong: true },
  { head: 'Strongest in', width: 14, isWhole: true },
  { head: 'Worst line', width: 12, isWhole: true },
  { head: 'Margin, dB', width: 10, isNumber: true },
  { head: 'Next to it at that line', width: 30 },
];

function bandRow({ fromHz, toHz, mechanism, lines, ruledCount }: RulingBand): Text[] {
  const worst = lines.reduce((one, other) => (other.marginDb < one.marginDb ? other : one));
  return [
    bandText(fromHz, toHz),
    nameOf(mechanism),
    `${ruledCount} of ${countText(lines.length, 'line')}`,
    frequencyText(worst.frequencyHz),
    printed(marginText(worst.marginDb)),
    nextText(worst, mechanism),
  ];
}

/** The strongest other mechanism at a line, by how much it is weaker or stronger. */
function nextText({ excessDb }: RadiatingLine, mechanism: Mechanism): Text {
  const ownDb = excessDb.get(mechanism) ?? -Infinity;
  const others = [...excessDb].filter(([other]) => other !== mechanism);
  if (others.length === 0) return '—';
  const [next, nextDb] = others.reduce((one, other) => (other[1] > one[1] ? other : one));
  if (!Number.isFinite(ownDb)) return nameOf(next);
  const leadDb = ownDb - nextDb;
  return [nameOf(next), `, ${levelText(Math.abs(leadDb))} dB ${leadDb < 0 ? 'stronger' : 'weaker'}`];
}
