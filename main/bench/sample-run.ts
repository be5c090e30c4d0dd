import { fileURLToPath } from 'node:url';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import type { NewRun } from '../db/runs-repository.ts';
import { loadBoard } from '../files/load-board.ts';
import { estimateJob } from '../jobs/estimate-job.ts';
import { runEstimate } from '../jobs/run-estimate.ts';

const SAMPLES = new URL('../../../samples/valve-controller/', import.meta.url);

/** A revision of the sample board, really estimated. */
export async function sampleRun(letter: 'a' | 'b' | 'c'): Promise<NewRun> {
  const file = (kind: string) => fileURLToPath(new URL(`rev-${letter}.${kind}.json`, SAMPLES));
  const { document } = await loadBoard(file('board'), file('sources'));
  const settings = runSettingsSchema.parse({});
  const result = await runEstimate(estimateJob(document, settings, ''));
  return { startedAt: '2026-01-01T00:00:00.000Z', document, settings, result, durationS: 1 };
}
