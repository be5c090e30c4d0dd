import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { describe, expect, it } from 'vitest';
import { ProjectConnection } from '../../../main/db/connection.ts';
import { type Migration, migrate } from '../../../main/db/migrate.ts';
import { migrations, SCHEMA_VERSION } from '../../../main/db/migrations/migrations.ts';
import { Project } from '../../../main/db/project.ts';
import { madeBy, schemaStatements } from '../../../main/db/schema-text.ts';
import { appFailure } from '../../support/app-failure.ts';
import { sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

/** Invented steps after those that shipped. */
const addColour: Migration = {
  version: SCHEMA_VERSION + 10,
  name: 'add-colour',
  up: (db) => void db.exec("ALTER TABLE run ADD COLUMN colour TEXT NOT NULL DEFAULT 'grey'"),
};
const markRuns: Migration = {
  version: SCHEMA_VERSION + 20,
  name: 'mark-runs',
  up: (db) => void db.exec("UPDATE run SET colour = 'run ' || run"),
};
const failing: Migration = {
  version: SCHEMA_VERSION + 30,
  name: 'failing',
  up: (db) => {
    db.exec("UPDATE run SET colour = 'half'");
    db.exec('ALTER TABLE missing ADD COLUMN x TEXT');
  },
};
const laterSteps = [...migrations, addColour, markRuns];

function projectFile(): string {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun('a'));
  project.addRun(sampleRun('b'));
  project.close();
  return project.file;
}

const open = (file: string, steps: readonly Migration[], readOnly = false) =>
  new ProjectConnection(file, { readOnly, busyTimeoutMs: 200, migrations: steps });
const colours = (connection: ProjectConnection) =>
  connection.read((db) => db.prepare('SELECT run, colour FROM run ORDER BY run').raw().all());
const namesBeside = (file: string) => readdirSync(join(file, '..')).sort();

describe('a file of an earlier version', () => {
  it('is brought to the newest, its rows kept, after a copy that opens as before', () => {
    const file = projectFile();
    const before = readFileSync(file);
    const connection = open(file, laterSteps);
    expect(colours(connection)).toEqual([
      [1, 'run 1'],
      [2, 'run 2'],
    ]);
    const copy = join(file, '..', `board.before-${SCHEMA_VERSION}.quietboard`);
    expect(connection.migration).toEqual({ fromVersion: SCHEMA_VERSION, toVersion: SCHEMA_VERSION + 20, copy });
    connection.close();
    expect(readFileSync(copy).equals(before)).toBe(true);
    expect(namesBeside(file)).toEqual([`board.before-${SCHEMA_VERSION}.quietboard`, 'board.quietboard']);
    expect(open(file, laterSteps).migration).toBeUndefined();
    const old = Project.open(copy);
    expect(old.runs()).toHaveLength(2);
    old.close();
  });

  it('a copy never takes the name of another file', () => {
    const file = projectFile();
    const taken = join(file, '..', `board.before-${SCHEMA_VERSION}.quietboard`);
    writeFileSync(taken, 'mine');
    const connection = open(file, laterSteps);
    expect(connection.migration?.copy).toBe(join(file, '..', `board.before-${SCHEMA_VERSION}-2.quietboard`));
    expect(readFileSync(taken, 'utf8')).toBe('mine');
    connection.close();
  });

  it('for reading only is read in memory; the file stays as it is', () => {
    const file = projectFile();
    const before = readFileSync(file);
    const connection = open(file, laterSteps, true);
    expect(colours(connection)).toEqual([
      [1, 'run 1'],
      [2, 'run 2'],
    ]);
    connection.close();
    expect(readFileSync(file).equals(before)).toBe(true);
    expect(namesBeside(file)).toEqual(['board.quietboard']);
  });

  it('a failing step leaves the file as it was', () => {
    const file = projectFile();
    const before = readFileSync(file);
    expect(() => open(file, [...laterSteps, failing])).toThrow('no such table: missing');
    expect(readFileSync(file).equals(before)).toBe(true);
    expect(namesBeside(file)).toEqual(['board.quietboard']);
    const project = Project.open(file);
    expect(project.doctor().isFine).toBe(true);
    expect(project.runs()).toHaveLength(2);
    project.close();
  });

  it('waits for no reader, and says when another program is writing; the file stays as it is', () => {
    const file = projectFile();
    const other = new Database(file);
    other.exec('BEGIN IMMEDIATE');
    let copies = 0;
    const db = new Database(file, { timeout: 50 });
    const steps = [...migrations, addColour];
    expect(() => migrate(db, file, steps, () => `copy ${++copies}`)).toThrow('database is locked');
    // The lock comes first: a copy that another program could outdate is not made.
    expect(copies).toBe(0);
    other.exec('ROLLBACK');
    other.close();
    expect(migrate(db, file, steps, () => `copy ${++copies}`)?.copy).toBe('copy 1');
    db.close();
  });

  it('steps that another program has done meanwhile are not done again', () => {
    const file = projectFile();
    const first = new Database(file);
    let copies = 0;
    const seenBy = (steps: readonly Migration[]) => migrate(first, file, steps, () => `copy ${++copies}`);
    open(file, laterSteps).close();
    expect(seenBy(laterSteps)).toBeUndefined();
    expect(copies).toBe(0);
    first.close();
  });
});

