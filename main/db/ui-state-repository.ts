import { exactJson } from '../../app/project/exact-json.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { fromColumn, toColumn } from './text-column.ts';

/** Undefined for a key that was never put. */
export function getUiState(db: ReadableDb, key: string): unknown {
  const value = db.prepare<[string], string>('SELECT value FROM ui_state WHERE key = ?').pluck().get(toColumn(key));
  return value === undefined ? undefined : (JSON.parse(value) as unknown);
}

/** `undefined` removes the key. Throws `input` for what JSON cannot hold. */
export function putUiState(db: WritableDb, key: string, value: unknown): void {
  if (value === undefined) db.prepare('DELETE FROM ui_state WHERE key = ?').run(toColumn(key));
  else db.prepare('INSERT OR REPLACE INTO ui_state (key, value) VALUES (?, ?)').run(toColumn(key), exactJson(value));
}

/** All keys with their values, by key. */
export const listUiState = (db: ReadableDb): { key: string; value: unknown }[] =>
  db
    .prepare<[], { key: string; value: string }>('SELECT key, value FROM ui_state ORDER BY key')
    .all()
    .map(({ key, value }) => ({ key: fromColumn(key), value: JSON.parse(value) as unknown }));
