import { safeTerminalText, terminalWidth } from './safe-text.ts';
import { padEnd, padStart } from './wrap.ts';

export interface PlainColumn {
  readonly head: string;
  readonly align: 'left' | 'right';
}

/**
 * A table for a terminal: columns as wide as their texts, one space between; the last column takes what is left and is
 * cut to it.
 */
export function plainTable(
  columns: readonly PlainColumn[],
  rows: readonly (readonly string[])[],
  width: number,
): string[] {
  const last = columns.length - 1;
  const all = [columns.map(({ head }) => head), ...rows];
  const widths = columns.map((_, i) => all.reduce((most, row) => Math.max(most, terminalWidth(row[i]!)), 0));
  return all.map((row) => {
    const line = columns
      .slice(0, last)
      .map(({ align }, i) => (align === 'right' ? padStart : padEnd)(row[i]!, widths[i]!))
      .join(' ');
    const start = safeTerminalText(`${line}${last > 0 ? '  ' : ''}`, width);
    return `${start}${safeTerminalText(row[last]!, width - terminalWidth(start))}`.trimEnd();
  });
}
