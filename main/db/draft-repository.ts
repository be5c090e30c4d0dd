import type { StoredDraft } from '../../app/project/draft.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { removeUnused } from './documents-repository.ts';
import { getParts, type PartHashes, putParts } from './parts-repository.ts';

interface DraftRow extends PartHashes {
  readonly version: number;
  readonly saved_at: string;
}

const rowOf = (db: ReadableDb): DraftRow | undefined => db.prepare<[], DraftRow>('SELECT * FROM draft').get();

/** Of the newest save; 0 before the first. */
export const draftVersion = (db: ReadableDb): number => rowOf(db)?.version ?? 0;

/** Undefined before the first save. Throws `DamagedDocument`. */
export function getDraft(db: ReadableDb): StoredDraft | undefined {
  const row = rowOf(db);
  return row && { version: row.version, savedAt: row.saved_at, ...getParts(db, row) };
}

/** In place of the draft before. */
export function putDraft(db: WritableDb, { version, savedAt, ...draft }: StoredDraft): void {
  const before = rowOf(db);
  db.prepare(
    `INSERT OR REPLACE INTO draft (id, version, saved_at, layout, sources, opening, settings)
     VALUES (1, @version, @savedAt, @layout, @sources, @opening, @settings)`,
  ).run({ version, savedAt, ...putParts(db, draft) });
  if (before)
    removeUnused(db, {
      layout: before.layout,
      sources: before.sources,
      opening: before.opening,
      settings: before.settings,
    });
}
