import { parentPort, workerData } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import { solveShare } from '../../app/estimate/estimate.ts';
import type { EstimateRequest } from '../../app/estimate/estimate-request.ts';
import { finishEstimate } from '../../app/estimate/finish.ts';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import { planEstimate } from '../../app/estimate/plan.ts';
import { runFieldJob } from '../../app/fields/run-field-job.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { allChecks } from '../../app/validate/all-checks.ts';
import { openFiles } from '../files/open-files.ts';
import type { EstimateJob, Job, JobMessage } from './job.ts';

/** Entry of the worker thread: one job, then the thread ends. */

const PROGRESS_INTERVAL_MS = 100;

const say = (message: JobMessage): void => parentPort?.postMessage(message);

let saidAtMs = 0;
function onProgress(done: number, total: number): void {
  const nowMs = performance.now();
  if (nowMs - saidAtMs < PROGRESS_INTERVAL_MS && done < total) return;
  saidAtMs = nowMs;
  say({ kind: 'progress', done, total });
  if (newLevels.length > 0) say({ kind: 'levels', levels: newLevels });
  newLevels = [];
}

/** Found since the last word about progress. */
let newLevels: LineLevel[] = [];
const onLevel = (level: LineLevel): void => void newLevels.push(level);

const requestOf = ({ request, limits, catalogue }: EstimateJob): EstimateRequest => ({
  ...request,
  limits: chooseLimits(limits, catalogue),
});

async function run(job: Job) {
  switch (job.name) {
    case 'estimate share':
      return solveShare(planEstimate(job.input.board, requestOf(job.input)), job.input.share, { onProgress, onLevel });
    case 'estimate finish': {
      const { board, levels } = job.input;
      const request = requestOf(job.input);
      return finishEstimate(board, request, planEstimate(board, request), levels);
    }
    case 'field':
      return runFieldJob(job.input);
    case 'validate':
      return allChecks();
    case 'open files':
      return openFiles(job.input.files, job.input.onto, { onProgress });
    case 'report':
      // Most threads print nothing: they need not load what prints.
      return (await import('../reports/render-report.ts')).renderReport(job.input);
  }
}

try {
  say({ kind: 'done', output: await run(workerData as Job) });
} catch (error) {
  if (error instanceof AppError) say({ kind: 'failed', code: error.code, message: error.message, path: error.path });
  else throw error;
}
