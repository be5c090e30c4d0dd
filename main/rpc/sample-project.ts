import { copyFileSync, existsSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import { Project } from '../db/project.ts';
import { loadBoard } from '../files/load-board.ts';
import { newProjectFile } from './new-project-file.ts';

const NAME = 'Orchard valve controller';
/** The revision a newcomer finds something to do with. */
const REVISION = 'rev-b';

/** Where the samples lie beside the built program. */
const samplesFolder = (): string => fileURLToPath(new URL('../../../samples/valve-controller', import.meta.url));

/**
 * A fresh copy of the sample project in the folder; returns its file. Where the samples hold it ready made, with the runs of
 * all revisions, that is copied; else it is made from the sample's files and has no runs yet.
 */
export async function makeSampleProject(folder: string): Promise<string> {
  const file = newProjectFile(folder, NAME);
  const samples = samplesFolder();
  const readyMade = join(samples, 'valve-controller.quietboard');
  if (existsSync(readyMade)) {
    copyFileSync(readyMade, file);
    return file;
  }
  const board = join(samples, `${REVISION}.board.json`);
  const { document } = await loadBoard(board, join(samples, `${REVISION}.sources.json`));
  const project = Project.open(file, { create: true });
  try {
    project.saveDraft({ document, settings: runSettingsSchema.parse({}) }, 0);
  } finally {
    project.close();
  }
  return file;
}
