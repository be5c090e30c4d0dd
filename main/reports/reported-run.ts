import { chooseLimits } from '../../app/limits/choose.ts';
import type { StoredRun } from '../../app/project/stored-run.ts';
import { estimateJob } from '../jobs/estimate-job.ts';
import type { ReportedRun } from './report-request.ts';

/** A stored run as its reports need it. Throws `input` when its document can no longer be modelled. */
export function reportedRun({ result, document, settings, startedAt, programVersion }: StoredRun): ReportedRun {
  const { board, limits, catalogue } = estimateJob(document, settings, programVersion);
  return { result, board, limitLines: chooseLimits(limits, catalogue).lines, startedAt };
}
