import { signedDbText } from '../../compare/run-text.ts';
import type { BandChange, ComparedRun, Comparison, LineChange } from '../../compare/types.ts';
import {
  BREAK,
  type Column,
  code,
  type Fact,
  list,
  mark,
  name,
  note,
  paragraph,
  quiet,
  type Section,
  type Text,
  table,
} from '../blocks.ts';
import { changeFigure } from '../figures/change-figure.ts';
import { dateText, levelText, marginText, mhzText, trimmed } from '../format.ts';
import { shortName } from '../markup.ts';
import { printed } from '../number.ts';
import { DETECTOR_SHORT } from '../text-table.ts';
import { standingOfMargin } from '../verdict.ts';
import { changeGroups, contributorsText, effectText } from './change-groups.ts';
import { bandName, changedLines, countsText, crossingsText, lineStanding, stateText } from './comparison-words.ts';

/** Sections of a comparison, for the page of a screen and for print alike. */

export const COMPARISON_TITLE = 'Comparison of two runs';

export interface ComparisonLength {
  /** Changes listed; the rest is counted. */
  readonly changes: number;
  /** Rows of the table of lines. */
  readonly lines: number;
}
const FULL: ComparisonLength = { changes: 200, lines: 60 };

export const comparisonSections = (comparison: Comparison, length = FULL): Section[] => [
  changesSection(comparison, length.changes),
  lineByLineSection(comparison),
  bandsSection(comparison),
  linesSection(comparison, length.lines),
];

/** Title block: which runs, of what, against what. `ownDate` only when the caller has a date. */
export function comparisonFacts({ before, after }: Comparison, ownDate: string | undefined): Fact[] {
  const side = (term: string, run: ComparedRun): Fact[] => [
    {
      term,
      value: [
        `run ${run.run}`,
        run.revision !== '' && [', revision ', name(run.revision)],
        `, ${dateText(run.startedAt)}`,
      ],
    },
    { term: 'Limit', value: `${run.limit}, required margin ${trimmed(run.requiredMarginDb, 1)} dB` },
    { term: 'Program', value: `quietboard ${shortName(run.programVersion, 24)}` },
    { term: 'Layout', value: code(run.layoutSha256.slice(0, 16)) },
  ];
  return [
    { term: 'Board', value: name(after.board, 80), isWide: ownDate === undefined },
    ...(ownDate === undefined ? [] : [{ term: 'Date', value: ownDate }]),
    ...side('Before', before),
    ...side('Now', after),
  ];
}

/** What happened to the readings, in one paragraph under the headline. */
export const comparisonSummary = (comparison: Comparison): string =>
  `${countsText(comparison)}. ${crossingsText(comparison)}.`;

/** What keeps the runs from being compared; empty when nothing does. */
export const comparisonWarnings = ({ warnings }: Comparison): Text[] =>
  warnings.map(({ message }) => [mark('short', 'warning'), `${message}.`]);

function changesSection({ changes }: Comparison, most: number): Section {
  const title = 'What changed';
  if (changes.length === 0) return { title, blocks: [paragraph('Nothing in board, sources and set-up.')] };
  const shown = changes.slice(0, most);
  const left = changes.length - shown.length;
  const items = changeGroups(shown).map(
    ({ changes: own, effect }): Text => [
      joinedLines(own.map(({ text }) => text)),
      effect !== null && [BREAK, quiet(effectText(effect))],
    ],
  );
  const more = left > 0 ? ` ${left} more are in the JSON.` : '';
  return {
    title,
    blocks: [
      list(items),
      note(
        `Strongest first.${more} The level of a net, loop or cable is its own, at the line where its change counts most against the limit; fields add as phasors, so own levels need not add up to a line's change.`,
      ),
    ],
  };
}

const joinedLines = (texts: readonly string[]): Text => texts.map((text, i) => (i === 0 ? text : [BREAK, text]));

