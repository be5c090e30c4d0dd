import type { Content, TDocumentDefinitions } from 'pdfmake/interfaces.js';
import type { Comparison } from '../../app/compare/types.ts';
import {
  COMPARISON_TITLE,
  comparisonFacts,
  comparisonSections,
  comparisonSummary,
  comparisonWarnings,
} from '../../app/report/comparison/comparison-sections.ts';
import { shortName } from '../../app/report/markup.ts';
import type { Paper, ReportTitle } from '../../app/report/report-title.ts';
import { cautionsSection } from '../../app/report/sections/closing-section.ts';
import { projectFacts } from '../../app/report/sections/title-section.ts';
import { signOff, titleBlock, verdictBox, warningLine } from './front-matter.ts';
import { roomOn } from './page.ts';
import { type DocumentFrame, FOOT_TEXT, framedDocument, headText } from './page-frame.ts';
import { sectionContent, titledContent } from './section-content.ts';

/** On paper a table must end some time; what is left out is counted under it. */
const LENGTH = { changes: 60, lines: 50 };

/** The printed comparison of two runs, as pages to be laid out. */
export function comparisonDocument(comparison: Comparison, title: ReportTitle, paper: Paper): TDocumentDefinitions {
  const room = roomOn(paper);
  const sections = [...comparisonSections(comparison, LENGTH), cautionsSection()];
  const content: Content[] = [
    ...titleBlock(COMPARISON_TITLE, [...projectFacts(title), ...comparisonFacts(comparison, undefined)], room),
    verdictBox(comparison.headline, comparisonSummary(comparison)),
    ...comparisonWarnings(comparison).map(warningLine),
    ...sections.flatMap((section) => sectionContent(section, room)),
    titledContent('Sign-off', signOff(title.author), room),
  ];
  return framedDocument(frameOf(comparison, title, paper), content);
}

function frameOf({ before, after }: Comparison, title: ReportTitle, paper: Paper): DocumentFrame {
  const runs = `run ${before.run} → ${after.run}`;
  const board = shortName(after.board, 48);
  return {
    title: `${COMPARISON_TITLE}: ${board}, ${runs}`,
    author: title.author,
    subject: headText([title.project, board, runs], '; '),
    keywords: `layouts ${before.layoutSha256.slice(0, 64)} ${after.layoutSha256.slice(0, 64)}`,
    dateText: title.dateText,
    programVersion: after.programVersion.slice(0, 20),
    paper,
    headLeft: headText([shortName(title.project, 32), board]),
    headRight: headText([runs, shortName(title.dateText, 24)]),
    footLeft: FOOT_TEXT,
  };
}
