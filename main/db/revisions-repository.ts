import type { RevisionSummary, SetupMargins } from '../../app/project/project-info.ts';
import type { ReadableDb } from './database.ts';
import { fromColumn, soundRow } from './text-column.ts';

interface SetupRow {
  readonly board: string;
  readonly revision: string;
  readonly layout: string;
  readonly standard: string;
  readonly class: string;
  readonly distance_m: number;
  readonly structure: 'solved' | 'pair-only';
  readonly runs: number;
  readonly first_run: number;
  readonly last_run: number;
  readonly first_started_at: string;
  readonly last_started_at: string;
  readonly last_margin_db: number | null;
  readonly lowest_margin_db: number | null;
}

const NULLABLE = ['last_margin_db', 'lowest_margin_db'] as const;

/** By the first run of each: the order in which the board was changed. */
export function listRevisions(db: ReadableDb): RevisionSummary[] {
  const rows = db
    .prepare<[], SetupRow>(
      `SELECT summary.*, first.started_at AS first_started_at, last.started_at AS last_started_at,
              last.worst_margin_db AS last_margin_db
       FROM (
         SELECT board, revision, layout, standard, class, distance_m, structure, count(*) AS runs,
                min(run) AS first_run, max(run) AS last_run, min(worst_margin_db) AS lowest_margin_db
         FROM run GROUP BY board, revision, layout, standard, class, distance_m, structure
       ) AS summary
       JOIN run AS first ON first.run = summary.first_run
       JOIN run AS last ON last.run = summary.last_run
       ORDER BY summary.first_run`,
    )
    .all();
  const revisions = new Map<string, SetupRow[]>();
  for (const row of rows) {
    soundRow(row, NULLABLE);
    const key = JSON.stringify([row.board, row.revision, row.layout]);
    const setups = revisions.get(key);
    if (setups) setups.push(row);
    else revisions.set(key, [row]);
  }
  return [...revisions.values()].map(revisionOf);
}

/** `setups` by first run. */
function revisionOf(setups: readonly SetupRow[]): RevisionSummary {
  const first = setups[0]!;
  const last = setups.reduce((newest, setup) => (setup.last_run > newest.last_run ? setup : newest));
  return {
    board: fromColumn(first.board),
    revision: fromColumn(first.revision),
    layoutSha256: first.layout,
    firstRun: first.first_run,
    lastRun: last.last_run,
    firstStartedAt: first.first_started_at,
    lastStartedAt: last.last_started_at,
    runs: setups.reduce((sum, { runs }) => sum + runs, 0),
    setups: setups.map(marginsOf),
  };
}

const marginsOf = (row: SetupRow): SetupMargins => ({
  standard: fromColumn(row.standard),
  class: fromColumn(row.class),
  distanceM: row.distance_m,
  structure: row.structure,
  runs: row.runs,
  lastRun: row.last_run,
  lastMarginDb: row.last_margin_db,
  lowestMarginDb: row.lowest_margin_db,
});
