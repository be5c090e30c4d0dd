import { safeTerminalText, terminalWidth } from '../../app/report/safe-text.ts';
import { padEnd, padStart, wrapText } from '../../app/report/wrap.ts';

export interface Column<T> {
  readonly head: string;
  /** A text, or a list of which as many as fit are shown and the rest is counted. */
  readonly text: (row: T) => string | readonly string[];
  readonly align?: 'left' | 'right';
  /** Narrowest width it may be brought to; absent: its own. */
  readonly minWidth?: number;
  /** A text that is too wide goes on below instead of being cut. */
  readonly isWrapped?: boolean;
}

type Cell = string | readonly string[];

const GAP = '  ';
/** Longest text looked at: more never shows. */
const MAX_TEXT_WIDTH = 400;

/** A table of at most `width` columns; the widest of the columns that may be narrowed gives way first. */
export function table<T>(rows: readonly T[], columns: readonly Column<T>[], width: number): string[] {
  const cells = rows.map((row) => columns.map((column) => column.text(row)));
  const widths = columns.map(({ head }, i) =>
    cells.reduce(
      (widest, row) => Math.max(widest, terminalWidth(oneLine(row[i]!, MAX_TEXT_WIDTH))),
      terminalWidth(head),
    ),
  );
  const room = width - GAP.length * (columns.length - 1);
  for (let excess = sum(widths) - room; excess > 0; excess--) {
    const widest = widestNarrowable(columns, widths);
    if (widest === undefined) break;
    widths[widest]! -= 1;
  }
  const linesOf = (row: readonly Cell[]): string[] => {
    const texts = row.map((cell, i) => cellLines(cell, widths[i]!, columns[i]!.isWrapped === true));
    const height = Math.max(...texts.map((lines) => lines.length));
    return Array.from({ length: height }, (_, n) =>
      texts
        .map((lines, i) => (columns[i]!.align === 'right' ? padStart : padEnd)(lines[n] ?? '', widths[i]!))
        .join(GAP)
        .trimEnd(),
    );
  };
  return [columns.map(({ head }) => head), ...cells].flatMap(linesOf);
}

function cellLines(cell: Cell, width: number, isWrapped: boolean): string[] {
  if (!isWrapped) return [oneLine(cell, width)];
  return wrapText(oneLine(cell, MAX_TEXT_WIDTH), width);
}

/** A cell safe for a terminal and no wider than `width`. */
function oneLine(cell: Cell, width: number): string {
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

function widestNarrowable(columns: readonly Column<never>[], widths: readonly number[]): number | undefined {
  let widest: number | undefined;
  for (const [i, { minWidth }] of columns.entries()) {
    if (minWidth === undefined || widths[i]! <= minWidth) continue;
    if (widest === undefined || widths[i]! > widths[widest]!) widest = i;
  }
  return widest;
}
