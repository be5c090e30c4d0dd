import { dbText } from '../../compare/run-text.ts';
import type { Trend, TrendGroup } from '../../compare/types.ts';
import { bandName } from '../comparison/comparison-words.ts';
import { countText, frequencyText, trimmed } from '../format.ts';
import { type PlainColumn, plainTable } from '../plain-table.ts';
import { safeTerminalText, visibleText } from '../safe-text.ts';
import { wrapText } from '../wrap.ts';
import { revisionName, setupText, standingOfPoint } from './trend-words.ts';

/** Revisions shown of one set-up: the last ones; the rest is counted. */
const POINTS_SHOWN = 30;
const NAME_WIDTH = 20;

const STANDING_WORD = { over: 'OVER', short: 'short', fine: '' } as const;

/** A trend for a terminal: at most 80 columns, no control characters, rounded to 0.1 dB. Ends with a line feed. */
export function trendText(trend: Trend, options: { readonly width: number }): string {
  const width = Math.min(80, Math.max(40, options.width));
  if (trend.groups.length === 0) return 'No runs.\n';
  return `${trend.groups.map((group) => groupLines(group, width).join('\n')).join('\n\n')}\n`;
}

const COLUMNS: readonly PlainColumn[] = [
  { head: 'revision', align: 'left' },
  { head: 'run', align: 'right' },
  { head: 'of', align: 'right' },
  { head: 'margin', align: 'right' },
  { head: '', align: 'left' },
  { head: 'at', align: 'right' },
  { head: '', align: 'left' },
];

function groupLines(group: TrendGroup, width: number): string[] {
  const { points, requiredMarginDb } = group;
  const shown = points.slice(-POINTS_SHOWN);
  const hidden = points.length - shown.length;
  const rows = shown.map((point) => [
    safeTerminalText(revisionName(point), NAME_WIDTH),
    String(point.run),
    String(point.runCount),
    point.worst ? dbText(point.worst.marginDb) : '',
    STANDING_WORD[standingOfPoint(point)],
    point.worst ? frequencyText(point.worst.frequencyHz) : 'no line',
    [point.text, ...(point.isOtherProgram ? ['other program version'] : [])].filter((text) => text !== '').join('; '),
  ]);
  return [
    safeTerminalText(group.board, width),
    ...wrapText(visibleText(setupText(group)), width),
    ...wrapText(
      `Required margin ${trimmed(requiredMarginDb, 1)} dB; ${countText(points.length, 'revision')}${group.headline === '' ? '' : `: ${group.headline}`}.`,
      width,
    ),
    '',
    ...(hidden > 0 ? [`${countText(hidden, 'earlier revision')} not shown`] : []),
    ...plainTable(COLUMNS, rows, width),
    ...bandLines(group, shown.length, width),
  ];
}

/** Margins of each band, one column a revision: as many of the last ones as there is room for. */
function bandLines({ bands, points }: TrendGroup, most: number, width: number): string[] {
  const names = bands.map(bandName);
  if (names.length === 0) return [];
  const nameWidth = Math.max(4, ...names.map((name) => name.length));
  const columnWidth = Math.max(6, ...points.slice(-most).map((point) => Math.min(8, revisionName(point).length))) + 1;
  const count = Math.min(most, Math.max(1, Math.floor((width - nameWidth - 22) / columnWidth)));
  const cells = (texts: readonly string[]) => texts.map((text) => text.padStart(columnWidth)).join('');
  const header = cells(points.slice(-count).map((point) => safeTerminalText(revisionName(point), columnWidth - 1)));
  return [
    '',
    `${'band'.padEnd(nameWidth)}${header}`,
    ...bands.map(({ steps }, i) => {
      const margins = steps.slice(-count).map(({ worst }) => (worst ? dbText(worst.marginDb) : '—'));
      return safeTerminalText(
        `${names[i]!.padEnd(nameWidth)}${cells(margins)}  ${steps.at(-1)?.text ?? ''}`,
        width,
      ).trimEnd();
    }),
  ];
}
