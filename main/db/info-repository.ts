import type { ProjectInfo } from '../../app/project/project-info.ts';
import { DamagedDocument } from './damaged-document.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { schemaVersionOf } from './migrate.ts';
import { fromColumn, soundRow, toColumn } from './text-column.ts';

/** What a new project is told about itself; numbers given so far count as used. */
export interface NewProject {
  readonly name: string;
  readonly createdAt: string;
  readonly createdBy: string;
  readonly writtenBy: string;
  readonly lastRun: number;
  readonly lastMeasurement: number;
}

interface ProjectRow {
  readonly name: string;
  readonly created_at: string;
  readonly created_by: string;
  readonly written_by: string;
  readonly last_run: number;
  readonly last_measurement: number;
}

export function insertProject(db: WritableDb, project: NewProject): void {
  db.prepare(
    `INSERT INTO project (id, name, created_at, created_by, written_by, last_run, last_measurement)
     VALUES (1, ?, ?, ?, ?, ?, ?)`,
  ).run(
    toColumn(project.name),
    project.createdAt,
    toColumn(project.createdBy),
    toColumn(project.writtenBy),
    project.lastRun,
    project.lastMeasurement,
  );
}

export function getProject(db: ReadableDb): NewProject {
  const row = db.prepare<[], ProjectRow>('SELECT * FROM project').get();
  if (row === undefined) throw new DamagedDocument('the project has no name');
  soundRow(row);
  return {
    name: fromColumn(row.name),
    createdAt: row.created_at,
    createdBy: fromColumn(row.created_by),
    writtenBy: fromColumn(row.written_by),
    lastRun: row.last_run,
    lastMeasurement: row.last_measurement,
  };
}

export function getInfo(db: ReadableDb): ProjectInfo {
  const { name, createdAt, createdBy, writtenBy } = getProject(db);
  const count = (table: 'run' | 'measurement') =>
    db.prepare<[], number>(`SELECT count(*) FROM ${table}`).pluck().get()!;
  return {
    name,
    createdAt,
    createdBy,
    writtenBy,
    schemaVersion: schemaVersionOf(db),
    runs: count('run'),
    measurements: count('measurement'),
  };
}

export function updateName(db: WritableDb, name: string): void {
  db.prepare('UPDATE project SET name = ?').run(toColumn(name));
}

export function updateWriter(db: WritableDb, version: string): void {
  db.prepare('UPDATE project SET written_by = @version WHERE written_by <> @version').run({
    version: toColumn(version),
  });
}

/** The next number of its kind: never one that was given before, even if what had it was deleted. */
export function nextNumber(db: WritableDb, kind: 'run' | 'measurement'): number {
  const number = db
    .prepare<[], number>(`UPDATE project SET last_${kind} = last_${kind} + 1 RETURNING last_${kind}`)
    .pluck()
    .get();
  if (number === undefined) throw new DamagedDocument('the project has no name');
  return number;
}
