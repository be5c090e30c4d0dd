import { randomBytes } from 'node:crypto';
import {
  closeSync,
  existsSync,
  fsyncSync,
  linkSync,
  openSync,
  realpathSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, extname, join, resolve } from 'node:path';
import { fileError } from '../../app/errors.ts';
import { fileFailure } from '../files/file-failure.ts';
import { temporaryFiles } from '../files/write-text.ts';

const ENDINGS = ['', '-wal', '-shm', '-journal'];

/** Absolute name of a file to be made, links in its folder followed. Throws `file`. */
export function targetOf(file: string): string {
  const target = resolve(file);
  // better-sqlite3 trims names.
  if (target.trimEnd() !== target) throw fileError(file, 'must have a name that does not end with a space');
  try {
    return join(realpathSync(dirname(target)), basename(target));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw fileFailure(file, 'written', error);
    throw fileError(file, `cannot be written: the folder ${dirname(target)} does not exist`, { cause: error });
  }
}

/** A name for a file under way, in the folder where it will stand; a host that is stopped removes it. */
export function temporaryBeside(target: string): string {
  const name = `.${basename(target).slice(0, 100)}.${randomBytes(6).toString('hex')}.tmp`;
  const temporary = join(dirname(target), name);
  for (const ending of ENDINGS) temporaryFiles.add(`${temporary}${ending}`);
  return temporary;
}

/** What is left of a file under way, with what SQLite put beside it. */
export function removeTemporary(temporary: string): void {
  removeSidecars(temporary);
  rmSync(temporary, { force: true });
  for (const ending of ENDINGS) temporaryFiles.delete(`${temporary}${ending}`);
}

/** What SQLite keeps beside a database: it belongs to that one content only. */
export function removeSidecars(file: string): void {
  for (const ending of ENDINGS.slice(1)) rmSync(`${file}${ending}`, { force: true });
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

/** Keeps bytes as `stem.tag.quietboard`, or `stem.tag-2.quietboard` …; returns the name. Throws what the system says. */
export function writeNumbered(file: string, tag: string, content: Uint8Array): string {
  const target = targetOf(file);
  const temporary = temporaryBeside(target);
  try {
    writeFileSync(temporary, content, { flag: 'wx', flush: true });
    const ending = extname(target);
    const stem = ending === '' ? target : target.slice(0, -ending.length);
    for (let count = 1; ; count++) {
      const name = `${stem}.${tag}${count > 1 ? `-${count}` : ''}${ending}`;
      if (placeNew(temporary, name)) return name;
    }
  } finally {
    removeTemporary(temporary);
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
