import { Worker } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import type { Job, JobMessage, JobName, JobTypes } from './job.ts';

/**
 * Runs one job in a worker thread; `signal` ends the thread. Rejects with the job's own `AppError`, or with whatever ended the thread.
 * The worker is built JavaScript beside this file: Node 20 runs no TypeScript.
 */
export function runJob<N extends JobName>(
  name: N,
  input: JobTypes[N]['input'],
  onProgress?: (done: number, total: number) => void,
  signal?: AbortSignal,
): Promise<JobTypes[N]['output']> {
  return new Promise((resolve, reject) => {
    const job = { name, input } as Job;
    const worker = new Worker(new URL('./job-worker.js', import.meta.url), { workerData: job });
    const end = () => void worker.terminate();
    if (signal?.aborted) end();
    signal?.addEventListener('abort', end, { once: true });
    worker.on('message', (message: JobMessage) => {
      if (message.kind === 'progress') onProgress?.(message.done, message.total);
      else if (message.kind === 'done') resolve(message.output as JobTypes[N]['output']);
      else reject(new AppError(message.code, message.message, message.path));
    });
    worker.on('error', reject);
    worker.on('exit', (code) => reject(new AppError('internal', `the ${name} thread ended early (code ${code})`)));
  });
}
