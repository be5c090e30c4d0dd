import { exactJson } from '../../app/project/exact-json.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { fromColumn, jsonOfColumn, soundRow, toColumn } from './text-column.ts';

/** Undefined for a key that was never put. */
export function getUiState(db: ReadableDb, key: string): unknown {
  const row = db.prepare<[string], { value: string }>('SELECT value FROM ui_state WHERE key = ?').get(toColumn(key));
  return row === undefined ? undefined : jsonOfColumn(soundRow(row).value);
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
    .map((row) => soundRow(row))
    .map(({ key, value }) => ({ key: fromColumn(key), value: jsonOfColumn(value) }));
