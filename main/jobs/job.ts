import type { Board } from '../../app/board/board.ts';
import type { LineDetail } from '../../app/contract/line-detail.ts';
import type { ErrorCode } from '../../app/errors.ts';
import type { EstimateRequest } from '../../app/estimate/estimate-request.ts';
import type { FieldJob, FieldResult } from '../../app/fields/field-job.ts';
import type { LimitRequest } from '../../app/limits/choose.ts';
import type { LimitLine } from '../../app/limits/limit-line.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import type { Check } from '../../app/validate/check.ts';
import type { NamedFile, OpenedFiles } from '../files/open-files.ts';
import type { RenderedReport, ReportRequest } from '../reports/report-request.ts';

/** An estimate as plain data: the limit lines are chosen again in the thread, as functions cannot be sent to it. */
export interface EstimateJob {
  readonly board: Board;
  readonly request: Omit<EstimateRequest, 'limits'>;
  readonly limits: LimitRequest;
  /** Lines to choose from; absent: the built-in ones. */
  readonly catalogue?: readonly LimitLine[];
}

/** Long computations that run beside the host's own thread, so that it can be stopped at any moment. */
export interface JobTypes {
  'line detail': { input: EstimateJob & { readonly frequencyHz: number }; output: LineDetail };
  field: { input: FieldJob; output: FieldResult };
  validate: { input: null; output: Check[] };
  'open files': { input: { readonly files: readonly NamedFile[]; readonly onto?: RunDocument }; output: OpenedFiles };
  report: { input: ReportRequest; output: RenderedReport };
}
export type JobName = keyof JobTypes;

/** What the worker is given. */
export type Job = { [N in JobName]: { name: N; input: JobTypes[N]['input'] } }[JobName];

/** What the worker says. */
export type JobMessage =
  | { kind: 'progress'; done: number; total: number }
  | { kind: 'done'; output: JobTypes[JobName]['output'] }
  | { kind: 'failed'; code: ErrorCode; message: string; path: string | undefined };
