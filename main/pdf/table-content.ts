import type { Content, ContentTable, CustomTableLayout, TableCell } from 'pdfmake/interfaces.js';
import type { Column, TableKind, Text } from '../../app/report/blocks.ts';
import { HAIR, HAIRLINE_PT, INK, type PageRoom, RULE_PT, TABLE_PT } from './page.ts';
import { hasPicture, plainRuns, textContent } from './text-content.ts';

const ROW_PAD_PT = 1.5;
/** Room between columns, and the size of the text; a table of many narrow columns is denser. */
const LOOSE = { gapPt: 10, textPt: TABLE_PT };
const DENSE = { gapPt: 6, textPt: TABLE_PT - 0.3 };
const NARROW_SHARE = 0.6;
const MARK_PT = 7;

/** What stands over a table and stays with it, on every page it runs over; with its bookmark. */
export interface TableTitle {
  readonly contents: readonly Content[];
  /** Bookmark on the first row, where the title is: a header repeats, a bookmark must not. */
  readonly bookmark?: string;
}

/** A table whose head repeats on every page, whose rows stay whole and whose columns keep their share of the width. */
export function tableContent(
  columns: readonly Column[],
  rows: readonly (readonly Text[])[],
  kind: TableKind,
  room: PageRoom,
  title: TableTitle = { contents: [] },
): ContentTable {
  const { gapPt, textPt } = kind === 'points' ? DENSE : LOOSE;
  const widthPt = room.widthPt * (kind === 'narrow' ? NARROW_SHARE : 1) - gapPt * (columns.length - 1);
  const sum = columns.reduce((total, { width }) => total + width, 0);
  const titleRow = title.contents.length > 0 ? [spanned({ stack: [...title.contents] }, columns.length)] : [];
  const body = rows.map((row) => row.map((text, i) => cell(text, columns[i]!)));
  if (title.bookmark !== undefined && body[0]) addBookmark(body[0], title.bookmark);
  const headerRows = titleRow.length + 1;
  return {
    table: {
      widths: columns.map(({ width }) => (width / sum) * widthPt),
      headerRows,
      keepWithHeaderRows: 1,
      dontBreakRows: true,
      body: [...titleRow, columns.map(headCell), ...body],
    },
    layout: layoutWith(headerRows, columns.length, gapPt),
    fontSize: textPt,
    margin: [0, 2, 0, 3],
  };
}

/** Hairlines between rows, a stronger one under the head, none at the sides. */
const layoutWith = (headerRows: number, columnCount: number, gapPt: number): CustomTableLayout => ({
  hLineWidth: (line) => (line < headerRows ? 0 : line === headerRows ? RULE_PT : HAIRLINE_PT),
  vLineWidth: () => 0,
  hLineColor: (line) => (line === headerRows ? INK : HAIR),
  paddingLeft: (column) => (column === 0 ? 0 : gapPt / 2),
  paddingRight: (column) => (column === columnCount - 1 ? 0 : gapPt / 2),
  paddingTop: (row) => (row < headerRows - 1 ? 0 : ROW_PAD_PT),
  paddingBottom: (row) => (row < headerRows - 1 ? 0 : ROW_PAD_PT),
});

export const spanned = (content: Content, count: number): TableCell[] => [
  { ...(content as object), colSpan: count } as TableCell,
  ...Array.from({ length: count - 1 }, () => ({})),
];

const headCell = ({ head, isNumber }: Column): TableCell =>
  ({
    text: plainRuns(head),
    bold: true,
    alignment: isNumber ? 'right' : 'left',
    verticalAlignment: 'bottom',
  }) as TableCell;

function cell(text: Text, { isNumber, isWhole, isStrong }: Column): TableCell {
  if (hasPicture(text)) return textContent(text, { fontSize: TABLE_PT }, MARK_PT) as TableCell;
  const runs = plainRuns(text).map((run) =>
    isNumber || isWhole ? { ...run, text: run.text.replaceAll(' ', '\u00a0') } : run,
  );
  return { text: runs, alignment: isNumber ? 'right' : 'left', ...(isStrong && { bold: true }) } as TableCell;
}

/** A bookmark needs a line of text to lead to. */
function addBookmark(row: TableCell[], text: string): void {
  const at = row.findIndex((one) => {
    const runs = (one as { readonly text?: unknown }).text;
    return Array.isArray(runs) && runs.length > 0;
  });
  if (at >= 0) row[at] = { ...(row[at] as object), outline: true, outlineText: text } as TableCell;
}
