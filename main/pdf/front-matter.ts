import type { Content, TableCell } from 'pdfmake/interfaces.js';
import type { Fact, Text } from '../../app/report/blocks.ts';
import { factsContent } from './facts-content.ts';
import { printableText } from './fonts.ts';
import { HAIR, HAIRLINE_PT, INK, type PageRoom, QUIET, TABLE_PT, TEXT_PT } from './page.ts';
import { plainRuns, textContent } from './text-content.ts';

const TITLE_PT = 17;
const VERDICT_PT = 12.5;
const VERDICT_MARK_PT = 15;

/** Title of the whole report with its block of facts. */
export const titleBlock = (title: string, facts: readonly Fact[], room: PageRoom): Content[] => [
  {
    text: plainRuns(title),
    bold: true,
    fontSize: TITLE_PT,
    margin: [0, 0, 0, 3],
    outline: true,
    outlineText: printableText(title),
  } as Content,
  factsContent(facts, room),
];

/** The verdict in a frame, with the paragraph for whoever reads only one. */
export const verdictBox = (headline: Text, summary: Text): Content => ({
  table: {
    widths: ['*'],
    body: [
      [
        {
          stack: [
            textContent(headline, { fontSize: VERDICT_PT, margin: [0, 0, 0, 2] }, VERDICT_MARK_PT),
            textContent(summary, { fontSize: TEXT_PT - 0.4 }),
          ],
        },
      ],
    ],
    dontBreakRows: true,
  },
  layout: {
    hLineWidth: () => 0.9,
    vLineWidth: () => 0.9,
    hLineColor: () => INK,
    vLineColor: () => INK,
    paddingLeft: () => 9,
    paddingRight: () => 9,
    paddingTop: () => 6,
    paddingBottom: () => 7,
  },
  margin: [0, 6, 0, 0],
});

/** What keeps the verdict from being taken at its word. */
export const warningLine = (text: Text): Content =>
  textContent(text, { fontSize: TEXT_PT, margin: [0, 4, 0, 0] }, TEXT_PT);

const ROLES = ['Prepared', 'Reviewed', 'Approved'];
const LINE_HEIGHT_PT = 30;

/** Lines to sign, kept together; `author` is proposed as who prepared it. */
export function signOff(author: string): Content {
  const head = ['', 'Name', 'Date', 'Signature'].map((text): TableCell => ({ text, color: QUIET, fontSize: TABLE_PT }));
  const rows = ROLES.map((role, i): TableCell[] => [
    { text: role, bold: true, margin: [0, 14, 0, 0] },
    { text: i === 0 ? plainRuns(author) : '', margin: [0, 14, 0, 0] } as TableCell,
    '',
    '',
  ]);
  return {
    table: { widths: [70, '*', 90, '*'], heights: (row) => (row === 0 ? 10 : LINE_HEIGHT_PT), body: [head, ...rows] },
    layout: {
      hLineWidth: (line) => (line === 0 ? 0 : HAIRLINE_PT),
      hLineColor: (line) => (line === 1 ? HAIR : INK),
      vLineWidth: () => 0,
      paddingLeft: (column) => (column === 0 ? 0 : 8),
      paddingRight: () => 0,
      paddingTop: () => 1,
      paddingBottom: () => 3,
    },
    fontSize: TEXT_PT,
  };
}
