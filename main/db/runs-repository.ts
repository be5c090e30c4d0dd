import { type TrendPart, trendPartOf, trendRun } from '../../app/compare/trend-run.ts';
import type { TrendRun } from '../../app/compare/types.ts';
import type { EstimateResult, Verdict } from '../../app/estimate/result.ts';
import type { Draft } from '../../app/project/draft.ts';
import type { RunSummary, StoredRun } from '../../app/project/stored-run.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { getDocument, putDocument, removeUnused, unpacked } from './documents-repository.ts';
import { packJson } from './packed-json.ts';
import { getParts, type PartHashes, putParts } from './parts-repository.ts';
import { fromColumn, soundRow, toColumn } from './text-column.ts';

/** A finished run to be kept. */
export interface NewRun extends Draft {
  /** ISO 8601, UTC. */
  readonly startedAt: string;
  readonly result: EstimateResult;
  /** Of the computation. */
  readonly durationS: number;
  readonly note?: string;
}

export interface RunFilter {
  readonly revision?: string;
  /** At most so many, the newest. */
  readonly limit?: number;
}

interface RunRow extends PartHashes {
  readonly run: number;
  readonly started_at: string;
  readonly duration_s: number;
  readonly board: string;
  readonly revision: string;
  readonly result: string;
  readonly standard: string;
  readonly class: string;
  readonly distance_m: number;
  readonly required_margin_db: number;
  readonly structure: 'solved' | 'pair-only';
  readonly worst_frequency_hz: number | null;
  readonly worst_margin_db: number | null;
  readonly verdict: Verdict;
  readonly program_version: string;
  readonly note: string;
  /** `TrendPart`, packed: a trend must not need every result. */
  readonly trend: Buffer;
}

const NULLABLE = ['worst_frequency_hz', 'worst_margin_db'] as const;

const summaryOf = (row: RunRow): RunSummary => ({
  run: row.run,
  startedAt: row.started_at,
  board: fromColumn(row.board),
  revision: fromColumn(row.revision),
  layoutSha256: row.layout,
  sourcesSha256: row.sources,
  standard: fromColumn(row.standard),
  class: fromColumn(row.class),
  distanceM: row.distance_m,
  requiredMarginDb: row.required_margin_db,
  structure: row.structure,
  worst:
    row.worst_frequency_hz === null || row.worst_margin_db === null
      ? null
      : { frequencyHz: row.worst_frequency_hz, marginDb: row.worst_margin_db },
  verdict: row.verdict,
  programVersion: fromColumn(row.program_version),
  note: fromColumn(row.note),
});

/** What the list of runs shows of a result: the columns beside its block. */
export const summaryColumns = ({ board, limit, structure, worst, verdict, program }: EstimateResult) => ({
  board: toColumn(board.name),
  revision: toColumn(board.revision),
  standard: toColumn(limit.standard),
  class: toColumn(limit.class),
  distance_m: limit.distanceM,
  required_margin_db: limit.requiredMarginDb,
  structure,
  worst_frequency_hz: worst?.frequencyHz ?? null,
  worst_margin_db: worst?.marginDb ?? null,
  verdict,
  program_version: toColumn(program.version),
});

/** A run's row without what its result says. */
export interface RunEntry extends PartHashes {
  readonly run: number;
  readonly startedAt: string;
  readonly durationS: number;
  readonly note: string;
  readonly result: string;
}

export type SummaryColumns = ReturnType<typeof summaryColumns>;

/** Keeps a run under its number, with its documents. Throws `input` for what JSON cannot hold. */
export function insertRun(db: WritableDb, run: number, { startedAt, durationS, result, note, ...draft }: NewRun): void {
  const hashes = { ...putParts(db, draft), result: putDocument(db, 'result', result) };
  const entry = { run, startedAt, durationS, note: note ?? '', ...hashes };
  insertRunEntry(db, entry, summaryColumns(result), trendPartOf({ settings: draft.settings, result }));
}

/** A run whose documents are kept already. */
export function insertRunEntry(
  db: WritableDb,
  { startedAt, durationS, note, ...entry }: RunEntry,
  summary: SummaryColumns,
  trend: TrendPart,
): void {
  const own = { started_at: startedAt, duration_s: durationS, note: toColumn(note), trend: packJson(trend) };
  const row: RunRow = { ...entry, ...own, ...summary };
  const columns = Object.keys(row);
  const values = columns.map((column) => `@${column}`);
  db.prepare(`INSERT INTO run (${columns.join(', ')}) VALUES (${values.join(', ')})`).run(row);
}

/** All runs without what their results say, by number. */
export const listRunEntries = (db: ReadableDb): RunEntry[] =>
  db
    .prepare<[], RunEntry>(
      `SELECT run, started_at AS startedAt, duration_s AS durationS, note, layout, sources, opening, settings, result
       FROM run ORDER BY run`,
    )
    .all()
    .map((entry) => ({ ...soundRow(entry), note: fromColumn(entry.note) }));

/** What the columns say, by number: to be held against the results. */
export const listStoredSummaries = (db: ReadableDb): (SummaryColumns & Pick<RunRow, 'run' | 'result'>)[] =>
  db.prepare<[], RunRow>('SELECT * FROM run ORDER BY run').all();

/** Newest first: by number, as numbers only rise. */
export function listRuns(db: ReadableDb, { revision, limit }: RunFilter = {}): RunSummary[] {
  return db
    .prepare<[object], RunRow>(
      'SELECT * FROM run WHERE @revision IS NULL OR revision = @revision ORDER BY run DESC LIMIT @limit',
    )
    .all({ revision: revision === undefined ? null : toColumn(revision), limit: limit ?? -1 })
    .map((row) => summaryOf(soundRow(row, NULLABLE)));
}

/** Every run as a point of a trend, by number. Throws `DamagedDocument`. */
export const listTrendRuns = (db: ReadableDb): TrendRun[] =>
  db
    .prepare<[], RunRow>('SELECT * FROM run ORDER BY run')
    .all()
    .map((row) => {
      const summary = summaryOf(soundRow(row, NULLABLE));
      return trendRun(summary, unpacked(`trend of run ${row.run}`, row.trend) as TrendPart);
    });

const rowOf = (db: ReadableDb, run: number): RunRow | undefined =>
  db.prepare<[number], RunRow>('SELECT * FROM run WHERE run = ?').get(run);

/** Undefined when there is no such run. Throws `DamagedDocument`. */
export function getRun(db: ReadableDb, run: number): StoredRun | undefined {
  const row = rowOf(db, run);
  if (row === undefined) return undefined;
  return {
    ...summaryOf(soundRow(row, NULLABLE)),
    durationS: row.duration_s,
    ...getParts(db, row),
    result: getDocument(db, 'result', row.result) as EstimateResult,
  };
}

/** Numbers of all runs, rising. */
export const runNumbers = (db: ReadableDb): number[] =>
  db.prepare<[], number>('SELECT run FROM run ORDER BY run').pluck().all();

/** False when there is no such run. */
export const updateNote = (db: WritableDb, run: number, note: string): boolean =>
  db.prepare('UPDATE run SET note = ? WHERE run = ?').run(toColumn(note), run).changes > 0;

/** Removes a run and the documents only it named; false when there is no such run. */
export function removeRun(db: WritableDb, run: number): boolean {
  const row = rowOf(db, run);
  if (row === undefined) return false;
  db.prepare('DELETE FROM run WHERE run = ?').run(run);
  const { layout, sources, opening, settings, result } = row;
  removeUnused(db, { layout, sources, opening, settings, result });
  return true;
}
