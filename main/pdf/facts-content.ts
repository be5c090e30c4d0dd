import type { Content, TableCell } from 'pdfmake/interfaces.js';
import type { Fact } from '../../app/report/blocks.ts';
import { HAIR, HAIRLINE_PT, type PageRoom, QUIET, TABLE_PT } from './page.ts';
import { spanned } from './table-content.ts';
import { plainRuns } from './text-content.ts';

const TERM_PT = 78;
const GAP_PT = 8;

/** Terms with their values, two in a row, wide ones alone. */
export function factsContent(facts: readonly Fact[], room: PageRoom): Content {
  const valuePt = (room.widthPt - 2 * TERM_PT - 3 * GAP_PT) / 2;
  const rows: TableCell[][] = [];
  let open: TableCell[] | undefined;
  for (const { term, value, isWide } of facts) {
    const termCell = { text: plainRuns(term), color: QUIET } as TableCell;
    const valueCell = { text: plainRuns(value) } as TableCell;
    if (isWide) {
      open = undefined;
      rows.push([termCell, ...spanned(valueCell as Content, 3)]);
    } else if (open) {
      open.splice(2, 2, termCell, valueCell);
      open = undefined;
    } else {
      open = [termCell, valueCell, { text: '' }, { text: '' }];
      rows.push(open);
    }
  }
  return {
    table: { widths: [TERM_PT, valuePt, TERM_PT, valuePt], body: rows, dontBreakRows: true },
    layout: {
      hLineWidth: () => HAIRLINE_PT,
      hLineColor: () => HAIR,
      vLineWidth: () => 0,
      paddingLeft: (column) => (column === 0 ? 0 : GAP_PT / 2),
      paddingRight: (column) => (column === 3 ? 0 : GAP_PT / 2),
      paddingTop: () => 1.6,
      paddingBottom: () => 1.6,
    },
    fontSize: TABLE_PT + 0.4,
    margin: [0, 2, 0, 4],
  };
}
