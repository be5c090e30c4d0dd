import type { Comparison } from '../../compare/types.ts';
import { factsMarkup, sectionMarkup } from '../html/section-markup.ts';
import { textMarkup } from '../html/text-markup.ts';
import { markup, shortName } from '../markup.ts';
import { reportPage } from '../page.ts';
import { cautionsSection } from '../sections/closing-section.ts';
import {
  COMPARISON_TITLE,
  comparisonFacts,
  comparisonSections,
  comparisonSummary,
  comparisonWarnings,
} from './comparison-sections.ts';

export interface ComparisonHtmlOptions {
  /** Date to print in the title block. Without it the page has none: the same input gives the same bytes. */
  readonly dateText?: string;
}

/** A comparison as one self-contained page, like `htmlReport`. */
export function comparisonHtml(comparison: Comparison, options: ComparisonHtmlOptions = {}): string {
  const warnings = comparisonWarnings(comparison);
  const body = markup`<header><h1>${COMPARISON_TITLE}</h1>
${factsMarkup(comparisonFacts(comparison, options.dateText))}</header>
<section class="verdict"><p class="headline">${comparison.headline}</p>
<p class="summary">${comparisonSummary(comparison)}</p>${warnings.map((warning) => markup`<p class="summary">${textMarkup(warning)}</p>`)}</section>
${[...comparisonSections(comparison), cautionsSection()].map(sectionMarkup)}`;
  return reportPage(`${shortName(comparison.after.board, 80)} — comparison of runs`, body);
}
