import type { EstimateResult } from '../../estimate/result.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { inListOrder, isStructural, type Mechanism, mechanismText } from '../mechanisms.ts';
import type { RadiatingLine, Radiation } from '../radiation.ts';
import type { RulingBand } from '../ruling-bands.ts';
import { frequencyTicks, linearScale, type Scale } from './axis.ts';
import type { ReportLimitLine } from './limit-lines.ts';
import { px } from './path.ts';
import { FIGURE_WIDTH, frequencyNumbers, frequencyScale, PLOT_LEFT, PLOT_RIGHT } from './spectrum-frame.ts';

const TOP = 18;
const ROW_PX = 40;
const ROW_GAP = 13;
const NAME_LENGTH = 15;
/** Rows drawn; of more mechanisms the strongest. */
const MOST_ROWS = 8;
/** Lines closer together than this are drawn as the strongest of them. */
const COLUMN_PX = 1.5;
/** The band's mark under a row is at least this long. */
const SHORTEST_MARK_PX = 4;

/** What the strip leaves out, for its caption. */
export const undrawnMechanisms = (radiation: Radiation): number =>
  radiation.mechanisms.length - drawnMechanisms(radiation).length;

/** Range of the level axis against the limit, dB: the strongest mechanism at its top, lines that count down to its bottom. */
export function stripRangeDb({ lines, countedMarginDb }: Radiation): [lowDb: number, highDb: number] {
  const strongestDb = lines.reduce((best, { excessDb, ruler }) => Math.max(best, excessDb.get(ruler)!), -Infinity);
  return [-countedMarginDb, Math.max(0, Math.ceil(strongestDb / 10) * 10)];
}

/** One row a mechanism over log frequency: its level against the limit at every line, heavy where it is the strongest. */
export function mechanismStrip(
  radiation: Radiation,
  bands: readonly RulingBand[],
  result: EstimateResult,
  limitLines: readonly ReportLimitLine[],
): Markup {
  const frequency = frequencyScale(result, limitLines);
  const rows = drawnMechanisms(radiation);
  const [lowDb, highDb] = stripRangeDb(radiation);
  const bottom = TOP + rows.length * (ROW_PX + ROW_GAP) - ROW_GAP;
  const grid = frequencyTicks(frequency.from, frequency.to).map(
    ({ frequencyHz }) => `M${px(frequency.at(frequencyHz))} ${TOP}V${px(bottom)}`,
  );
  return markup`<svg class="figure" viewBox="0 0 ${FIGURE_WIDTH} ${px(bottom + 26)}" role="img" aria-label="Level of each mechanism against the limit over frequency">
<path class="grid" d="${grid.join('')}"/>
<text class="unit" x="${px(PLOT_LEFT - 40)}" y="${TOP - 7}">dB to the limit</text>
${rows.map((mechanism, i) => {
  const top = TOP + i * (ROW_PX + ROW_GAP);
  return row(mechanism, radiation, bands, frequency, linearScale(lowDb, highDb, top + ROW_PX, top));
})}
${frequencyNumbers(frequency, bottom + 19)}
</svg>`;
}

/** Those that come into the range or are the strongest somewhere, so many at most. */
function drawnMechanisms({ mechanisms, lines, countedMarginDb }: Radiation): Mechanism[] {
  const rulers = new Set(lines.map(({ ruler }) => ruler));
  const strongestDb = (mechanism: Mechanism) =>
    lines.reduce((best, { excessDb }) => Math.max(best, excessDb.get(mechanism) ?? -Infinity), -Infinity);
  const ranked = mechanisms.map((mechanism) => ({ mechanism, db: strongestDb(mechanism) }));
  return ranked
    .filter(({ mechanism, db }) => db > -countedMarginDb || rulers.has(mechanism))
    .sort((one, other) => other.db - one.db || inListOrder(one.mechanism, other.mechanism))
    .slice(0, MOST_ROWS)
    .map(({ mechanism }) => mechanism)
    .sort(inListOrder);
}

function row(
  mechanism: Mechanism,
  radiation: Radiation,
  bands: readonly RulingBand[],
  frequency: Scale,
  level: Scale,
): Markup {
  const bottom = level.at(level.from);
  const top = level.at(level.to);
  const zeroY = level.at(0);
  const bars = (isRuling: boolean) =>
    columns(mechanism, radiation.lines, frequency)
      .filter(({ line, db }) => (line.ruler === mechanism) === isRuling && db > level.from)
      .map(({ line, db }) => `M${px(frequency.at(line.frequencyHz))} ${px(bottom)}V${px(level.at(db))}`)
      .join('');
  const marks = bands
    .filter((band) => band.mechanism === mechanism)
    .map((band) => {
      const [from, to] = [frequency.at(band.fromHz), frequency.at(band.toHz)];
      const missing = Math.max(0, SHORTEST_MARK_PX - (to - from)) / 2;
      return `M${px(from - missing)} ${px(bottom + 4)}H${px(to + missing)}`;
    })
    .join('');
  return markup`<rect class="frame" x="${PLOT_LEFT}" y="${px(top)}" width="${PLOT_RIGHT - PLOT_LEFT}" height="${ROW_PX}"/>
${unsolvedMark(mechanism, radiation, frequency, top)}
<path class="stack other" d="${bars(false)}"/><path class="stack ruling" d="${bars(true)}"/>
<path class="limit-line" d="M${PLOT_LEFT} ${px(zeroY)}H${PLOT_RIGHT}"/>
${marks !== '' && markup`<path class="ruling-band" d="${marks}"/>`}
${[0, level.from].map((db) => markup`<text class="num end" x="${PLOT_LEFT - 5}" y="${px(level.at(db) + (db === 0 ? 3.5 : 1))}">${String(db).replace('-', '−')}</text>`)}
<text class="label" x="${PLOT_RIGHT + 6}" y="${px(top + ROW_PX / 2 + 3.5)}">${rowName(mechanism)}</text>
${mechanism.kind === 'stated-cable' && markup`<text class="unit" x="${PLOT_RIGHT + 6}" y="${px(top + ROW_PX / 2 + 15)}">stated current</text>`}`;
}

/** Short enough for the margin; a stated current is said below. */
const rowName = (mechanism: Mechanism): string =>
  mechanism.name === '' ? mechanismText(mechanism, shortName) : shortName(mechanism.name, NAME_LENGTH);

/** The strongest line of every narrow column. */
function columns(
  mechanism: Mechanism,
  lines: readonly RadiatingLine[],
  frequency: Scale,
): { line: RadiatingLine; db: number }[] {
  const best = new Map<number, { line: RadiatingLine; db: number }>();
  for (const line of lines) {
    const db = line.excessDb.get(mechanism);
    if (db === undefined) continue;
    const column = Math.floor(frequency.at(line.frequencyHz) / COLUMN_PX);
    const held = best.get(column);
    if (!held || db > held.db) best.set(column, { line, db });
  }
  return [...best.values()];
}

function unsolvedMark(
  mechanism: Mechanism,
  { unsolvedFromHz }: Radiation,
  frequency: Scale,
  top: number,
): Markup | false {
  if (unsolvedFromHz === undefined || !isStructural(mechanism)) return false;
  const from = Math.max(PLOT_LEFT, frequency.at(unsolvedFromHz));
  return markup`<rect class="band" fill="url(#hatch)" x="${px(from)}" y="${px(top)}" width="${px(PLOT_RIGHT - from)}" height="${ROW_PX}"/><text class="unit halo" x="${px(from + 4)}" y="${px(top + 12)}">not solved</text>`;
}
