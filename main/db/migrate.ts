import type Database from 'better-sqlite3';
import { AppError } from '../../app/errors.ts';

export interface Migration {
  readonly version: number;
  readonly name: string;
  readonly up: (db: Database.Database) => void;
}

/** What was done to a file on opening it. */
export interface MigrationReport {
  readonly fromVersion: number;
  readonly toVersion: number;
  /** Where the file as it was before is kept. */
  readonly copy: string;
}

export const schemaVersionOf = (db: Database.Database): number => db.pragma('user_version', { simple: true }) as number;

/** Throws `newer-project` when the tables are of a later program. */
export function refuseNewer(file: string, version: number, newest: number): void {
  if (version <= newest) return;
  const text = `${file}: was written by a newer version of this program (tables of version ${version}; this one knows up to ${newest}). Update the program to open it. Nothing was changed.`;
  throw new AppError('newer-project', text, file);
}

/**
 * Brings the tables to the newest version: all pending steps in one transaction, after `keepCopy` has kept the file's
 * content as it was; when either fails the file stays as it was. Returns undefined when nothing was pending.
 * Throws `newer-project`; Error when the list does not rise strictly.
 */
export function migrate(
  db: Database.Database,
  file: string,
  steps: readonly Migration[],
  keepCopy: (content: Buffer, version: number) => string,
): MigrationReport | undefined {
  refuseDisorder(steps);
  const newest = steps.at(-1)?.version ?? 0;
  refuseNewer(file, schemaVersionOf(db), newest);
  if (schemaVersionOf(db) === newest) return undefined;
  return db
    .transaction((): MigrationReport | undefined => {
      // Another program may have been faster.
      const version = schemaVersionOf(db);
      const pending = steps.filter((step) => step.version > version);
      if (pending.length === 0) return undefined;
      const copy = keepCopy(db.serialize(), version);
      for (const step of pending) step.up(db);
      db.pragma(`user_version = ${newest}`);
      return { fromVersion: version, toVersion: newest, copy };
    })
    .immediate();
}

function refuseDisorder(steps: readonly Migration[]): void {
  for (const [i, { version, name }] of steps.entries()) {
    const before = steps[i - 1]?.version ?? 0;
    if (!Number.isInteger(version) || version <= before) {
      throw new Error(`migration ${name} must have a version above ${before}; it has ${version}`);
    }
  }
}
