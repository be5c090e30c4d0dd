import { fileFailure } from '../files/file-failure.ts';
import type { WritableDb } from './database.ts';
import { migrate } from './migrate.ts';
import { migrations } from './migrations/migrations.ts';
import { newDatabase } from './new-database.ts';
import { placeNew, removeTemporary, targetOf, temporaryBeside } from './place-file.ts';
import { APPLICATION_ID } from './project-header.ts';
import { storeFailure } from './store-failure.ts';

/**
 * Makes a project file, whole or not at all, with what `fill` puts into it; false when the name is taken.
 * Throws `file`, and what `fill` throws.
 */
export function createProjectFile(file: string, fill: (db: WritableDb) => void): boolean {
  const target = targetOf(file);
  const temporary = temporaryBeside(target);
  try {
    const db = newDatabase(temporary);
    try {
      db.pragma(`application_id = ${APPLICATION_ID}`);
      db.pragma('journal_mode = WAL');
      migrate(db, file, migrations, () => '');
      db.transaction(() => {
        // Documents may come after what names them.
        db.pragma('defer_foreign_keys = ON');
        fill(db as WritableDb);
      }).immediate();
    } finally {
      db.close();
    }
    return placeNew(temporary, target);
  } catch (error) {
    const failure = storeFailure(file, 0, error);
    throw failure === error && isSystemFailure(error) ? fileFailure(file, 'written', error) : failure;
  } finally {
    removeTemporary(temporary);
  }
}

const isSystemFailure = (error: unknown): boolean =>
  (error as NodeJS.ErrnoException | undefined)?.syscall !== undefined;
