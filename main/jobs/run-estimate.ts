import { availableParallelism } from 'node:os';
import { mergeShares } from '../../app/estimate/estimate.ts';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { EstimateJob } from './job.ts';
import { runJob } from './run-job.ts';

/** More threads than this do not pay: each one models the board anew. */
const MOST_THREADS = 8;

/**
 * Runs an estimate on all cores: every thread takes its share of the frequencies; progress is that of the slowest. `signal` ends
 * them; `onLevels` is given levels as they are found, share by share, before the receiver has put neighbours together.
 */
export async function runEstimate(
  job: EstimateJob,
  onProgress?: (done: number, total: number) => void,
  signal?: AbortSignal,
  onLevels?: (levels: readonly LineLevel[]) => void,
): Promise<EstimateResult> {
  const of = Math.min(MOST_THREADS, availableParallelism());
  const done = new Array<number>(of).fill(0);
  const totals = new Array<number>(of).fill(0);
  const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0);
  const stop = new AbortController();
  const threads = signal ? AbortSignal.any([signal, stop.signal]) : stop.signal;
  try {
    const shares = await Promise.all(
      done.map((_, index) =>
        runJob(
          'estimate share',
          { ...job, share: { index, of } },
          (shareDone, shareTotal) => {
            done[index] = shareDone;
            totals[index] = shareTotal;
            onProgress?.(sum(done), Math.max(...totals) * of);
          },
          threads,
          onLevels,
        ),
      ),
    );
    return await runJob('estimate finish', { ...job, levels: mergeShares(shares) }, undefined, threads);
  } finally {
    stop.abort();
  }
}
