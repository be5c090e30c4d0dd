import { accessSync, constants, readFileSync, realpathSync } from 'node:fs';
import { dirname, resolve } from 'node:path';
import Database from 'better-sqlite3';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from '../files/file-failure.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { type Migration, type MigrationReport, migrate, refuseNewer, schemaVersionOf } from './migrate.ts';
import { writeNumbered } from './place-file.ts';
import { readProjectHeader, sizeOf } from './project-header.ts';
import { damaged, storeFailure } from './store-failure.ts';

export interface ConnectionOptions {
  readonly readOnly: boolean;
  readonly busyTimeoutMs: number;
  readonly migrations: readonly Migration[];
}

/**
 * An open project file. Every access is one transaction; failures of SQLite come out as `AppError` (`busy`, `file`).
 *
 * Read-only: where the folder lets SQLite keep its files beside the project, the file is shared with other programs;
 * elsewhere, and for tables of an earlier version, the whole file is read into memory once.
 */
export class ProjectConnection {
  readonly file: string;
  readonly isReadOnly: boolean;
  /** What opening changed in the tables of an earlier version. */
  readonly migration: MigrationReport | undefined;
  readonly #db: Database.Database;
  readonly #busyTimeoutMs: number;

  /** The file must be there. Throws `file`, `newer-project` and `busy`; the file is then as it was. */
  constructor(file: string, options: ConnectionOptions) {
    this.file = file;
    this.isReadOnly = options.readOnly;
    this.#busyTimeoutMs = options.busyTimeoutMs;
    const { db, migration } = this.#told(() => openDatabase(file, options));
    this.#db = db;
    this.migration = migration;
  }

  read<T>(run: (db: ReadableDb) => T): T {
    return this.#told(() => this.#db.transaction(() => run(this.#db as ReadableDb)).deferred());
  }

  /** All of `run` or nothing. */
  write<T>(run: (db: WritableDb) => T): T {
    if (this.isReadOnly) throw fileError(this.file, 'is open for reading only; nothing was changed');
    return this.#told(() => this.#db.transaction(() => run(this.#db as WritableDb)).immediate());
  }

  /** Changes when another connection has written since. */
  dataVersion(): number {
    return this.#told(() => this.#db.pragma('data_version', { simple: true }) as number);
  }

  /** Copies the content as it is now to another file, while other programs go on; a copy that is not sound is refused. */
  async copyTo(file: string): Promise<void> {
    try {
      await this.#db.backup(file);
    } catch (error) {
      throw storeFailure(file, this.#busyTimeoutMs, error);
    }
    if (!this.#told(() => isSound(file))) throw damaged(this.file, 'a copy of it fails the integrity check');
  }

  /** Writes the log of changes back into the file and removes it, unless another program still uses the file. */
  close(): void {
    this.#told(() => this.#db.close());
  }

  #told<T>(run: () => T): T {
    try {
      return run();
    } catch (error) {
      throw storeFailure(this.file, this.#busyTimeoutMs, error);
    }
  }
}

function isSound(file: string): boolean {
  const db = new Database(file, { readonly: true, fileMustExist: true });
  try {
    return db.pragma('integrity_check(1)', { simple: true }) === 'ok';
  } finally {
    db.close();
  }
}

interface Opened {
  readonly db: Database.Database;
  readonly migration?: MigrationReport | undefined;
}

function openDatabase(file: string, options: ConnectionOptions): Opened {
  const header = readProjectHeader(file);
  if (header === undefined) throw fileError(file, 'cannot be read: not found');
  const newest = options.migrations.at(-1)!.version;
  refuseNewer(file, header.schemaVersion, newest);
  const real = realPathOf(file);
  const version = sizeOf(`${real}-wal`) === 0 ? header.schemaVersion : loggedVersion(file, real);
  refuseNewer(file, version, newest);
  const barrier = writeBarrier(real);
  if (options.readOnly)
    return barrier || version < newest ? openInMemory(file, real, options) : openShared(real, options);
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
  try {
    db.pragma('journal_mode = WAL');
    // The default could lose the last writes in a power cut.
    db.pragma('synchronous = FULL');
    const migration = migrate(db, file, migrations, (content, version) => keepCopy(file, content, version));
    return { db, migration };
  } catch (error) {
    db.close();
    throw error;
  }
}

function keepCopy(file: string, content: Buffer, version: number): string {
  try {
    return writeNumbered(file, `before-${version}`, content);
  } catch (error) {
    const reason = fileFailure(file, 'written', error).message.slice(file.length + 2);
    throw fileError(file, `has tables of an earlier version; the copy kept before changing them ${reason}`, {
      cause: error,
    });
  }
}

function connect(real: string, busyTimeoutMs: number): Database.Database {
  const db = new Database(real, { fileMustExist: true, timeout: busyTimeoutMs });
  db.pragma('foreign_keys = ON');
  db.pragma('trusted_schema = OFF');
  db.pragma('cell_size_check = ON');
  return db;
}

/** A connection that could write is the one that clears the log away on closing; the pragma keeps it from changing data. */
function openShared(real: string, { busyTimeoutMs }: ConnectionOptions): Opened {
  const db = connect(real, busyTimeoutMs);
  db.pragma('query_only = ON');
  return { db };
}

function openInMemory(file: string, real: string, { busyTimeoutMs, migrations }: ConnectionOptions): Opened {
  const content = contentOf(file, real, busyTimeoutMs);
  // Bytes 18 and 19 ask for a log beside the file (file format, section 1.3); in memory there is none.
  content[18] = 1;
  content[19] = 1;
  const db = new Database(content);
  migrate(db, file, migrations, () => '');
  db.pragma('query_only = ON');
  return { db };
}

function contentOf(file: string, real: string, busyTimeoutMs: number): Buffer {
  if (sizeOf(`${real}-wal`) > 0) return withReader(file, real, busyTimeoutMs, (db) => db.serialize());
  try {
    return readFileSync(real);
  } catch (error) {
    throw fileFailure(file, 'read', error);
  }
}

const loggedVersion = (file: string, real: string): number => withReader(file, real, 0, schemaVersionOf);

/** For files with logged changes, without writing anything. */
function withReader<T>(file: string, real: string, timeout: number, run: (db: Database.Database) => T): T {
  let db: Database.Database | undefined;
  try {
    db = new Database(real, { readonly: true, fileMustExist: true, timeout });
    return run(db);
  } catch (error) {
    if (!(error instanceof Database.SqliteError) || !/CANTOPEN|READONLY/.test(error.code)) throw error;
    const text = `has changes in ${real}-wal that were not written back, and its folder is read-only. Open both where they can be written`;
    throw new AppError('file', `${file}: ${text}`, file, { cause: error });
  } finally {
    db?.close();
  }
}
