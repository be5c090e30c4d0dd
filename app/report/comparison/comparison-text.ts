import { dbText, signedDbText } from '../../compare/run-text.ts';
import type { Comparison, LineChange } from '../../compare/types.ts';
import { CAUTIONS_SHORT } from '../cautions.ts';
import { levelText, mhzText } from '../format.ts';
import { type PlainColumn, plainTable } from '../plain-table.ts';
import { safeTerminalText, visibleText } from '../safe-text.ts';
import { DETECTOR_SHORT } from '../text-table.ts';
import { wrapText } from '../wrap.ts';
import { changeGroups, contributorsText, effectText } from './change-groups.ts';
import { bandName, changedLines, countsText, crossingsText, lineStanding, stateText } from './comparison-words.ts';

export interface ComparisonTextOptions {
  /** Rows of the table of lines. */
  readonly top: number;
  /** Columns of the terminal; more than 80 are not used, less than 40 are not respected. */
  readonly width: number;
}

/** Groups of changes told; the rest is counted. */
const GROUPS_SHOWN = 16;

/** A comparison for a terminal: at most 80 columns, no control characters, rounded to 0.1 dB. Ends with a line feed. */
export function comparisonText(comparison: Comparison, options: ComparisonTextOptions): string {
  const width = Math.min(80, Math.max(40, options.width));
  const sections = [
    headline(comparison, width),
    changes(comparison, width),
    bands(comparison, width),
    lines(comparison, options.top, width),
    wrapText(CAUTIONS_SHORT, width),
  ];
  return `${sections
    .filter((section) => section.length > 0)
    .map((section) => section.join('\n'))
    .join('\n\n')}\n`;
}

function headline(comparison: Comparison, width: number): string[] {
  const { before, after } = comparison;
  const limit = before.limit === after.limit ? after.limit : `${after.limit} (was ${before.limit})`;
  const board = safeTerminalText(after.board, width);
  return [
    board,
    ...wrapText(comparison.headline, width),
    ...wrapText(visibleText(`${limit}; run ${after.run} against run ${before.run}`), width),
    ...comparison.warnings.flatMap(({ message }) => wrapText(`Warning: ${visibleText(message)}.`, width, '', '  ')),
  ];
}

function changes({ changes: all }: Comparison, width: number): string[] {
  if (all.length === 0) return wrapText('What changed: nothing in board, sources and set-up.', width);
  const groups = changeGroups(all);
  const shown = groups.slice(0, GROUPS_SHOWN);
  const left = groups.slice(GROUPS_SHOWN).reduce((sum, group) => sum + group.changes.length, 0);
  return [
    'What changed, strongest first',
    ...shown.flatMap(({ changes: own, effect }) => {
      const said = own.flatMap(({ text }) => wrapText(text, width, '  - ', '    '));
      return effect ? [...said, ...wrapText(effectText(effect), width, '      ')] : said;
    }),
    ...(left > 0 ? [`  and ${left} more`] : []),
  ];
}

const BAND_COLUMNS: readonly PlainColumn[] = [
  { head: 'band', align: 'left' },
  { head: 'worst before', align: 'left' },
  { head: 'worst now', align: 'left' },
  { head: 'change', align: 'right' },
  { head: 'over', align: 'left' },
];

function bands({ bands: all }: Comparison, width: number): string[] {
  if (all.length === 0) return [];
  const rows = all.map((band) => [
    bandName(band),
    stateText(band.before),
    stateText(band.after),
    band.marginChangeDb === null ? '' : signedDbText(band.marginChangeDb),
    band.before.over + band.after.over === 0 ? '' : `${band.before.over} → ${band.after.over}`,
  ]);
  return ['Worst margins by band, dB', ...plainTable(BAND_COLUMNS, rows, width)];
}

const LINE_COLUMNS: readonly PlainColumn[] = [
  { head: 'MHz', align: 'right' },
  { head: 'det', align: 'left' },
  { head: 'before', align: 'right' },
  { head: 'now', align: 'right' },
  { head: 'change', align: 'right' },
  { head: 'margin', align: 'right' },
  { head: '', align: 'left' },
  { head: 'mainly', align: 'left' },
];

function lines(comparison: Comparison, top: number, width: number): string[] {
  const head = [...wrapText(`${countsText(comparison)}.`, width), ...wrapText(`${crossingsText(comparison)}.`, width)];
  const changed = changedLines(comparison);
  const shown = changed.slice(0, Math.max(0, top));
  const left = changed.length - shown.length;
  if (shown.length === 0) return head;
  return [
    ...head,
    ...wrapText(
      'Levels in dBµV/m, change and margin now in dB; mainly: whose own level changed most, by how many dB.',
      width,
    ),
    '',
    ...plainTable(LINE_COLUMNS, shown.map(lineRow), width),
    ...(left > 0 ? [`${left} more, with larger margins`] : []),
  ];
}

const signed = (text: string): string => text.replace('-', '−');

function lineRow(line: LineChange): string[] {
  const { frequencyHz, detector, before, after, levelChangeDb, contributors } = line;
  return [
    mhzText(frequencyHz),
    DETECTOR_SHORT[detector],
    before ? signed(levelText(before.levelDbuvPerM)) : '',
    after ? signed(levelText(after.levelDbuvPerM)) : '',
    levelChangeDb === null ? '' : signedDbText(levelChangeDb),
    after ? dbText(after.marginDb) : '',
    lineStanding(line),
    contributorsText(contributors.slice(0, 1)),
  ];
}
