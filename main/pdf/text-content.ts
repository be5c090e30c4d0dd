import type { Content, ContentStack, ContentText, Style } from 'pdfmake/interfaces.js';
import type { Text } from '../../app/report/blocks.ts';
import { dashPicture, inlineMark } from '../../app/report/figures/marks.ts';
import type { Markup } from '../../app/report/markup.ts';
import { fontRuns, MONO, SANS } from './fonts.ts';
import { QUIET } from './page.ts';
import { printFigure } from './print-figure.ts';

/** A text of the report as content of the printing library, which has no pictures within a line. */

interface Emphasis {
  readonly isBold?: boolean;
  readonly isQuiet?: boolean;
  readonly isCode?: boolean;
}

type Run = { text: string; font: string; bold?: boolean; color?: string; fontSize?: number };
type Piece = Run | { readonly picture: Markup };

function piecesOf(text: Text, emphasis: Emphasis): Piece[] {
  if (text === undefined || text === false || text === '') return [];
  if (typeof text === 'string') return runsOf(text, emphasis);
  if (!('kind' in text)) return text.flatMap((part) => piecesOf(part, emphasis));
  switch (text.kind) {
    case 'name':
      return runsOf(text.text, emphasis);
    case 'strong':
      return piecesOf(text.text, { ...emphasis, isBold: true });
    case 'quiet':
      return piecesOf(text.text, { ...emphasis, isQuiet: true });
    case 'code':
      return piecesOf(text.text, { ...emphasis, isCode: true });
    case 'mark':
      return [{ picture: inlineMark(text.standing, text.label) }];
    case 'dash':
      return [{ picture: dashPicture(text.polarization) }];
    case 'break':
      return [{ text: '\n', font: SANS }];
  }
}

const runsOf = (text: string, { isBold, isQuiet, isCode }: Emphasis): Run[] =>
  fontRuns(text, isCode ? MONO : SANS).map((run) => ({
    ...run,
    ...(isBold && { bold: true }),
    ...(isQuiet && { color: QUIET }),
  }));

const isRun = (piece: Piece): piece is Run => 'text' in piece;

/** Runs of a text without marks; marks in it are dropped. For headings and cells. */
export const plainRuns = (text: Text): Run[] => piecesOf(text, {}).filter(isRun);

/** Whether anything of it is a picture. */
export const hasPicture = (text: Text): boolean => piecesOf(text, {}).some((piece) => !isRun(piece));

/** Before a mark that follows a text. */
const BETWEEN_MARKS_PT = 5;

/** One text node, or where it holds marks a row of marks and texts of which the last takes the rest of the width. */
export function textContent(text: Text, style: Style, markPt = 8): Content {
  const pieces = piecesOf(text, {});
  if (pieces.every(isRun)) return { text: pieces, ...style } satisfies ContentText;
  const columns: Content[] = [];
  let runs: Run[] = [];
  const endText = (width: 'auto' | '*') => {
    if (runs.length > 0 || width === '*') columns.push({ text: runs, width, ...style, margin: 0 } as Content);
    runs = [];
  };
  for (const piece of pieces) {
    if (isRun(piece)) runs.push(piece);
    else {
      endText('auto');
      const leftPt = columns.length > 0 ? BETWEEN_MARKS_PT : 0;
      columns.push(pictureColumn(piece.picture, markPt, style.fontSize ?? markPt, leftPt));
    }
  }
  endText('*');
  return { columns, columnGap: 2.5, ...(style.margin !== undefined && { margin: style.margin }) };
}

/** A mark as high as the text beside it, centred on its lower-case letters. */
const pictureColumn = (
  picture: Markup,
  sizePt: number,
  fontPt: number,
  leftPt: number,
): ContentStack & { width: number } => ({
  stack: [
    {
      svg: printFigure(picture),
      width: sizePt,
      height: sizePt,
      margin: [leftPt, Math.max(0, 0.74 * fontPt - sizePt / 2), 0, 0],
    },
  ],
  width: sizePt + leftPt,
});
