import { createHash } from 'node:crypto';
import { canonicalJson, exactJson, sortedKeys } from '../../app/project/exact-json.ts';
import { DamagedDocument } from './damaged-document.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { packJson, unpackJson } from './packed-json.ts';
import { soundRow } from './text-column.ts';

/** Tables of documents that are kept once, however many runs name them. */
export const DOCUMENT_TABLES = ['layout', 'sources', 'samples', 'opening', 'settings', 'result'] as const;
export type DocumentTable = (typeof DOCUMENT_TABLES)[number];

/**
 * Results keep the order of their keys (reports list contributions as they come); the others are sorted, so that equal
 * documents have equal hashes.
 */
const isSorted = (table: DocumentTable): boolean => table !== 'result';

/** SHA-256 of the document's exact JSON, hexadecimal. */
export function documentSha256(table: DocumentTable, document: unknown): string {
  const text = isSorted(table) ? canonicalJson(document) : exactJson(document);
  return createHash('sha256').update(text).digest('hex');
}

/** Keeps a document unless it is there; returns its hash. Throws `input` for what JSON cannot hold. */
export function putDocument(db: WritableDb, table: DocumentTable, document: unknown): string {
  const sha256 = documentSha256(table, document);
  const isThere = db.prepare(`SELECT 1 FROM ${table} WHERE sha256 = ?`).get(sha256) !== undefined;
  if (!isThere) {
    const body = packJson(isSorted(table) ? sortedKeys(document) : document);
    db.prepare(`INSERT INTO ${table} (sha256, body) VALUES (?, ?)`).run(sha256, body);
  }
  return sha256;
}

/** Throws `DamagedDocument`. */
export function getDocument(db: ReadableDb, table: DocumentTable, sha256: string): unknown {
  const row = db.prepare<[string], { body: Buffer }>(`SELECT body FROM ${table} WHERE sha256 = ?`).get(sha256);
  if (row === undefined) throw new DamagedDocument(`${table} ${sha256.slice(0, 12)} is missing`);
  return unpacked(`${table} ${sha256.slice(0, 12)}`, row.body);
}

export const documentSha256s = (db: ReadableDb, table: DocumentTable): string[] =>
  db
    .prepare<[], { sha256: string }>(`SELECT sha256 FROM ${table} ORDER BY sha256`)
    .all()
    .map((row) => soundRow(row).sha256);

/** Throws `DamagedDocument` that names the block. */
export function unpacked(name: string, body: Uint8Array): unknown {
  try {
    return unpackJson(body);
  } catch (error) {
    // Whatever fails in unpacking, the reason is the block.
    throw new DamagedDocument(`${name} ${(error as Error).message}`, { cause: error });
  }
}

/** Rows that name a document of a table. */
const REFERENCES: Readonly<Record<DocumentTable, readonly (readonly [table: string, column: string])[]>> = {
  layout: [
    ['run', 'layout'],
    ['draft', 'layout'],
  ],
  sources: [
    ['run', 'sources'],
    ['draft', 'sources'],
  ],
  opening: [
    ['run', 'opening'],
    ['draft', 'opening'],
  ],
  settings: [
    ['run', 'settings'],
    ['draft', 'settings'],
  ],
  result: [['run', 'result']],
  samples: [['sources_samples', 'samples']],
};

const orphanCondition = (table: DocumentTable): string =>
  REFERENCES[table]
    .map(([from, column]) => `NOT EXISTS (SELECT 1 FROM ${from} WHERE ${from}.${column} = ${table}.sha256)`)
    .join(' AND ');

/** Removes those of the given documents that nothing names any more, and waveform files that no sources name. */
export function removeUnused(db: WritableDb, sha256s: Partial<Readonly<Record<DocumentTable, string>>>): void {
  for (const table of DOCUMENT_TABLES) {
    const sha256 = sha256s[table];
    if (sha256 === undefined) continue;
    db.prepare(`DELETE FROM ${table} WHERE sha256 = ? AND ${orphanCondition(table)}`).run(sha256);
  }
  db.prepare(`DELETE FROM samples WHERE ${orphanCondition('samples')}`).run();
}

/** Documents that nothing names. */
export function countOrphans(db: ReadableDb): number {
  const count = (table: DocumentTable) =>
    db
      .prepare<[], number>(`SELECT count(*) FROM ${table} WHERE ${orphanCondition(table)}`)
      .pluck()
      .get()!;
  return DOCUMENT_TABLES.reduce((sum, table) => sum + count(table), 0);
}
