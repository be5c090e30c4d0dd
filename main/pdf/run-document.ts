import type { Content, TDocumentDefinitions } from 'pdfmake/interfaces.js';
import type { Board } from '../../app/board/board.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { Section } from '../../app/report/blocks.ts';
import type { ReportLimitLine } from '../../app/report/figures/limit-lines.ts';
import { shortName } from '../../app/report/markup.ts';
import type { Paper, ReportTitle } from '../../app/report/report-title.ts';
import { boardSection } from '../../app/report/sections/board-section.ts';
import { findingsSection, modelSection } from '../../app/report/sections/caveats-section.ts';
import { cautionsSection, notesSection } from '../../app/report/sections/closing-section.ts';
import { currentsSection } from '../../app/report/sections/currents-section.ts';
import { emittersSection } from '../../app/report/sections/emitters-section.ts';
import { pointsSection } from '../../app/report/sections/points-section.ts';
import { radiationSection } from '../../app/report/sections/radiation-section.ts';
import { limitSection, setupSection } from '../../app/report/sections/setup-section.ts';
import { sharesSection } from '../../app/report/sections/shares-section.ts';
import { sourcesSection } from '../../app/report/sections/sources-section.ts';
import { spectrumSection } from '../../app/report/sections/spectrum-section.ts';
import { bandsSection, causesSection, stripSection, suretySection } from '../../app/report/sections/summary-section.ts';
import { REPORT_TITLE, runTitleFacts } from '../../app/report/sections/title-section.ts';
import { validationSection } from '../../app/report/sections/validation-section.ts';
import { verdictHeadline, verdictSummary } from '../../app/report/sections/verdict-section.ts';
import type { ValidationSummary } from '../../app/report/validation-summary.ts';
import { signOff, titleBlock, verdictBox } from './front-matter.ts';
import { roomOn } from './page.ts';
import { type DocumentFrame, FOOT_TEXT, framedDocument, headText } from './page-frame.ts';
import { sectionContent, titledContent } from './section-content.ts';

export interface RunReport {
  readonly result: EstimateResult;
  readonly board: Board;
  readonly limitLines: readonly ReportLimitLine[];
  readonly title: ReportTitle;
  readonly paper: Paper;
  /** null: the checks were not run for this report. */
  readonly validation: ValidationSummary | null;
}

/** On paper a table must end some time; what is left out is counted under it. */
const MOST_POINTS = 40;
const MOST_FINDINGS = 60;
const MOST_CAVEATS = 60;
const MOST_SOURCES = 60;
const MOST_NOTES = 40;

/** The printed report of one run, as pages to be laid out: a summary page, then the evidence. */
export function runDocument(report: RunReport): TDocumentDefinitions {
  const { result, board, limitLines, title, paper } = report;
  const room = roomOn(paper);
  const contents = (sections: readonly Section[]): Content[] =>
    sections.flatMap((section) => sectionContent(section, room));
  return framedDocument(frameOf(report), [
    ...titleBlock(REPORT_TITLE, runTitleFacts(result, board, title), room),
    verdictBox(verdictHeadline(result), verdictSummary(result)),
    ...contents([
      bandsSection(result, limitLines),
      causesSection(result),
      stripSection(result, limitLines),
      suretySection(result),
    ]),
    ...contents([
      spectrumSection(result, limitLines),
      radiationSection(result, limitLines),
      pointsSection(result, MOST_POINTS),
      sharesSection(result),
      emittersSection(board, result),
      findingsSection(result, MOST_FINDINGS),
      boardSection(board, result),
      limitSection(result, limitLines),
      setupSection(board, result),
      sourcesSection(board, MOST_SOURCES),
      currentsSection(result, board),
      modelSection(result, MOST_CAVEATS),
      notesSection(result, MOST_NOTES),
      validationSection(report.validation),
      cautionsSection(),
    ]),
    titledContent('Sign-off', signOff(title.author), room),
  ]);
}

function frameOf({ result, title, paper }: RunReport): DocumentFrame {
  const { name, revision, sha256 } = result.board;
  const board = `${shortName(name, 48)}${revision === '' ? '' : `, revision ${shortName(revision, 20)}`}`;
  const run = title.runNumber === null ? '' : `run ${title.runNumber}`;
  return {
    title: `${REPORT_TITLE}: ${board}`,
    author: title.author,
    subject: headText([title.project, board, run], '; '),
    keywords: `sha256 ${sha256.slice(0, 64)}`,
    dateText: title.dateText,
    programVersion: result.program.version.slice(0, 20),
    paper,
    headLeft: headText([shortName(title.project, 32), board]),
    headRight: headText([run, shortName(title.dateText, 24), sha256.slice(0, 12)]),
    footLeft: FOOT_TEXT,
  };
}