function lineByLineSection(comparison: Comparison): Section {
  const title = 'Line by line';
  const { lines, after } = comparison;
  if (lines.length === 0) return { title, blocks: [] };
  const required = trimmed(after.requiredMarginDb, 1);
  const captions: Text[] = [
    'dotted ring: before',
    [mark('over', 'over'), 'now over the limit'],
    ...(after.requiredMarginDb > 0
      ? [[mark('short', 'short'), `now short of the required ${required} dB (hatched band)`]]
      : []),
    [mark('fine', 'fine'), 'now fine'],
    'Of lines closer than a few printed dots the one nearest to the limit is drawn; margins above 50 dB are not.',
  ];
  return { title, isKept: true, blocks: [{ kind: 'figure', pictures: [changeFigure(comparison)], captions }] };
}

const number = (head: string, unit: string, width: number): Column => ({
  head: [head, BREAK, unit],
  width,
  isNumber: true,
});

const BAND_COLUMNS: readonly Column[] = [
  { head: 'Band', width: 22, isWhole: true },
  number('Before', 'dB', 20),
  number('Now', 'dB', 20),
  { ...number('Change', 'dB', 10), isStrong: true },
  number('Over the limit', 'readings', 14),
  number('In the band', 'readings', 14),
];

function bandsSection({ bands }: Comparison): Section {
  const row = (band: BandChange): Text[] => [
    bandName(band),
    stateText(band.before),
    stateText(band.after),
    changeText(band.marginChangeDb),
    `${band.before.over} → ${band.after.over}`,
    `${band.before.lines} → ${band.after.lines}`,
  ];
  return {
    title: 'Worst margin by band',
    isKept: true,
    blocks:
      bands.length === 0
        ? []
        : [
            table(BAND_COLUMNS, bands.map(row)),
            note(
              'Bands are the pieces of the limit lines. QP quasi-peak, AV average, PK peak. A positive change is better.',
            ),
          ],
  };
}

const changeText = (changeDb: number | null): string => (changeDb === null ? '' : signedDbText(changeDb));

const LINE_COLUMNS: readonly Column[] = [
  { head: '', width: 2.4 },
  number('Frequency', 'MHz', 9.4),
  { head: 'Det.', width: 4.4 },
  number('Before', 'dBµV/m', 7.6),
  number('Now', 'dBµV/m', 7.6),
  { ...number('Change', 'dB', 7.4), isStrong: true },
  number('Margin', 'before, dB', 9),
  { ...number('Margin', 'now, dB', 8), isStrong: true },
  { head: '', width: 10 },
  { head: 'Whose own level changed most, dB', width: 34 },
];

function linesSection(comparison: Comparison, most: number): Section {
  const title = 'Changed lines';
  const changed = changedLines(comparison);
  if (changed.length === 0) return { title, blocks: [] };
  const left = changed.length - most;
  const rows = changed.slice(0, most).map((line) => lineRow(line, comparison.after.requiredMarginDb));
  const more = left > 0 ? ` The ${left} that follow have larger margins; they are in JSON and CSV.` : '';
  return {
    title,
    blocks: [table(LINE_COLUMNS, rows, 'points'), note(`Worst margin of either run first.${more}`)],
  };
}

/** Contributors named for a line. */
const NAMED = 2;

function lineRow(line: LineChange, requiredMarginDb: number): Text[] {
  const { before, after, contributors } = line;
  const standing = after && standingOfMargin(after.marginDb, requiredMarginDb);
  const level = (reading: LineChange['before']) => (reading ? printed(levelText(reading.levelDbuvPerM)) : '');
  const margin = (reading: LineChange['before']) => (reading ? printed(marginText(reading.marginDb)) : '');
  return [
    standing !== null && mark(standing, standing),
    mhzText(line.frequencyHz),
    DETECTOR_SHORT[line.detector],
    level(before),
    level(after),
    changeText(line.levelChangeDb),
    margin(before),
    margin(after),
    lineStanding(line).toLowerCase(),
    name(contributorsText(contributors.slice(0, NAMED)), 160),
  ];
}
