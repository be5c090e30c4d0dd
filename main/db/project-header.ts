import { closeSync, fstatSync, openSync, readSync, statSync } from 'node:fs';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from '../files/file-failure.ts';

/** "QBrd": in the file's header (bytes 68 to 71), so that any program can tell what kind of SQLite file it is. */
export const APPLICATION_ID = 0x51427264;

const HEADER_BYTES = 100;
const MAGIC = 'SQLite format 3\0';

export interface ProjectHeader {
  /** Of the tables, as far as written back from the log of changes. */
  readonly schemaVersion: number;
}

/**
 * Looks at a file before SQLite does, so that what is no project is never touched; undefined when there is none.
 * Throws `file` for folders, empty and cut files, and other formats. Source: SQLite database file format, section 1.3.
 */
export function readProjectHeader(file: string): ProjectHeader | undefined {
  const found = readStart(file);
  if (found === undefined) return undefined;
  const { start, size } = found;
  const must = 'must be a Quietboard project';
  if (size === 0) throw fileError(file, `${must}; it is empty`);
  if (size < HEADER_BYTES || !isOfSqlite(start)) {
    throw fileError(file, `${must}; it is another kind of file, or its beginning is damaged`);
  }
  if (start.readUInt32BE(68) !== APPLICATION_ID) {
    throw fileError(file, `${must}; it is an SQLite database of another program`);
  }
  const pageBytes = start.readUInt16BE(16) === 1 ? 65536 : start.readUInt16BE(16);
  const wholeBytes = pageBytes * start.readUInt32BE(28);
  // While changes are logged beside the file, its own size may lag behind.
  if (size < wholeBytes && sizeOf(`${file}-wal`) === 0) {
    throw fileError(file, `is cut short: must have ${wholeBytes} bytes; it has ${size}. Restore a backup`);
  }
  return { schemaVersion: start.readUInt32BE(60) };
}

/** Whether a file's beginning is that of a project, sound or not. Throws `file` when it cannot be read. */
export function isProjectFile(file: string): boolean {
  const found = readStart(file);
  return found !== undefined && isOfSqlite(found.start) && found.start.readUInt32BE(68) === APPLICATION_ID;
}

const isOfSqlite = (start: Buffer): boolean => start.toString('latin1', 0, MAGIC.length) === MAGIC;

/** 0 for a file that is not there. */
export const sizeOf = (file: string): number => statSync(file, { throwIfNoEntry: false })?.size ?? 0;

function readStart(file: string): { start: Buffer; size: number } | undefined {
  try {
    const stats = statSync(file, { throwIfNoEntry: false });
    if (stats === undefined) return undefined;
    // Before opening: a pipe would wait for its writer.
    if (!stats.isFile()) throw fileError(file, 'must be a Quietboard project; it is a folder or a device');
    const handle = openSync(file, 'r');
    try {
      const start = Buffer.alloc(HEADER_BYTES);
      readSync(handle, start, 0, HEADER_BYTES, 0);
      return { start, size: fstatSync(handle).size };
    } finally {
      closeSync(handle);
    }
  } catch (error) {
    throw error instanceof AppError ? error : fileFailure(file, 'read', error);
  }
}
