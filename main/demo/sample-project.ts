import { rmSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import { programVersion } from '../cli/version.ts';
import { Project } from '../db/project.ts';
import { loadBoard } from '../files/load-board.ts';
import { estimateJob } from '../jobs/estimate-job.ts';
import { runEstimate } from '../jobs/run-estimate.ts';

/**
 * `npm run sample-project`: estimates the three revisions of the sample and keeps them in the project that comes with the
 * program, with revision B as what is being edited. A test computes the runs again and compares.
 */

const root = resolve(dirname(fileURLToPath(import.meta.url)), '../../..');
const folder = join(root, 'samples', 'valve-controller');
const file = join(folder, 'three-revisions.quietboard');

/** Revisions with the day their layout was ready, in the sample's story. */
const RUNS = [
  { revision: 'a', startedAt: '2026-03-02T09:00:00.000Z', note: 'Two layers, first layout' },
  { revision: 'b', startedAt: '2026-03-16T09:00:00.000Z', note: 'Four layers, solid ground under the traces' },
  { revision: 'c', startedAt: '2026-03-30T09:00:00.000Z', note: 'Oscillator beside the controller, slower edges' },
];
const DRAFT = 'b';
/** Fixed, so that making the file again changes what the program changed and nothing else. */
const DURATION_S = 10;

const settings = runSettingsSchema.parse({});
for (const sidecar of ['', '-wal', '-shm']) rmSync(`${file}${sidecar}`, { force: true });
const project = Project.open(file, { create: true });
try {
  project.setName('Orchard valve controller');
  for (const { revision, startedAt, note } of RUNS) {
    // Relative, as a user would call it: notes name the files, and must not name this machine's folders.
    process.chdir(root);
    const path = (kind: string) => `samples/valve-controller/rev-${revision}.${kind}.json`;
    const { document } = await loadBoard(path('board'), path('sources'));
    const result = await runEstimate(estimateJob(document, settings, programVersion()));
    project.addRun({ startedAt, document, settings, result, durationS: DURATION_S, note });
    if (revision === DRAFT) project.saveDraft({ document, settings }, 0);
    console.log(`revision ${revision.toUpperCase()}: ${result.worst?.marginDb.toFixed(1)} dB`);
  }
} finally {
  project.close();
}
