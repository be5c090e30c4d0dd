import { availableParallelism } from 'node:os';
import { AppError } from '../../app/errors.ts';
import { mergeUnits, type UnitLevels } from '../../app/estimate/estimate.ts';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { EstimateThread } from './estimate-thread.ts';
import type { EstimateJob } from './job.ts';

/** More threads than this do not pay: each one models the board anew. */
const MOST_THREADS = 8;

export interface RunEstimateHooks {
  onProgress?(done: number, total: number): void;
  /** Given levels as they are found, before the receiver has put neighbours together. */
  onLevels?(levels: readonly LineLevel[]): void;
  /** Ends the threads; the estimate then throws `cancelled`. */
  readonly signal?: AbortSignal;
}

/**
 * Runs an estimate in threads of their own: each takes the next unit of the work until none is left. The result does not depend
 * on their number, which is that of the cores unless given.
 */
export async function runEstimate(
  job: EstimateJob,
  { onProgress, onLevels, signal }: RunEstimateHooks = {},
  threadCount = availableParallelism(),
): Promise<EstimateResult> {
  const threads = Array.from({ length: Math.min(MOST_THREADS, threadCount) }, () => new EstimateThread(job));
  const endAll = () => {
    for (const thread of threads) thread.end(new AppError('cancelled', 'stopped by the user'));
  };
  if (signal?.aborted) endAll();
  signal?.addEventListener('abort', endAll, { once: true });
  const done: number[] = [];
  const levels: UnitLevels[] = [];
  let next: number | null = null;
  const work = async (thread: EstimateThread) => {
    const unitLines = await thread.ready();
    const total = unitLines.reduce((sum, count) => sum + count, 0);
    // From the highest frequencies, whose units take longest, so that the threads end together.
    next ??= unitLines.length;
    while (next > 0) {
      const index = --next;
      levels[index] = await thread.solve(index, (unitDone, newLevels) => {
        done[index] = unitDone;
        onProgress?.(
          done.reduce((sum, count) => sum + count, 0),
          total,
        );
        if (newLevels.length > 0) onLevels?.(newLevels);
      });
    }
  };
  try {
    await Promise.all(threads.map(work));
    return await threads[0]!.finish(mergeUnits(levels));
  } finally {
    signal?.removeEventListener('abort', endAll);
    endAll();
  }
}
