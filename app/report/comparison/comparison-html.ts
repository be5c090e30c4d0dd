import type { Comparison } from '../../compare/types.ts';
import { factsMarkup, sectionMarkup } from '../html/section-markup.ts';
import { textMarkup } from '../html/text-markup.ts';
import { markup, shortName } from '../markup.ts';
import { reportPage } from '../page.ts';
import type { ReportTitle } from '../report-title.ts';
import { cautionsSection } from '../sections/closing-section.ts';
import { projectFacts } from '../sections/title-section.ts';
import {
  COMPARISON_TITLE,
  comparisonFacts,
  comparisonSections,
  comparisonSummary,
  comparisonWarnings,
} from './comparison-sections.ts';

/** A comparison as one self-contained page, like `htmlReport`. Without a title its block holds the runs alone. */
export function comparisonHtml(comparison: Comparison, title?: ReportTitle): string {
  const dateText = title === undefined || title.dateText === '' ? undefined : title.dateText;
  const facts = [...(title ? projectFacts(title) : []), ...comparisonFacts(comparison, dateText)];
  const warnings = comparisonWarnings(comparison);
  const body = markup`<header><h1>${COMPARISON_TITLE}</h1>
${factsMarkup(facts)}</header>
<section class="verdict"><p class="headline">${comparison.headline}</p>
<p class="summary">${comparisonSummary(comparison)}</p>${warnings.map((warning) => markup`<p class="summary">${textMarkup(warning)}</p>`)}</section>
${[...comparisonSections(comparison), cautionsSection()].map(sectionMarkup)}`;
  return reportPage(`${shortName(comparison.after.board, 80)} — comparison of runs`, body);
}
