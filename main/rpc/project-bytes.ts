import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Project } from '../db/project.ts';
import { PROJECT_ENDING } from './new-project-file.ts';

/** A project as the bytes of one file, as it is now. Throws as `backupTo`. */
export async function projectBytes(project: Project): Promise<Uint8Array> {
  const folder = await mkdtemp(join(tmpdir(), 'quietboard-'));
  try {
    const copy = join(folder, `copy${PROJECT_ENDING}`);
    await project.backupTo(copy);
    return await readFile(copy);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
