import { safeTerminalText, terminalWidth } from '../../app/report/safe-text.ts';
import { padEnd, padStart } from '../../app/report/wrap.ts';

export interface Column<T> {
  readonly head: string;
  /** A text, or a list of which as many as fit are shown and the rest is counted. */
  readonly text: (row: T) => string | readonly string[];
  readonly align?: 'left' | 'right';
  /** Narrowest width it may be cut to; absent: never cut. */
  readonly minWidth?: number;
}

const GAP = '  ';
/** Longest text looked at: more never shows. */
const MAX_TEXT_WIDTH = 400;

/** A table of at most `width` columns; the widest of the columns that may be cut gives way first. */
export function table<T>(rows: readonly T[], columns: readonly Column<T>[], width: number): string[] {
  const cells = rows.map((row) => columns.map((column) => column.text(row)));
  const widths = columns.map(({ head }, i) =>
    cells.reduce(
      (widest, row) => Math.max(widest, terminalWidth(cellText(row[i]!, MAX_TEXT_WIDTH))),
      terminalWidth(head),
    ),
  );
  const room = width - GAP.length * (columns.length - 1);
  for (let excess = sum(widths) - room; excess > 0; excess--) {
    const widest = widestCuttable(columns, widths);
    if (widest === undefined) break;
    widths[widest]! -= 1;
  }
  const line = (row: readonly (string | readonly string[])[]): string =>
    row
      .map((cell, i) => (columns[i]!.align === 'right' ? padStart : padEnd)(cellText(cell, widths[i]!), widths[i]!))
      .join(GAP)
      .trimEnd();
  return [line(columns.map(({ head }) => head)), ...cells.map(line)];
}

/** A cell safe for a terminal and no wider than `width`. */
function cellText(cell: string | readonly string[], width: number): string {
  if (typeof cell === 'string') return safeTerminalText(cell, width);
  const shown = cell.slice(0, width).map((item) => safeTerminalText(item, MAX_TEXT_WIDTH));
  const all = shown.join(' ');
  if (shown.length === cell.length && terminalWidth(all) <= width) return all;
  for (let count = shown.length - 1; count > 0; count--) {
    const text = `${shown.slice(0, count).join(' ')} +${cell.length - count}`;
    if (terminalWidth(text) <= width) return text;
  }
  const more = cell.length > 1 ? ` +${cell.length - 1}` : '';
  return `${safeTerminalText(shown[0] ?? '', width - more.length)}${more}`;
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

function widestCuttable(columns: readonly Column<never>[], widths: readonly number[]): number | undefined {
  let widest: number | undefined;
  for (const [i, { minWidth }] of columns.entries()) {
    if (minWidth === undefined || widths[i]! <= minWidth) continue;
    if (widest === undefined || widths[i]! > widths[widest]!) widest = i;
  }
  return widest;
}
