import type { Trend } from '../../compare/types.ts';
import type { Fact } from '../blocks.ts';
import { factsMarkup, sectionMarkup } from '../html/section-markup.ts';
import { markup } from '../markup.ts';
import { reportPage } from '../page.ts';
import type { ReportTitle } from '../report-title.ts';
import { cautionsSection } from '../sections/closing-section.ts';
import { projectFacts } from '../sections/title-section.ts';
import { TREND_TITLE, trendSections } from './trend-sections.ts';

/** A trend as one self-contained page, like `htmlReport`. Without a title it has no block of facts. */
export function trendHtml(trend: Trend, title?: ReportTitle): string {
  const facts: Fact[] = title
    ? [...projectFacts(title), ...(title.dateText === '' ? [] : [{ term: 'Date', value: title.dateText }])]
    : [];
  const body = markup`<header><h1>${TREND_TITLE}</h1>${facts.length > 0 && factsMarkup(facts)}</header>
${trend.groups.length === 0 && markup`<p>No runs.</p>`}
${[...trendSections(trend), cautionsSection()].map(sectionMarkup)}`;
  return reportPage(TREND_TITLE, body);
}
