import { existsSync, readFileSync, statSync } from 'node:fs';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from '../files/file-failure.ts';
import { newDatabase } from './new-database.ts';
import {
  placeNew,
  placeOver,
  removeSidecars,
  removeTemporary,
  targetOf,
  temporaryBeside,
  writeNumbered,
} from './place-file.ts';
import { isProjectFile } from './project-header.ts';
import { isDamage, storeFailure } from './store-failure.ts';

/** What becomes of a file that has the name already. */
export type IfThere = 'refuse' | 'replace' | 'keep-copy';

/** How long to wait for another program to let go of the file. */
const RELEASE_TIMEOUT_MS = 1000;

/**
 * Puts a project file in place, whole or not at all: `make` writes it under a temporary name. Only a project's file is ever
 * replaced; with `keep-copy` it is kept under the name returned. Throws `file`, `busy` when another program has it open.
 */
export async function putProjectFile(
  file: string,
  own: string,
  ifThere: IfThere,
  make: (temporary: string) => Promise<void>,
): Promise<string | undefined> {
  const target = targetOf(file);
  refuseTarget(file, target, own, ifThere);
  const temporary = temporaryBeside(target);
  try {
    await make(temporary);
    if (placeNew(temporary, target)) return undefined;
    refuseTarget(file, target, own, ifThere);
    release(file, target);
    const kept = ifThere === 'keep-copy' ? writeNumbered(file, 'before-restore', readFileSync(target)) : undefined;
    placeOver(temporary, target);
    return kept;
  } catch (error) {
    const failure = storeFailure(file, RELEASE_TIMEOUT_MS, error);
    throw failure instanceof AppError ? failure : fileFailure(file, 'written', failure);
  } finally {
    removeTemporary(temporary);
  }
}

function refuseTarget(file: string, target: string, own: string, ifThere: IfThere): void {
  if (!existsSync(target)) return;
  if (ifThere === 'refuse') throw fileError(file, 'is there already; nothing was changed');
  if (isSameFile(target, own)) throw fileError(file, 'must be another file than the one it is made from');
  if (isProjectFile(target)) return;
  throw fileError(file, 'is no Quietboard project and will not be replaced: remove it first, or choose another name');
}

/** Whatever their names. */
function isSameFile(one: string, other: string): boolean {
  const [a, b] = [one, other].map((file) => statSync(file, { bigint: true, throwIfNoEntry: false }));
  return a !== undefined && b !== undefined && a.dev === b.dev && a.ino === b.ino;
}

/**
 * Makes sure that no program has the file open and that nothing of its own is left beside it: a log of changes that met
 * another content under its name would destroy it.
 */
function release(file: string, target: string): void {
  try {
    const db = newDatabase(target, { fileMustExist: true, timeout: RELEASE_TIMEOUT_MS });
    try {
      // Leaving the log mode takes the file for this program alone.
      db.pragma('journal_mode = DELETE');
    } finally {
      db.close();
    }
  } catch (error) {
    const { code } = error as { code?: string };
    if (code?.startsWith('SQLITE_BUSY')) {
      throw new AppError('busy', `${file}: another program has it open: close it, then try again`, file, {
        cause: error,
      });
    }
    // A damaged file is what a backup is for.
    if (isDamage(code ?? '')) removeSidecars(target);
    else throw storeFailure(file, RELEASE_TIMEOUT_MS, error);
  }
}
