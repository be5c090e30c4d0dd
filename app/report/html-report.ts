import type { Board } from '../board/board.ts';
import type { EstimateResult } from '../estimate/result.ts';
import type { ReportLimitLine } from './figures/limit-lines.ts';
import { factsMarkup, sectionMarkup } from './html/section-markup.ts';
import { textMarkup } from './html/text-markup.ts';
import { markup, shortName } from './markup.ts';
import { reportPage } from './page.ts';
import type { ReportTitle } from './report-title.ts';
import { boardSection } from './sections/board-section.ts';
import { findingsSection, modelSection } from './sections/caveats-section.ts';
import { cautionsSection, notesSection } from './sections/closing-section.ts';
import { currentsSection } from './sections/currents-section.ts';
import { pointsSection } from './sections/points-section.ts';
import { radiationSection } from './sections/radiation-section.ts';
import { limitSection, setupSection } from './sections/setup-section.ts';
import { sharesSection } from './sections/shares-section.ts';
import { sourcesSection } from './sections/sources-section.ts';
import { spectrumSection } from './sections/spectrum-section.ts';
import { REPORT_TITLE, runTitleFacts, titleFacts } from './sections/title-section.ts';
import { verdictHeadline, verdictSummary } from './sections/verdict-section.ts';

export type { ReportLimitLine } from './figures/limit-lines.ts';

export interface HtmlReportOptions {
  /** Date to print in the title block. Without it the page has none: the same input gives the same bytes. */
  readonly dateText?: string;
  /** The whole title block of a project's report; its date counts. */
  readonly title?: ReportTitle;
}

/**
 * The report as one self-contained page for screen (light and dark) and A4 print: well-formed as XML too, no script, no
 * external request, all text from files escaped.
 */
export function htmlReport(
  result: EstimateResult,
  board: Board,
  limitLines: readonly ReportLimitLine[],
  options: HtmlReportOptions = {},
): string {
  const sections = [
    spectrumSection(result, limitLines),
    radiationSection(result, limitLines),
    sharesSection(result),
    boardSection(board, result),
    pointsSection(result),
    currentsSection(result, board),
    findingsSection(result),
    setupSection(board, result),
    limitSection(result, limitLines),
    sourcesSection(board),
    modelSection(result),
    notesSection(result),
    cautionsSection(),
  ];
  const body = markup`<header><h1>${REPORT_TITLE}</h1>
${factsMarkup(options.title ? runTitleFacts(result, board, options.title) : titleFacts(result, board, options.dateText))}</header>
<section class="verdict"><p class="headline">${textMarkup(verdictHeadline(result))}</p>
<p class="summary">${textMarkup(verdictSummary(result))}</p></section>
${sections.map(
  (section) => markup`${sectionMarkup(section)}
`,
)}`;
  return reportPage(`${shortName(result.board.name, 80)} — radiated emission`, body);
}
