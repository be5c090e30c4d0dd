import { join } from 'node:path';
import Database from 'better-sqlite3';
import { expect, it } from 'vitest';
import { packJson } from '../../../main/db/packed-json.ts';
import { Project } from '../../../main/db/project.ts';
import { resultOf, SETTINGS, sampleDocument, sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

/** A project with everything in it, changed behind the program's back. */
function changedProject(change: (db: Database.Database) => void): Project {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun('a'));
  project.addRun(sampleRun('b', { result: resultOf(sampleDocument('b'), { notes: ['another'] }) }));
  project.saveDraft({ document: sampleDocument('c'), settings: SETTINGS }, 0);
  const points = [{ frequencyHz: 1e8, levelDbuvPerM: 30, detector: 'peak' as const }];
  project.addMeasurement({ name: 'm', revision: 'A', source: '', points });
  project.close();
  const db = new Database(project.file);
  db.pragma('foreign_keys = OFF');
  change(db);
  db.close();
  return Project.open(project.file);
}

const complaints = (project: Project) =>
  project
    .doctor()
    .findings.filter(({ isFine }) => !isFine)
    .map(({ code, message }) => `${code}: ${message}`);

it('a sound project: every finding is fine, with versions, sizes and counts', () => {
  const project = changedProject(() => undefined);
  const report = project.doctor();
  expect(complaints(project)).toEqual([]);
  expect(report).toMatchObject({ file: project.file, isFine: true, schemaVersion: 10 });
  expect(report.counts).toMatchObject({ run: 2, result: 2, measurement: 1, draft: 1, layout: 3, samples: 1 });
  expect(report.sqliteVersion).toMatch(/^3\.\d+\.\d+$/);
  expect(report.sizeBytes).toBeGreaterThan(50_000);
  project.close();
});

it.each<[string, (db: Database.Database) => void, RegExp[]]>([
  [
    'a whole document that is another one than its hash says',
    (db) => db.prepare('UPDATE settings SET body = ?').run(packJson({ standard: 'other' })),
    [/^documents: settings [0-9a-f]{12} is not the one its hash says$/],
  ],
  [
    'a list of runs that says another margin and verdict than the result',
    (db) => db.exec("UPDATE run SET worst_margin_db = 12, verdict = 'meets' WHERE run = 2"),
    [/^runs: run 2: worst_margin_db, verdict not as in its result$/],
  ],
  [
    'a document that nothing names',
    (db) => db.prepare('INSERT INTO opening VALUES (?, ?)').run('0'.repeat(64), packJson({})),
    [/^documents: opening 000000000000 is not the one/, /^leftovers: 1 documents that nothing names/],
  ],
  [
    'a run whose result is gone',
    (db) => db.exec('DELETE FROM result WHERE sha256 = (SELECT result FROM run WHERE run = 1)'),
    [/^links: run 1 names a result that is not there$/],
  ],
  [
    'a draft whose layout is gone',
    (db) => db.exec('DELETE FROM layout WHERE sha256 = (SELECT layout FROM draft)'),
    [/^links: draft 1 names a layout that is not there$/, /^draft: layout [0-9a-f]{12} is missing$/],
  ],
  [
    'numbers that would be given again',
    (db) => db.exec('UPDATE project SET last_run = 1, last_measurement = 0'),
    [/^numbers: the last run has a higher number than the project knows; a measurement has a higher number/],
  ],
  [
    'a measurement that does not unpack',
    (db) => db.exec("UPDATE measurement SET points = x'00'"),
    [/^measurements: measurement 1 is no packed data$/],
  ],
  [
    'many damaged documents: five are named, the rest is counted',
    (db) => {
      const insert = db.prepare('INSERT INTO result VALUES (?, ?)');
      for (let i = 0; i < 9; i++) insert.run(`${i}`.repeat(64), Buffer.from('x'));
    },
    [/^documents: (result \d{12} is no packed data; ){5}… and 4 more$/, /^leftovers: 9 documents/],
  ],
])('%s', (_, change, expected) => {
  const project = changedProject(change);
  const found = complaints(project);
  expect(found).toHaveLength(expected.length);
  for (const [i, pattern] of expected.entries()) expect(found[i]).toMatch(pattern);
  expect(project.doctor().isFine).toBe(false);
  project.close();
});

it("a table of the user's own may stand beside; a changed one of ours may not", () => {
  const project = changedProject((db) => db.exec('CREATE TABLE mine (x)'));
  expect(complaints(project)).toEqual([]);
  project.close();
  expect(() => changedProject((db) => db.exec('ALTER TABLE run ADD COLUMN x TEXT'))).toThrow(
    'is damaged (its tables are not those of its version)',
  );
});