describe('a file of a later version', () => {
  it('is refused and stays as it is, for writing and for reading', () => {
    const file = projectFile();
    open(file, laterSteps).close();
    const before = readFileSync(file);
    for (const readOnly of [false, true]) {
      const { code, message } = appFailure(() => Project.open(file, { readOnly }));
      expect(code).toBe('newer-project');
      expect(message).toContain(`tables of version ${SCHEMA_VERSION + 20}; this one knows up to ${SCHEMA_VERSION}`);
    }
    expect(readFileSync(file).equals(before)).toBe(true);
    expect(namesBeside(file)).toEqual([`board.before-${SCHEMA_VERSION}.quietboard`, 'board.quietboard']);
  });

  it('even while its new version is still in the log of changes', () => {
    const file = projectFile();
    const newer = open(file, laterSteps);
    // The connection stays open: nothing has been written back.
    expect(readFileSync(file).readUInt32BE(60)).toBe(SCHEMA_VERSION);
    const before = readFileSync(file);
    expect(appFailure(() => Project.open(file)).code).toBe('newer-project');
    expect(readFileSync(file).equals(before)).toBe(true);
    newer.close();
  });
});

describe('the list of steps', () => {
  it.each([
    ['falls', [addColour, { ...markRuns, version: 5 }]],
    ['repeats a version', [addColour, { ...markRuns, version: addColour.version }]],
    ['begins at zero', [{ ...addColour, version: 0 }]],
    ['has a broken version', [{ ...addColour, version: 1.5 }]],
  ])('is refused when it %s', (_, steps) => {
    const db = new Database(':memory:');
    expect(() => migrate(db, 'x', steps, () => '')).toThrow(/must have a version above/);
    db.close();
  });

  it('makes the tables of schema.sql', () => {
    const statements = madeBy(migrations).map((sql) => `${sql};\n`);
    expect(statements.join('\n')).toBe(readFileSync('main/db/schema.sql', 'utf8'));
  });

  it('every table is STRICT', () => {
    const tables = madeBy(migrations).filter((sql) => sql.startsWith('CREATE TABLE'));
    expect(tables.length).toBeGreaterThan(10);
    for (const sql of tables) expect(sql).toMatch(/\) STRICT(, WITHOUT ROWID)?$/);
  });

  it('a project that is made has just these tables', () => {
    const connection = open(projectFile(), migrations);
    expect(connection.read(schemaStatements)).toEqual(madeBy(migrations));
    connection.close();
  });
});
