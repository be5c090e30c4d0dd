import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { BenchResult } from './bench-result.ts';
import { killWrites } from './kill-writes.ts';
import { sampleRun } from './sample-run.ts';

const KILLS = 300;

/** A project whose writers are killed 300 times. Throws when a run is lost or the file damaged. */
export async function killBench(): Promise<BenchResult> {
  const folder = mkdtempSync(join(tmpdir(), 'quietboard-bench-'));
  try {
    const run = await sampleRun('c');
    // Few readings: more of the time is spent in writing.
    const few = { ...run, result: { ...run.result, points: run.result.points.slice(0, 20), currentMaps: [] } };
    const writer = fileURLToPath(new URL('./kill-writer.js', import.meta.url));
    const startedMs = performance.now();
    const report = await killWrites(folder, writer, few, KILLS);
    if (report.faults.length > 0) throw new Error(`a killed writer did damage:\n${report.faults.join('\n')}`);
    return {
      name: `project whose writers are killed ${KILLS} times`,
      seconds: (performance.now() - startedMs) / 1000,
      peakMb: process.resourceUsage().maxRSS / 1024,
      detail: {
        'runs promised': report.promisedRuns,
        'runs kept': report.keptRuns,
        'runs lost or damaged': report.faults.length,
        'killed at work': report.caughtOpen,
      },
    };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
