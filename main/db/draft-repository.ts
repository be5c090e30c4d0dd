import type { StoredDraft } from '../../app/project/draft.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { removeUnused } from './documents-repository.ts';
import { getParts, type PartHashes, putParts } from './parts-repository.ts';
import { soundRow } from './text-column.ts';

type DraftRow = Pick<StoredDraft, 'version' | 'savedAt'> & PartHashes;

/** Undefined before the first save. */
export function draftRow(db: ReadableDb): DraftRow | undefined {
  const row = db
    .prepare<[], DraftRow>('SELECT version, saved_at AS savedAt, layout, sources, opening, settings FROM draft')
    .get();
  return row && soundRow(row);
}

/** Of the newest save; 0 before the first. */
export const draftVersion = (db: ReadableDb): number => draftRow(db)?.version ?? 0;

/** Undefined before the first save. Throws `DamagedDocument`. */
export function getDraft(db: ReadableDb): StoredDraft | undefined {
  const row = draftRow(db);
  return row && { version: row.version, savedAt: row.savedAt, ...getParts(db, row) };
}

/** In place of the draft before. */
export function putDraft(db: WritableDb, { version, savedAt, ...draft }: StoredDraft): void {
  const before = draftRow(db);
  putDraftRow(db, { version, savedAt, ...putParts(db, draft) });
  if (before === undefined) return;
  const { layout, sources, opening, settings } = before;
  removeUnused(db, { layout, sources, opening, settings });
}

export function putDraftRow(db: WritableDb, row: DraftRow): void {
  db.prepare(
    `INSERT OR REPLACE INTO draft (id, version, saved_at, layout, sources, opening, settings)
     VALUES (1, @version, @savedAt, @layout, @sources, @opening, @settings)`,
  ).run(row);
}
