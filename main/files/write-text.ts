import { randomBytes } from 'node:crypto';
import { closeSync, fsyncSync, openSync, rmSync, writeFileSync } from 'node:fs';
import { access, constants, realpath, rename, rm, stat } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from './file-failure.ts';

/** Temporary files that exist now, ours and the database's; a host that is stopped removes them. */
export const temporaryFiles = new Set<string>();

/** Removes temporary files of writes that are under way. For the moment before the process ends. */
export function removeTemporaryFiles(): void {
  for (const file of temporaryFiles) rmSync(file, { force: true });
}

/**
 * Writes a file whole or not at all: to a temporary file in the same folder, to the disk, then renamed. A failure leaves
 * the old file as it was. Links are followed; devices and pipes are written directly. Throws `file`.
 */
export const writeText = (file: string, text: string): Promise<void> => writePieces(file, (write) => write(text));

/** The same for bytes. */
export const writeBytes = (file: string, bytes: Uint8Array): Promise<void> =>
  writePieces(file, (write) => write(bytes));

/** The same for what comes in pieces: `make` gives them to `write`, one after the other. */
export async function writePieces(
  file: string,
  make: (write: (piece: string | Uint8Array) => void) => void,
): Promise<void> {
  await requireWritable(file);
  try {
    const kind = await stat(file).catch(() => undefined);
    if (kind !== undefined && !kind.isFile()) {
      fillFile(openSync(file, 'w'), make);
      return;
    }
    const target = kind === undefined ? file : await realpath(file);
    const temporary = join(dirname(target), `.${basename(target).slice(0, 100)}.${randomBytes(6).toString('hex')}.tmp`);
    temporaryFiles.add(temporary);
    try {
      const descriptor = openSync(temporary, 'wx', kind === undefined ? 0o666 : kind.mode & 0o777);
      fillFile(descriptor, (write) => {
        make(write);
        fsyncSync(descriptor);
      });
      await rename(temporary, target);
    } catch (error) {
      await rm(temporary, { force: true });
      throw error;
    } finally {
      temporaryFiles.delete(temporary);
    }
  } catch (error) {
    throw error instanceof AppError ? error : fileFailure(file, 'written', error);
  }
}

function fillFile(descriptor: number, make: (write: (piece: string | Uint8Array) => void) => void): void {
  try {
    make((piece) => writeFileSync(descriptor, piece));
  } finally {
    closeSync(descriptor);
  }
}

/** Throws `file` when the file cannot be created or replaced, so that a long job need not run to find out. */
export async function requireWritable(file: string): Promise<void> {
  const folder = dirname(file);
  const folderStat = await stat(folder).catch((error: unknown) => error as NodeJS.ErrnoException);
  if (folderStat instanceof Error) {
    if (folderStat.code === 'ENOENT') throw fileError(file, `cannot be written: the folder ${folder} does not exist`);
    throw fileFailure(file, 'written', folderStat);
  }
  if (!folderStat.isDirectory()) throw fileError(file, `cannot be written: ${folder} is not a folder`);
  const kind = await stat(file).catch(() => undefined);
  if (kind?.isDirectory()) throw fileError(file, 'cannot be written: is a folder, not a file');
  try {
    if (kind !== undefined) await access(file, constants.W_OK);
    if (kind === undefined || kind.isFile()) await access(folder, constants.W_OK | constants.X_OK);
  } catch (error) {
    throw fileFailure(file, 'written', error);
  }
}
