import type { Content, TableCell } from 'pdfmake/interfaces.js';
import type { ShareGroup, ShareRow } from '../../app/report/blocks.ts';
import { barShare } from '../../app/report/figures/bars.ts';
import { levelText } from '../../app/report/format.ts';
import { printed } from '../../app/report/number.ts';
import { LIGHT } from '../../app/report/palette.ts';
import { INK, NOTE_PT, type PageRoom, QUIET, RULE_PT, TABLE_PT } from './page.ts';
import { spanned } from './table-content.ts';
import { plainRuns } from './text-content.ts';

const COLUMN_GAP_PT = 22;
const LEVEL_PT = 30;
const BAR_SHARE = 0.36;
const PATH_INDENT_PT = 9;

/** What readings are made of, as bars, two readings side by side; one row of them for each item. */
export function shareRows(groups: readonly ShareGroup[], room: PageRoom): Content[] {
  const widthPt = (room.widthPt - COLUMN_GAP_PT) / 2;
  const rows: Content[] = [];
  for (let i = 0; i < groups.length; i += 2) {
    const pair = groups.slice(i, i + 2).map((group) => ({ stack: [groupContent(group, widthPt)], width: widthPt }));
    rows.push({ columns: pair, columnGap: COLUMN_GAP_PT, margin: [0, 3, 0, 7] });
  }
  return rows;
}

function groupContent(group: ShareGroup, widthPt: number): Content {
  const barPt = widthPt * BAR_SHARE;
  const namePt = widthPt - barPt - LEVEL_PT - 12;
  const { title, remark, levelDbuvPerM, topDbuvPerM, rows, left } = group;
  const head: TableCell[] = [
    {
      text: [
        { text: title, bold: true },
        { text: `  ${remark}`, color: QUIET },
      ],
    },
    { text: printed(levelText(levelDbuvPerM)), bold: true, alignment: 'right' },
    { text: 'dBµV/m', color: QUIET },
  ];
  const more =
    left > 0 ? [spanned({ text: `${left} weaker in the JSON result`, color: QUIET, fontSize: NOTE_PT }, 3)] : [];
  return {
    table: {
      widths: [namePt, LEVEL_PT, barPt],
      body: [head, ...rows.map((row) => rowCells(row, topDbuvPerM, barPt)), ...more],
    },
    layout: {
      hLineWidth: (line) => (line === 1 ? RULE_PT : 0),
      hLineColor: () => INK,
      vLineWidth: () => 0,
      paddingLeft: (column) => (column === 0 ? 0 : 3),
      paddingRight: (column) => (column === 2 ? 0 : 3),
      paddingTop: () => 0.8,
      paddingBottom: () => 0.8,
    },
    fontSize: TABLE_PT,
  };
}

function rowCells({ text, levelDbuvPerM, isPath }: ShareRow, topDb: number, barPt: number): TableCell[] {
  const style = isPath ? { color: QUIET, fontSize: NOTE_PT } : {};
  const heightPt = isPath ? 3.6 : 5.6;
  const rect = (w: number, color: string) => ({
    type: 'rect' as const,
    x: 0,
    y: 0,
    w,
    h: heightPt,
    color,
    lineWidth: 0,
  });
  return [
    { text: plainRuns(text), ...style, margin: [isPath ? PATH_INDENT_PT : 0, 0, 0, 0] } as TableCell,
    { text: printed(levelText(levelDbuvPerM)), alignment: 'right', ...style },
    {
      canvas: [
        rect(barPt, LIGHT.get('bar-back')!),
        rect(barPt * barShare(levelDbuvPerM, topDb), LIGHT.get(isPath ? 'bar-path' : 'bar')!),
      ],
      margin: [0, isPath ? 3.4 : 2.6, 0, 0],
    },
  ];
}
