import { type AppError, fileError } from '../../app/errors.ts';

const WORDS = new Map([
  ['ENOENT', 'not found'],
  ['ENOTDIR', 'a part of the path is not a folder'],
  ['EACCES', 'access denied'],
  ['EPERM', 'access denied'],
  ['EROFS', 'the file system is read-only'],
  ['EISDIR', 'is a folder, not a file'],
  ['ENOSPC', 'no space left on the disk'],
  ['EDQUOT', 'the disk quota is used up'],
  ['ENAMETOOLONG', 'the name is too long'],
  ['ELOOP', 'too many symbolic links'],
  ['EMFILE', 'too many open files'],
  ['EBUSY', 'in use by another program'],
  ['EFBIG', 'too large for the file system'],
]);

/** A failed file operation in words; the system's own message where there are none. */
export function fileFailure(file: string, doing: 'read' | 'written', error: unknown): AppError {
  const code = (error as NodeJS.ErrnoException | undefined)?.code;
  const words = WORDS.get(code ?? '') ?? (error instanceof Error ? error.message : String(error));
  return fileError(file, `cannot be ${doing}: ${words}`, { cause: error });
}
