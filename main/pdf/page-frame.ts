import type { Content, TDocumentDefinitions } from 'pdfmake/interfaces.js';
import type { Paper } from '../../app/report/report-title.ts';
import { printableText, SANS } from './fonts.ts';
import { HAIR, HAIRLINE_PT, INK, MARGINS_PT, NOTE_PT, PAGE_SIZES, QUIET, roomOn, TEXT_PT } from './page.ts';
import { plainRuns } from './text-content.ts';

/** What a printed document says about itself: in its properties, and on every page. */
export interface DocumentFrame {
  readonly title: string;
  readonly author: string;
  readonly subject: string;
  readonly keywords: string;
  /** Begins with YYYY-MM-DD: dates the file. Anything else: dated 1970-01-01, which says nothing. */
  readonly dateText: string;
  readonly programVersion: string;
  readonly paper: Paper;
  /** Head of every page: what it is about, which state of it. */
  readonly headLeft: string;
  readonly headRight: string;
  /** Foot of every page, beside its number. */
  readonly footLeft: string;
}

export const FOOT_TEXT = 'Calculated estimate of radiated emission, not a measurement';

/** The parts that say something, apart from one another. */
export const headText = (parts: readonly string[], separator = '  ·  '): string =>
  parts.filter((part) => part !== '').join(separator);

const HEAD_TOP_PT = 22;
const FOOT_TOP_PT = 12;

/** The document with pages, their heads and feet. Nothing in it depends on the machine or the time. */
export function framedDocument(frame: DocumentFrame, content: Content[]): TDocumentDefinitions {
  const { widthPt, heightPt } = PAGE_SIZES[frame.paper];
  const roomPt = roomOn(frame.paper).widthPt;
  return {
    pageSize: { width: widthPt, height: heightPt },
    pageMargins: [MARGINS_PT.left, MARGINS_PT.top, MARGINS_PT.right, MARGINS_PT.bottom],
    version: '1.7',
    // Plain streams: what compression makes of them differs between builds of the same library.
    compress: false,
    language: 'en',
    displayTitle: true,
    info: {
      title: printableText(frame.title),
      author: printableText(frame.author),
      subject: printableText(frame.subject),
      keywords: printableText(frame.keywords),
      creator: `quietboard ${printableText(frame.programVersion)}`,
      producer: 'pdfmake',
      creationDate: creationDate(frame.dateText),
    },
    header: () => ({
      stack: [
        twoSided(frame.headLeft, frame.headRight),
        { canvas: [{ type: 'line', x1: 0, y1: 2.5, x2: roomPt, y2: 2.5, lineWidth: HAIRLINE_PT, lineColor: HAIR }] },
      ],
      margin: [MARGINS_PT.left, HEAD_TOP_PT, MARGINS_PT.right, 0],
    }),
    footer: (page, pages) => ({
      ...twoSided(frame.footLeft, `page ${page} of ${pages}`),
      margin: [MARGINS_PT.left, FOOT_TOP_PT, MARGINS_PT.right, 0],
    }),
    content,
    defaultStyle: { font: SANS, fontSize: TEXT_PT, color: INK, lineHeight: 0.95 },
  };
}

const twoSided = (left: string, right: string) => ({
  columns: [
    { text: plainRuns(left), width: '*' },
    { text: plainRuns(right), width: 'auto', alignment: 'right' as const },
  ],
  columnGap: 12,
  fontSize: NOTE_PT,
  color: QUIET,
});

/** The format's properties need a date: without a day in the text the epoch, as reproducible builds have it. */
const NO_DAY = '1970-01-01';

/** Noon of that day, so that it is the same day in every time zone a reader may show it in. */
export function creationDate(dateText: string): Date {
  const day = /^\d{4}-\d{2}-\d{2}/.exec(dateText)?.[0] ?? NO_DAY;
  const date = new Date(`${day}T12:00:00Z`);
  return Number.isNaN(date.getTime()) ? new Date(`${NO_DAY}T12:00:00Z`) : date;
}
