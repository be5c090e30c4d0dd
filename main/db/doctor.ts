import Database from 'better-sqlite3';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { DoctorFinding } from '../../app/project/project-info.ts';
import { DamagedDocument } from './damaged-document.ts';
import type { ReadableDb } from './database.ts';
import {
  countOrphans,
  DOCUMENT_TABLES,
  type DocumentTable,
  documentSha256,
  documentSha256s,
  getDocument,
} from './documents-repository.ts';
import { getDraft } from './draft-repository.ts';
import { getProject } from './info-repository.ts';
import { listMeasurements } from './measurements-repository.ts';
import { listStoredSummaries, listTrendRuns, type SummaryColumns, summaryColumns } from './runs-repository.ts';

/** Things amiss that a finding names; the rest is counted. */
const MOST_NAMED = 5;

/** Looks at everything in a project: structure of the file, every document, every run. Nothing is changed. */
export function examine(db: ReadableDb): DoctorFinding[] {
  /** What each sound result says. */
  const results = new Map<string, SummaryColumns>();
  return [
    finding('integrity', 'the structure of the file is sound', () => integrityComplaints(db)),
    finding('links', 'every run finds its documents', () => brokenLinks(db)),
    finding('documents', 'every document unpacks and is the one that was written', () =>
      DOCUMENT_TABLES.flatMap((table) => damagedDocuments(db, table, results)),
    ),
    finding('runs', 'the list of runs says what the results say', () => wrongSummaries(db, results)),
    finding('trend', 'the part of every run in the trend unpacks', () => complaintsOf(() => listTrendRuns(db))),
    finding('numbers', 'no number can be given twice', () => wrongNumbers(db)),
    finding('measurements', 'every measurement unpacks', () => complaintsOf(() => listMeasurements(db))),
    finding('draft', 'the draft unpacks', () => complaintsOf(() => getDraft(db))),
    finding('leftovers', 'no document is without a use', () => {
      const orphans = countOrphans(db);
      return orphans === 0 ? [] : [`${orphans} documents that nothing names take space`];
    }),
  ];
}

/** `look` returns what is amiss; that it cannot look is amiss, too. */
function finding(code: string, fine: string, look: () => string[]): DoctorFinding {
  let complaints: string[] = [];
  const failure = complaintsOf(() => {
    complaints = look();
  });
  complaints.push(...failure);
  if (complaints.length === 0) return { code, isFine: true, message: fine };
  const more = complaints.length > MOST_NAMED ? [`… and ${complaints.length - MOST_NAMED} more`] : [];
  return { code, isFine: false, message: [...complaints.slice(0, MOST_NAMED), ...more].join('; ') };
}

function complaintsOf(look: () => unknown): string[] {
  try {
    look();
    return [];
  } catch (error) {
    if (error instanceof DamagedDocument || error instanceof Database.SqliteError) return [error.message];
    throw error;
  }
}

function integrityComplaints(db: ReadableDb): string[] {
  const lines = (db.pragma('integrity_check') as { integrity_check: string }[]).map((row) => row.integrity_check);
  if (lines.length === 1 && lines[0] === 'ok') return [];
  // The first one is headed by the database's name, and may have several lines.
  return lines.flatMap((text) => text.split('\n')).filter((line) => !line.startsWith('*** in database'));
}

const brokenLinks = (db: ReadableDb): string[] =>
  (db.pragma('foreign_key_check') as { table: string; rowid: number | null; parent: string }[]).map(
    ({ table, rowid, parent }) => `${table} ${rowid ?? ''} names a ${parent} that is not there`,
  );

function damagedDocuments(db: ReadableDb, table: DocumentTable, results: Map<string, SummaryColumns>): string[] {
  return documentSha256s(db, table).flatMap((sha256) =>
    complaintsOf(() => {
      const document = getDocument(db, table, sha256);
      if (documentSha256(table, document) !== sha256) {
        throw new DamagedDocument(`${table} ${sha256.slice(0, 12)} is not the one its hash says`);
      }
      if (table === 'result') results.set(sha256, summaryColumns(document as EstimateResult));
    }),
  );
}

/** Runs whose results are damaged have been told already. */
function wrongSummaries(db: ReadableDb, results: ReadonlyMap<string, SummaryColumns>): string[] {
  return listStoredSummaries(db).flatMap(({ run, result, ...stored }) => {
    const said = results.get(result);
    if (said === undefined) return [];
    const wrong = (Object.keys(said) as (keyof SummaryColumns)[]).filter((column) => said[column] !== stored[column]);
    return wrong.length === 0 ? [] : [`run ${run}: ${wrong.join(', ')} not as in its result`];
  });
}

function wrongNumbers(db: ReadableDb): string[] {
  const { lastRun, lastMeasurement } = getProject(db);
  const most = (table: string, column: string) =>
    db.prepare<[], number>(`SELECT coalesce(max(${column}), 0) FROM ${table}`).pluck().get()!;
  return [
    ...(most('run', 'run') > lastRun ? ['the last run has a higher number than the project knows'] : []),
    ...(most('measurement', 'id') > lastMeasurement
      ? ['a measurement has a higher number than the project knows']
      : []),
  ];
}
