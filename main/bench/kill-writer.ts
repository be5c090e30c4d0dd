import { readFileSync, writeSync } from 'node:fs';
import { Project } from '../db/project.ts';
import type { NewRun } from '../db/runs-repository.ts';

/**
 * Entry of the process that is killed: `kill-writer.js PROJECT RUN.json` says when it is ready, writes without end, and says each
 * run's number once it was told that the run is kept.
 */
const [file, runFile] = process.argv.slice(2);
const run = JSON.parse(readFileSync(runFile!, 'utf8')) as NewRun;
const project = Project.open(file!, { create: true });
writeSync(1, 'ready\n');
for (;;) {
  const note = `${process.pid} ${performance.now()}`;
  const result = { ...run.result, notes: [...run.result.notes, note] };
  writeSync(1, `${project.addRun({ ...run, note, result })}\n`);
  project.saveDraft({ document: run.document, settings: run.settings }, project.draft()?.version ?? 0);
  project.putUiState('last', note);
}
