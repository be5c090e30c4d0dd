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
 * A new project in the folder with the sample's board and sources as its draft; returns its file. It holds no runs: results
 * kept ready would be those of the program as it once was.
 */
export async function makeSampleProject(folder: string): Promise<string> {
  const file = newProjectFile(folder, NAME);
  const beside = (kind: string) => join(samplesFolder(), `${REVISION}.${kind}.json`);
  const { document } = await loadBoard(beside('board'), beside('sources'));
  const project = Project.open(file, { create: true });
  try {
    project.saveDraft({ document, settings: runSettingsSchema.parse({}) }, 0);
  } finally {
    project.close();
  }
  return file;
}
