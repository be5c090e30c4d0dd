import { statSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { estimate } from '../../../app/estimate/estimate.ts';
import { chooseLimits } from '../../../app/limits/choose.ts';
import { runSettingsSchema } from '../../../app/project/run-settings.ts';
import { perturbedResult } from '../../../main/bench/perturbed-result.ts';
import { seeded } from '../../../main/bench/seeded.ts';
import { Project } from '../../../main/db/project.ts';
import { loadBoard } from '../../../main/files/load-board.ts';
import { estimateJob } from '../../../main/jobs/estimate-job.ts';
import { temporaryFolder } from '../../support/project-fixture.ts';

const RUNS = 12;

it('50 revisions × 20 runs of the sample, no two results alike, stay under 100 MB', async () => {
  const sample = (letter: string) => `samples/valve-controller/rev-${letter}`;
  const { document } = await loadBoard(`${sample('b')}.board.json`, `${sample('b')}.sources.json`);
  const settings = runSettingsSchema.parse({});
  const { board, request, limits } = estimateJob(document, settings, '');
  const result = estimate(board, { ...request, limits: chooseLimits(limits) });
  expect(result.points.length).toBeGreaterThan(900);

  const project = Project.open(join(temporaryFolder(), 'size.quietboard'), { create: true });
  const emptyBytes = statSync(project.file).size;
  const random = seeded(5);
  for (let i = 0; i < RUNS; i++) {
    const changed = { ...document, board: { ...document.board, revision: `R${Math.floor(i / 4)}` } };
    const startedAt = '2026-01-01T00:00:00.000Z';
    project.addRun({ startedAt, document: changed, settings, result: perturbedResult(result, random), durationS: 1 });
  }
  project.close();
  // Runs are alike in size: what so many take, a thousand take in proportion.
  const perRunBytes = (statSync(project.file).size - emptyBytes) / RUNS;
  expect(emptyBytes + 1000 * perRunBytes).toBeLessThan(100e6);
});
