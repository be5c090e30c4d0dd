import Database from 'better-sqlite3';
import { AppError, fileError } from '../../app/errors.ts';
import { DamagedDocument } from './damaged-document.ts';

export function damaged(file: string, what: string, options?: ErrorOptions): AppError {
  const text = `is damaged (${what}); nothing was changed. Restore a backup; "quietboard doctor" says what is left`;
  return fileError(file, text, options);
}

const FULL = 'cannot be written: no space left on the disk; nothing was changed';

/** SQLite's codes for a file whose content is not what it must be. */
export const isDamage = (code: string): boolean => /^SQLITE_(CORRUPT|NOTADB|IOERR_SHORT_READ)/.test(code);

/** A failure of the store on a project's file, in words that say what to do. Others come back as they are. */
export function storeFailure(file: string, busyTimeoutMs: number, error: unknown): unknown {
  const options = { cause: error };
  if (error instanceof DamagedDocument) return damaged(file, error.message, options);
  if (!(error instanceof Database.SqliteError)) return error;
  if (isDamage(error.code)) return damaged(file, error.message, options);
  const [, group = ''] = /^SQLITE_([A-Z]+)/.exec(error.code) ?? [];
  switch (group) {
    case 'BUSY':
    case 'LOCKED': {
      const waited = `${busyTimeoutMs / 1000} s`;
      const text = `${file}: another program is writing to it and did not finish within ${waited}. Wait until it has finished, or close it, then try again; nothing was changed.`;
      return new AppError('busy', text, file, options);
    }
    case 'FULL':
      return fileError(file, FULL, options);
    case 'READONLY':
      return fileError(file, 'cannot be written: the file or its folder is read-only; nothing was changed', options);
    case 'PERM':
    case 'AUTH':
      return fileError(file, 'cannot be opened: access denied', options);
    case 'CANTOPEN':
      return fileError(file, 'cannot be opened: its folder must let this program create files beside it', options);
    case 'IOERR':
      // The index of the log of changes finds no room.
      if (error.code === 'SQLITE_IOERR_SHMSIZE') return fileError(file, FULL, options);
      return fileError(file, `the disk failed (${error.code}); nothing was changed`, options);
    default:
      return error;
  }
}
