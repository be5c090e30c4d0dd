import { AppError } from '../../app/errors.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import type { EventBus } from './event-bus.ts';

/** At most ten messages a second. */
const PROGRESS_INTERVAL_MS = 100;
/** Each one holds threads and memory; a window has two or three. */
const MOST_JOBS = 12;

/** What a job is given by those who run it. */
export interface JobControl {
  readonly signal: AbortSignal;
  /** `total` 0: nobody knows. */
  readonly onProgress: (stage: string, done: number, total: number) => void;
  readonly onPoints: (points: readonly ResultPoint[]) => void;
}

/** The long procedures under way, by the id their caller gave them. */
export class RunningJobs {
  readonly #events: EventBus;
  readonly #running = new Map<string, { readonly stop: AbortController; readonly ended: Promise<unknown> }>();

  constructor(events: EventBus) {
    this.#events = events;
  }

  /**
   * Runs `work` under the id. Throws `cancelled` when it was stopped, whatever the work itself made of that; `busy` for an
   * id that is running or when too many are.
   */
  async run<T>(jobId: string, work: (control: JobControl) => Promise<T>): Promise<T> {
    if (this.#running.has(jobId)) throw new AppError('busy', 'a job under this id is running already', 'jobId');
    if (this.#running.size >= MOST_JOBS) {
      throw new AppError('busy', `${MOST_JOBS} jobs are running already: wait for one or stop one`);
    }
    const stop = new AbortController();
    const ended = this.#work(work, this.#control(jobId, stop.signal));
    this.#running.set(jobId, { stop, ended });
    try {
      return await ended;
    } finally {
      this.#running.delete(jobId);
    }
  }

  /** Whether there was something to stop. */
  stop(jobId: string): boolean {
    const job = this.#running.get(jobId);
    job?.stop.abort();
    return job !== undefined;
  }

  /** Stops all and waits for their ends. */
  async stopAll(): Promise<void> {
    const jobs = [...this.#running.values()];
    for (const { stop } of jobs) stop.abort();
    await Promise.allSettled(jobs.map(({ ended }) => ended));
  }

  get count(): number {
    return this.#running.size;
  }

  async #work<T>(work: (control: JobControl) => Promise<T>, control: JobControl): Promise<T> {
    const cancelled = () => new AppError('cancelled', 'stopped by the user');
    try {
      const value = await work(control);
      if (!control.signal.aborted) return value;
    } catch (error) {
      if (!control.signal.aborted) throw error;
    }
    throw cancelled();
  }

  #control(jobId: string, signal: AbortSignal): JobControl {
    let saidAtMs = Number.NEGATIVE_INFINITY;
    let saidStage = '';
    return {
      signal,
      onProgress: (stage, done, total) => {
        const nowMs = performance.now();
        const isLast = total > 0 && done >= total;
        if (stage === saidStage && !isLast && nowMs - saidAtMs < PROGRESS_INTERVAL_MS) return;
        if (signal.aborted) return;
        saidAtMs = nowMs;
        saidStage = stage;
        this.#events.publish('job.progress', { jobId, stage, done, total });
      },
      onPoints: (points) => {
        if (!signal.aborted && points.length > 0) this.#events.publish('job.points', { jobId, points });
      },
    };
  }
}
