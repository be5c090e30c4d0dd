import type { ReadableDb } from './database.ts';
import { type Migration, migrate } from './migrate.ts';
import { newDatabase } from './new-database.ts';

/** Every table and index as SQL: tables first, by name. */
export const schemaStatements = (db: ReadableDb): string[] =>
  db.prepare<[], string>('SELECT sql FROM sqlite_schema WHERE sql IS NOT NULL ORDER BY type DESC, name').pluck().all();

/** The tables that the steps make of nothing. */
export function madeBy(steps: readonly Migration[]): string[] {
  const db = newDatabase(':memory:');
  try {
    migrate(db, 'new project', steps, () => '');
    return schemaStatements(db as ReadableDb);
  } finally {
    db.close();
  }
}
