import { parentPort, workerData } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import { estimate } from '../../app/estimate/estimate.ts';
import { runFieldJob } from '../../app/fields/run-field-job.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { allChecks } from '../../app/validate/all-checks.ts';
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

function run(job: Job) {
  switch (job.name) {
    case 'estimate': {
      const { board, request, limits, catalogue } = job.input;
      return estimate(board, { ...request, limits: chooseLimits(limits, catalogue) }, { onProgress });
    }
    case 'field':
      return runFieldJob(job.input);
    case 'validate':
      return allChecks();
  }
}

try {
  say({ kind: 'done', output: run(workerData as Job) });
} catch (error) {
  if (error instanceof AppError) say({ kind: 'failed', code: error.code, message: error.message, path: error.path });
  else throw error;
}
