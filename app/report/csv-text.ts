export type Cell = string | number;

/** A cell that begins so is a formula to a spreadsheet, whoever wrote it. */
const FORMULA_START = /^[=+\-@\t\r\n＝＋－＠]/;

/**
 * Rows for a spreadsheet (RFC 4180: comma, CRLF, quotes doubled; point as the decimal sign). Numbers are unrounded; what
 * is not finite is an empty cell. Text that a spreadsheet would take for a formula gets a leading apostrophe.
 */
export const csvText = (rows: readonly (readonly Cell[])[]): string =>
  rows.map((row) => `${row.map(cellText).join(',')}\r\n`).join('');

function cellText(cell: Cell): string {
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : '';
  const guarded = FORMULA_START.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded;
}
