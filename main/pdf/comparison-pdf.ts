import type { Comparison, Trend } from '../../app/compare/types.ts';
import type { Paper, ReportTitle } from '../../app/report/report-title.ts';
import { comparisonDocument } from './comparison-document.ts';
import { renderPdf } from './render-pdf.ts';
import { trendDocument } from './trend-document.ts';

/** A comparison of two runs as a PDF. The same input gives the same bytes. */
export const comparisonPdf = (comparison: Comparison, title: ReportTitle, paper: Paper): Promise<Uint8Array> =>
  renderPdf(comparisonDocument(comparison, title, paper));

/** The trend of a project's margins as a PDF. The same input gives the same bytes. */
export const trendPdf = (trend: Trend, title: ReportTitle, paper: Paper): Promise<Uint8Array> =>
  renderPdf(trendDocument(trend, title, paper));
