import { chooseLimits } from '../../app/limits/choose.ts';
import type { StoredRun } from '../../app/project/stored-run.ts';
import { csvReport } from '../../app/report/csv-report.ts';
import { htmlReport } from '../../app/report/html-report.ts';
import { junitReport } from '../../app/report/junit.ts';
import { labelledLimits } from '../../app/report/limit-labels.ts';
import { BUILT_IN_CHECKS } from '../../app/validate/built-in-summary.ts';
import { jsonText } from '../files/json-text.ts';
import { estimateJob } from '../jobs/estimate-job.ts';
import { runPdf } from '../pdf/run-pdf.ts';
import type { ReportRequest } from './report-request.ts';

/** The report of a stored run. Throws `input` when its document can no longer be modelled. */
export function runContent(run: StoredRun, request: ReportRequest): string | Promise<Uint8Array> {
  const { result, document, settings, startedAt } = run;
  const { project, author, dateText, paper, programVersion } = request;
  switch (request.format) {
    case 'csv':
      return csvReport(result);
    case 'json':
      return jsonText(result);
    default:
  }
  const { board, limits, catalogue } = estimateJob(document, settings, programVersion);
  const { lines } = chooseLimits(limits, catalogue);
  const limitLines = labelledLimits(lines);
  switch (request.format) {
    case 'junit':
      return junitReport(result, lines, { startedAt, run: run.run });
    case 'html':
      return htmlReport(result, board, limitLines, { dateText });
    case 'pdf': {
      const title = { project, author, dateText, runNumber: run.run, note: run.note };
      const validation = { programVersion, groups: BUILT_IN_CHECKS };
      return runPdf({ result, board, limitLines, title, paper, validation });
    }
  }
}
