import Database from 'better-sqlite3';
import type { ReadableDb } from './database.ts';
import { migrate } from './migrate.ts';
import { migrations } from './migrations/migrations.ts';

/** Every table and index as SQL, by name. */
export function schemaText(db: ReadableDb): string {
  const statements = db
    .prepare<[], string>('SELECT sql FROM sqlite_schema WHERE sql IS NOT NULL ORDER BY type DESC, name')
    .pluck()
    .all();
  return `${statements.join(';\n\n')};\n`;
}

/** The tables this version makes. */
export function newestSchemaText(): string {
  const db = new Database(':memory:');
  try {
    migrate(db, 'new project', migrations, () => '');
    return schemaText(db as ReadableDb);
  } finally {
    db.close();
  }
}
