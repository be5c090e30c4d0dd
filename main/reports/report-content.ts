import { AppError } from '../../app/errors.ts';
import { comparisonCsv } from '../../app/report/comparison/comparison-csv.ts';
import { comparisonHtml } from '../../app/report/comparison/comparison-html.ts';
import { csvReport } from '../../app/report/csv-report.ts';
import { htmlReport } from '../../app/report/html-report.ts';
import { junitReport } from '../../app/report/junit.ts';
import { labelledLimits } from '../../app/report/limit-labels.ts';
import { trendCsv } from '../../app/report/trend/trend-csv.ts';
import { trendHtml } from '../../app/report/trend/trend-html.ts';
import { BUILT_IN_CHECKS } from '../../app/validate/built-in-summary.ts';
import { jsonText } from '../files/json-text.ts';
import type { ReportedRun, ReportRequest } from './report-request.ts';

type Content = string | Promise<Uint8Array>;

/** Loading the printing library takes a quarter of a command's start: only who prints waits for it. */
const comparisonPrinter = () => import('../pdf/comparison-pdf.ts');
const runPrinter = () => import('../pdf/run-pdf.ts');

/** A report's text or bytes. The same request gives the same bytes. Throws `input` for a format the subject does not have. */
export function reportContent(request: ReportRequest): Content {
  const { subject, format, title, paper } = request;
  if (subject.kind === 'run') return runContent(subject.run, request);
  if (format === 'junit') throw new AppError('input', `a ${subject.kind} has no report as ${format}`, 'format');
  if (subject.kind === 'comparison') {
    const { comparison } = subject;
    switch (format) {
      case 'pdf':
        return comparisonPrinter().then(({ comparisonPdf }) => comparisonPdf(comparison, title, paper));
      case 'html':
        return comparisonHtml(comparison, title);
      case 'csv':
        return comparisonCsv(comparison);
      case 'json':
        return jsonText(comparison);
    }
  }
  const { trend } = subject;
  switch (format) {
    case 'pdf':
      return comparisonPrinter().then(({ trendPdf }) => trendPdf(trend, title, paper));
    case 'html':
      return trendHtml(trend, title);
    case 'csv':
      return trendCsv(trend);
    case 'json':
      return jsonText(trend);
  }
}

function runContent(run: ReportedRun, { format, title, paper, programVersion }: ReportRequest): Content {
  const { result, board, limitLines, startedAt } = run;
  switch (format) {
    case 'csv':
      return csvReport(result);
    case 'json':
      return jsonText(result);
    case 'junit':
      return junitReport(result, limitLines, {
        ...(startedAt !== undefined && { startedAt }),
        ...(title.runNumber !== null && { run: title.runNumber }),
      });
    case 'html':
      return htmlReport(result, board, labelledLimits(limitLines), { title });
    case 'pdf': {
      const validation = { programVersion, groups: BUILT_IN_CHECKS };
      const report = { result, board, limitLines: labelledLimits(limitLines), title, paper, validation };
      return runPrinter().then(({ runPdf }) => runPdf(report));
    }
  }
}
