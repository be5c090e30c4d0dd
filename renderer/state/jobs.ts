import { call } from '../api/api.ts';
import { getState, type Job, type JobKind, setState } from './app-store.ts';

/** Long work of the host: progress comes as events under the job's id. */

function update(id: string, change: (job: Job) => Job): void {
  setState(({ jobs }) => ({ jobs: jobs.map((job) => (job.id === id ? change(job) : job)) }));
}

/** Lists the job while `work` runs. A second job of the same kind stops the first. */
export async function runJob<T>(kind: JobKind, stage: string, work: (jobId: string) => Promise<T>): Promise<T> {
  for (const job of getState().jobs) if (job.kind === kind) void stopJob(job.id);
  const id = crypto.randomUUID();
  setState(({ jobs }) => ({ jobs: [...jobs, { id, kind, stage, done: 0, total: 0, isStopping: false }] }));
  try {
    return await work(id);
  } finally {
    setState(({ jobs }) => ({ jobs: jobs.filter((job) => job.id !== id) }));
  }
}

/** Asks the host to end a job; the job's own call then fails with `cancelled`. */
export async function stopJob(id: string): Promise<void> {
  update(id, (job) => ({ ...job, isStopping: true }));
  await call('job.stop', { jobId: id });
}

export const takeProgress = (progress: { jobId: string; stage: string; done: number; total: number }): void =>
  update(progress.jobId, (job) => ({ ...job, stage: progress.stage, done: progress.done, total: progress.total }));

export const jobOf = (kind: JobKind): Job | undefined => getState().jobs.find((job) => job.kind === kind);
