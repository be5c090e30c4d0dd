import { reportContent } from './report-content.ts';
import type { RenderedReport, ReportFormat, ReportRequest } from './report-request.ts';

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
  const content = await reportContent(request);
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  return { name: `${nameOf(request)}${ending}`, mediaType, bytes };
}

function nameOf({ subject, title }: ReportRequest): string {
  switch (subject.kind) {
    case 'run': {
      const { name, revision } = subject.run.result.board;
      const run = title.runNumber === null ? '' : `run ${title.runNumber}`;
      return [name, revision, run].filter((part) => part !== '').join(' ');
    }
    case 'comparison':
      return `${subject.comparison.after.board} run ${subject.comparison.before.run} to ${subject.comparison.after.run}`;
    case 'trend':
      return `${title.project} trend`;
  }
}
