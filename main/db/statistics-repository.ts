import type { DoctorReport } from '../../app/project/project-info.ts';
import type { ReadableDb } from './database.ts';
import { DOCUMENT_TABLES } from './documents-repository.ts';
import { getProject } from './info-repository.ts';
import { schemaVersionOf } from './migrate.ts';

type Statistics = Omit<DoctorReport, 'file' | 'isFine' | 'findings'>;

/** Versions, sizes and counts. */
export function getStatistics(db: ReadableDb): Statistics {
  const { createdBy, writtenBy } = getProject(db);
  const pragma = (name: string) => db.pragma(name, { simple: true }) as number;
  const count = (table: string) => db.prepare<[], number>(`SELECT count(*) FROM ${table}`).pluck().get()!;
  const tables = ['run', ...DOCUMENT_TABLES, 'measurement', 'ui_state', 'draft'];
  return {
    schemaVersion: schemaVersionOf(db),
    sqliteVersion: db.prepare<[], string>('SELECT sqlite_version()').pluck().get()!,
    createdBy,
    writtenBy,
    sizeBytes: pragma('page_count') * pragma('page_size'),
    freeBytes: pragma('freelist_count') * pragma('page_size'),
    counts: Object.fromEntries(tables.map((table) => [table, count(table)])),
  };
}
