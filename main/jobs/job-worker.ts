import { parentPort, workerData } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import { lineDetail } from '../../app/estimate/line-detail.ts';
import { planEstimate } from '../../app/estimate/plan.ts';
import { runFieldJob } from '../../app/fields/run-field-job.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { allChecks } from '../../app/validate/all-checks.ts';
import { openFiles } from '../files/open-files.ts';
import type { Job, JobMessage } from './job.ts';

/** Entry of the worker thread: one job, then the thread ends. */

const PROGRESS_INTERVAL_MS = 100;

const say = (message: JobMessage): void => parentPort?.postMessage(message);

let saidAtMs = 0;
function onProgress(done: number, total: number): void {
  const nowMs = performance.now();
  if (nowMs - saidAtMs < PROGRESS_INTERVAL_MS && done < total) return;
  saidAtMs = nowMs;
  say({ kind: 'progress', done, total });
}

async function run(job: Job) {
  switch (job.name) {
    case 'line detail': {
      const { board, request, limits, catalogue, frequencyHz } = job.input;
      const plan = planEstimate(board, { ...request, limits: chooseLimits(limits, catalogue) });
      return lineDetail(plan, frequencyHz, { onProgress });
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
