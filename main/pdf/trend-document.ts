import type { Content, TDocumentDefinitions } from 'pdfmake/interfaces.js';
import type { Trend } from '../../app/compare/types.ts';
import { paragraph, type Section } from '../../app/report/blocks.ts';
import { countText } from '../../app/report/format.ts';
import { shortName } from '../../app/report/markup.ts';
import type { Paper, ReportTitle } from '../../app/report/report-title.ts';
import { cautionsSection } from '../../app/report/sections/closing-section.ts';
import { projectFacts } from '../../app/report/sections/title-section.ts';
import { TREND_TITLE, trendSections } from '../../app/report/trend/trend-sections.ts';
import { titleBlock } from './front-matter.ts';
import { roomOn } from './page.ts';
import { type DocumentFrame, FOOT_TEXT, framedDocument, headText } from './page-frame.ts';
import { sectionContent } from './section-content.ts';

/** Set-ups printed: the first have the most revisions. */
const MOST_GROUPS = 20;

/** The printed trend of a project, as pages to be laid out. */
export function trendDocument(trend: Trend, title: ReportTitle, paper: Paper): TDocumentDefinitions {
  const room = roomOn(paper);
  const left = trend.groups.length - MOST_GROUPS;
  const sections: Section[] = [
    ...trendSections({ ...trend, groups: trend.groups.slice(0, MOST_GROUPS) }),
    ...(trend.groups.length === 0 ? [{ title: 'No runs', blocks: [paragraph('The project holds no run.')] }] : []),
    ...(left > 0
      ? [{ title: 'Not printed', blocks: [paragraph(`${countText(left, 'more set-up')} in the JSON.`)] }]
      : []),
    cautionsSection(),
  ];
  const content: Content[] = [
    ...titleBlock(TREND_TITLE, projectFacts(title), room),
    ...sections.flatMap((section) => sectionContent(section, room)),
  ];
  return framedDocument(frameOf(trend, title, paper), content);
}

function frameOf({ groups }: Trend, title: ReportTitle, paper: Paper): DocumentFrame {
  const project = shortName(title.project, 48);
  const [latest] = groups.flatMap(({ points }) => points).sort((one, other) => other.run - one.run);
  return {
    title: headText([TREND_TITLE, project], ': '),
    author: title.author,
    subject: headText([project, countText(groups.length, 'set-up')], '; '),
    keywords: '',
    dateText: title.dateText,
    programVersion: (latest?.programVersion ?? '').slice(0, 20),
    paper,
    headLeft: headText([TREND_TITLE, project]),
    headRight: shortName(title.dateText, 24),
    footLeft: FOOT_TEXT,
  };
}
