import Database from 'better-sqlite3';
import { fileError } from '../../app/errors.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import type { MigrationReport } from './migrate.ts';
import { newDatabase } from './new-database.ts';
import { type ConnectionOptions, openDatabase } from './open-database.ts';
import { damaged, isDamage, storeFailure } from './store-failure.ts';

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
    try {
      const { db, migration } = openDatabase(file, options);
      this.#db = db;
      this.migration = migration;
    } catch (error) {
      throw storeFailure(file, options.busyTimeoutMs, error);
    }
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

  /**
   * Copies the content as it is now to another file, while other programs go on. Throws `file` when the copy is not sound, and
   * what SQLite says of the other file.
   */
  async copyTo(file: string): Promise<void> {
    try {
      await this.#db.backup(file);
    } catch (error) {
      const isOwn = error instanceof Database.SqliteError && isDamage(error.code);
      throw isOwn ? storeFailure(this.file, this.#busyTimeoutMs, error) : error;
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
  const db = newDatabase(file, { readonly: true, fileMustExist: true });
  try {
    return db.pragma('integrity_check(1)', { simple: true }) === 'ok';
  } finally {
    db.close();
  }
}
