import type { RunSummary } from '../../app/project/stored-run.ts';

/** Two runs to compare; null: chosen by the program. */
export interface RunPair {
  readonly before: number | null;
  readonly after: number | null;
}

/** The pair with what was left open filled in: the newest run, against the newest one of another revision before it. */
export function completePair({ before, after }: RunPair, runs: readonly RunSummary[]): RunPair {
  const there = (run: number | null) => (runs.some((row) => row.run === run) ? run : null);
  const newest = runs.reduce<RunSummary | null>(
    (best, row) => (best === null || row.run > best.run ? row : best),
    null,
  );
  const last = there(after) ?? newest?.run ?? null;
  const lastRow = runs.find(({ run }) => run === last);
  const earlier = runs.filter(({ run }) => last !== null && run < last).sort((one, other) => other.run - one.run);
  const other = earlier.find(({ revision }) => revision !== lastRow?.revision) ?? earlier[0];
  return { before: there(before) ?? other?.run ?? null, after: last };
}
