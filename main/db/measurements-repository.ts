import type { Measurement } from '../../app/project/measurement.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { unpacked } from './documents-repository.ts';
import { packJson } from './packed-json.ts';
import { fromColumn, soundRow, toColumn } from './text-column.ts';

interface MeasurementRow {
  readonly id: number;
  readonly name: string;
  readonly revision: string;
  readonly source: string;
  readonly points: Buffer;
}

export function insertMeasurement(db: WritableDb, { id, name, revision, source, points }: Measurement): void {
  db.prepare('INSERT INTO measurement (id, name, revision, source, points) VALUES (?, ?, ?, ?, ?)').run(
    id,
    toColumn(name),
    toColumn(revision),
    toColumn(source),
    packJson(points),
  );
}

/** In the order they were added. Throws `DamagedDocument`. */
export const listMeasurements = (db: ReadableDb): Measurement[] =>
  db
    .prepare<[], MeasurementRow>('SELECT * FROM measurement ORDER BY id')
    .all()
    .map((row) => soundRow(row))
    .map(({ id, name, revision, source, points }) => ({
      id,
      name: fromColumn(name),
      revision: fromColumn(revision),
      source: fromColumn(source),
      points: unpacked(`measurement ${id}`, points) as Measurement['points'],
    }));

/** False when there is no such measurement. */
export const removeMeasurement = (db: WritableDb, id: number): boolean =>
  db.prepare('DELETE FROM measurement WHERE id = ?').run(id).changes > 0;
