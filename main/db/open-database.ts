import { accessSync, constants, readFileSync, realpathSync, rmSync } from 'node:fs';
import { dirname, resolve } from 'node:path';
import Database from 'better-sqlite3';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from '../files/file-failure.ts';
import type { ReadableDb } from './database.ts';
import { type Migration, type MigrationReport, migrate, refuseNewer, schemaVersionOf } from './migrate.ts';
import { newDatabase } from './new-database.ts';
import { writeNumbered } from './place-file.ts';
import { readProjectHeader, sizeOf } from './project-header.ts';
import { madeBy, schemaStatements } from './schema-text.ts';
import { damaged } from './store-failure.ts';

export interface ConnectionOptions {
  readonly readOnly: boolean;
  readonly busyTimeoutMs: number;
  readonly migrations: readonly Migration[];
}

interface Opened {
  readonly db: Database.Database;
  readonly migration?: MigrationReport | undefined;
}

/** Throws `file`, `newer-project`, and what SQLite says; the file is then as it was. */
export function openDatabase(file: string, options: ConnectionOptions): Opened {
  const header = readProjectHeader(file);
  if (header === undefined) throw fileError(file, 'cannot be read: not found');
  const newest = options.migrations.at(-1)!.version;
  refuseNewer(file, header.schemaVersion, newest);
  const real = realPathOf(file);
  const version = sizeOf(`${real}-wal`) === 0 ? header.schemaVersion : loggedVersion(file, real, options);
  refuseNewer(file, version, newest);
  if (!options.migrations.some((step) => step.version === version)) {
    throw damaged(file, `no version of this program has written tables of version ${version}`);
  }
  const barrier = writeBarrier(real);
  if (options.readOnly) {
    const shared = barrier || version < newest ? undefined : openShared(file, real, options);
    return shared ?? openInMemory(file, real, options);
  }
  if (barrier) throw fileFailure(file, 'written', barrier);
  return openForWriting(file, real, options);
}

/** better-sqlite3 trims names. */
function realPathOf(file: string): string {
  const real = realpathSync(resolve(file));
  if (real.trimEnd() !== real) throw fileError(file, 'must have a name that does not end with a space');
  return real;
}

/** What keeps the file from being written; undefined when nothing does. */
export function writeBarrier(file: string): unknown {
  try {
    accessSync(file, constants.W_OK);
    accessSync(dirname(file), constants.W_OK | constants.X_OK);
    return undefined;
  } catch (error) {
    return error;
  }
}

function openForWriting(file: string, real: string, { busyTimeoutMs, migrations }: ConnectionOptions): Opened {
  const db = connect(real, busyTimeoutMs);
  let copy: string | undefined;
  try {
    db.pragma('journal_mode = WAL');
    // The default could lose the last writes in a power cut.
    db.pragma('synchronous = FULL');
    const migration = migrate(db, file, migrations, (content, version) => {
      copy = keepCopy(file, content, version);
      return copy;
    });
    // From here on the copy is what there was before.
    copy = undefined;
    refuseOtherTables(file, db, migrations);
    return { db, migration };
  } catch (error) {
    db.close();
    // Nothing was changed: the copy is of no use.
    if (copy !== undefined) rmSync(copy, { force: true });
    throw error;
  }
}

function keepCopy(file: string, content: Buffer, version: number): string {
  try {
    return writeNumbered(file, `before-${version}`, content);
  } catch (error) {
    const text = `has tables of an earlier version, and the copy to be kept before they change failed (${(error as Error).message}); nothing was changed`;
    throw fileError(file, text, { cause: error });
  }
}

function connect(real: string, busyTimeoutMs: number): Database.Database {
  const db = newDatabase(real, { fileMustExist: true, timeout: busyTimeoutMs });
  db.pragma('foreign_keys = ON');
  db.pragma('trusted_schema = OFF');
  db.pragma('cell_size_check = ON');
  return db;
}

/** What SQLite says where it cannot keep its files beside the project: no right to, no room. */
const NO_PLACE = /^SQLITE_(CANTOPEN|READONLY|FULL|IOERR_SHM)/;

/**
 * A connection that could write is the one that clears the log away on closing; the pragma keeps it from changing data.
 * Undefined where SQLite cannot keep its files beside the project.
 */
function openShared(file: string, real: string, { busyTimeoutMs, migrations }: ConnectionOptions): Opened | undefined {
  const db = connect(real, busyTimeoutMs);
  try {
    db.pragma('query_only = ON');
    refuseOtherTables(file, db, migrations);
    return { db };
  } catch (error) {
    db.close();
    if (error instanceof Database.SqliteError && NO_PLACE.test(error.code)) return undefined;
    throw error;
  }
}

function openInMemory(file: string, real: string, { busyTimeoutMs, migrations }: ConnectionOptions): Opened {
  const content = contentOf(file, real, busyTimeoutMs);
  // Bytes 18 and 19 ask for a log beside the file (file format, section 1.3); in memory there is none.
  content[18] = 1;
  content[19] = 1;
  const db = newDatabase(content);
  try {
    migrate(db, file, migrations, () => '');
    refuseOtherTables(file, db, migrations);
    db.pragma('query_only = ON');
    return { db };
  } catch (error) {
    db.close();
    throw error;
  }
}

/** A damaged definition could give the columns other names. Tables of the user's own may stand beside. */
function refuseOtherTables(file: string, db: Database.Database, steps: readonly Migration[]): void {
  const found = new Set(schemaStatements(db as ReadableDb));
  if (!madeBy(steps).every((sql) => found.has(sql))) throw damaged(file, 'its tables are not those of its version');
}

function contentOf(file: string, real: string, busyTimeoutMs: number): Buffer {
  if (sizeOf(`${real}-wal`) > 0) return withReader(file, real, busyTimeoutMs, (db) => db.serialize());
  try {
    return readFileSync(real);
  } catch (error) {
    throw fileFailure(file, 'read', error);
  }
}

const loggedVersion = (file: string, real: string, { busyTimeoutMs }: ConnectionOptions): number =>
  withReader(file, real, busyTimeoutMs, schemaVersionOf);

/** For files with logged changes, without writing anything. */
function withReader<T>(file: string, real: string, timeout: number, run: (db: Database.Database) => T): T {
  let db: Database.Database | undefined;
  try {
    db = newDatabase(real, { readonly: true, fileMustExist: true, timeout });
    return run(db);
  } catch (error) {
    if (!(error instanceof Database.SqliteError) || !NO_PLACE.test(error.code)) throw error;
    const text = `has changes in ${real}-wal that were not written back, and its folder is read-only or full. Open both where they can be written`;
    throw new AppError('file', `${file}: ${text}`, file, { cause: error });
  } finally {
    db?.close();
  }
}
