import { AppError } from '../../app/errors.ts';
import { comparisonCsv } from '../../app/report/comparison/comparison-csv.ts';
import { comparisonHtml } from '../../app/report/comparison/comparison-html.ts';
import { trendCsv } from '../../app/report/trend/trend-csv.ts';
import { trendHtml } from '../../app/report/trend/trend-html.ts';
import { jsonText } from '../files/json-text.ts';
import type { RenderedReport, ReportFormat, ReportRequest } from './report-request.ts';
import { runContent } from './run-content.ts';

const MEDIA_TYPES: Readonly<Record<ReportFormat, { readonly mediaType: string; readonly ending: string }>> = {
  pdf: { mediaType: 'application/pdf', ending: '.pdf' },
  html: { mediaType: 'text/html; charset=utf-8', ending: '.html' },
  csv: { mediaType: 'text/csv; charset=utf-8', ending: '.csv' },
  json: { mediaType: 'application/json', ending: '.json' },
  junit: { mediaType: 'application/xml', ending: '.junit.xml' },
};

/** A report as the bytes of a file. Throws `input` where the subject has no report of that format. */
export async function renderReport(request: ReportRequest): Promise<RenderedReport> {
  const { mediaType, ending } = MEDIA_TYPES[request.format];
  const content = await contentOf(request);
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  return { name: `${nameOf(request)}${ending}`, mediaType, bytes };
}

function contentOf(request: ReportRequest): string | Promise<string | Uint8Array> {
  const { subject, format, project, dateText } = request;
  switch (subject.kind) {
    case 'run':
      return runContent(subject.run, request);
    case 'comparison': {
      const { comparison } = subject;
      if (format === 'html') return comparisonHtml(comparison, { dateText });
      if (format === 'csv') return comparisonCsv(comparison);
      if (format === 'json') return jsonText(comparison);
      break;
    }
    case 'trend': {
      const { trend } = subject;
      if (format === 'html') return trendHtml(trend, { project, dateText });
      if (format === 'csv') return trendCsv(trend);
      if (format === 'json') return jsonText(trend);
      break;
    }
  }
  throw new AppError('input', `a ${subject.kind} has no report as ${format}`, 'format');
}

function nameOf({ subject, project }: ReportRequest): string {
  switch (subject.kind) {
    case 'run': {
      const { board, revision, run } = subject.run;
      return [board, revision, `run ${run}`].filter((part) => part !== '').join(' ');
    }
    case 'comparison':
      return `${subject.comparison.after.board} run ${subject.comparison.before.run} to ${subject.comparison.after.run}`;
    case 'trend':
      return `${project} trend`;
  }
}
