import type { Trend } from '../../compare/types.ts';
import { type Fact, name } from '../blocks.ts';
import { factsMarkup, sectionMarkup } from '../html/section-markup.ts';
import { markup } from '../markup.ts';
import { reportPage } from '../page.ts';
import { cautionsSection } from '../sections/closing-section.ts';
import { TREND_TITLE, trendSections } from './trend-sections.ts';

export interface TrendHtmlOptions {
  readonly project?: string;
  /** Date to print in the title block. Without it the page has none: the same input gives the same bytes. */
  readonly dateText?: string;
}

/** A trend as one self-contained page, like `htmlReport`. */
export function trendHtml(trend: Trend, { project, dateText }: TrendHtmlOptions = {}): string {
  const facts: Fact[] = [
    ...(project === undefined ? [] : [{ term: 'Project', value: name(project, 80) }]),
    ...(dateText === undefined ? [] : [{ term: 'Date', value: dateText }]),
  ];
  const body = markup`<header><h1>${TREND_TITLE}</h1>${facts.length > 0 && factsMarkup(facts)}</header>
${trend.groups.length === 0 && markup`<p>No runs.</p>`}
${[...trendSections(trend), cautionsSection()].map(sectionMarkup)}`;
  return reportPage(TREND_TITLE, body);
}
