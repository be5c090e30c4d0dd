import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { makeFolder } from '../state/home.ts';

export const PROJECT_ENDING = '.quietboard';

/** A free name in a folder: `Untitled.quietboard`, `Untitled 2.quietboard` … */
export function newProjectFile(folder: string, name: string): string {
  makeFolder(folder);
  for (let count = 1; ; count++) {
    const file = join(folder, `${name}${count > 1 ? ` ${count}` : ''}${PROJECT_ENDING}`);
    if (!existsSync(file)) return file;
  }
}

/** The file a user means: a plain name is in the projects' folder, and a new file gets the ending. */
export function projectFile(folder: string, given: string): string {
  const file = resolve(makeFolder(folder), given);
  return existsSync(file) || file.toLowerCase().endsWith(PROJECT_ENDING) ? file : `${file}${PROJECT_ENDING}`;
}
