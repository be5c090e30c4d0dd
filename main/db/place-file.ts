import { randomBytes } from 'node:crypto';
import { closeSync, existsSync, fsyncSync, linkSync, openSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { basename, dirname, extname, join } from 'node:path';

/** A name for a file under way, in the folder where it will stand. */
export function temporaryBeside(file: string): string {
  return join(dirname(file), `.${basename(file).slice(0, 100)}.${randomBytes(6).toString('hex')}.tmp`);
}

/** Removes an unfinished database and what SQLite put beside it. */
export function removeDatabase(file: string): void {
  for (const ending of ['', '-wal', '-shm', '-journal']) rmSync(`${file}${ending}`, { force: true });
}

/** Gives a finished file its name, whole or not at all; false when the name is taken. Throws what the system says. */
export function placeNew(temporary: string, file: string): boolean {
  try {
    linkSync(temporary, file);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === 'EEXIST') return false;
    // File systems without links: the look before the move leaves a moment, nothing better is to be had there.
    if (code !== 'EPERM' && code !== 'ENOTSUP' && code !== 'EOPNOTSUPP' && code !== 'ENOSYS') throw error;
    if (existsSync(file)) return false;
    renameSync(temporary, file);
  }
  rmSync(temporary, { force: true });
  syncFolder(dirname(file));
  return true;
}

/** As `placeNew`, in place of a file of that name. */
export function placeOver(temporary: string, file: string): void {
  renameSync(temporary, file);
  syncFolder(dirname(file));
}

/** Writes a file to the disk under a name of the form `stem.tag.quietboard`, `stem.tag-2.quietboard` …; returns the name. */
export function writeNumbered(file: string, tag: string, content: Buffer): string {
  const temporary = temporaryBeside(file);
  try {
    writeFileSync(temporary, content, { flag: 'wx', flush: true });
    const ending = extname(file);
    const stem = ending === '' ? file : file.slice(0, -ending.length);
    for (let count = 1; ; count++) {
      const name = `${stem}.${tag}${count > 1 ? `-${count}` : ''}${ending}`;
      if (placeNew(temporary, name)) return name;
    }
  } finally {
    rmSync(temporary, { force: true });
  }
}

/** A new name outlives a power cut once its folder is on the disk. */
function syncFolder(path: string): void {
  // Windows has no handle on a folder; its file systems log names themselves.
  if (process.platform === 'win32') return;
  const handle = openSync(path, 'r');
  try {
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
}
