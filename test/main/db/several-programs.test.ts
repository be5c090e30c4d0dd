import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { expect, it } from 'vitest';
import { ProjectConnection } from '../../../main/db/connection.ts';
import { migrations } from '../../../main/db/migrations/migrations.ts';
import { Project } from '../../../main/db/project.ts';
import { insertRun } from '../../../main/db/runs-repository.ts';
import { appFailure } from '../../support/app-failure.ts';
import { sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

const newFile = () => {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun());
  project.close();
  return project.file;
};

it('two connections read and write by turns, and each sees what the other wrote', () => {
  const file = newFile();
  const [one, other] = [Project.open(file), Project.open(file)];
  const seen = other.dataVersion();
  expect(one.addRun(sampleRun('b'))).toBe(2);
  expect(other.dataVersion()).not.toBe(seen);
  expect(other.addRun(sampleRun('c'))).toBe(3);
  expect(one.runs().map(({ run }) => run)).toEqual([3, 2, 1]);
  one.close();
  expect(other.run(2).result).toEqual(sampleRun('b').result);
  other.close();
  expect(readdirSync(join(file, '..'))).toEqual(['board.quietboard']);
});

it('while one writes, the other reads what was there before', () => {
  const file = newFile();
  const writer = new ProjectConnection(file, { readOnly: false, busyTimeoutMs: 100, migrations });
  const reader = Project.open(file, { busyTimeoutMs: 0 });
  writer.write((db) => {
    insertRun(db, 2, sampleRun('b'));
    expect(reader.runs().map(({ run }) => run)).toEqual([1]);
    expect(reader.run(1).result).toEqual(sampleRun().result);
  });
  expect(reader.runs().map(({ run }) => run)).toEqual([2, 1]);
  writer.close();
  reader.close();
});

it('a second writer waits, then says who is in the way; nothing is half written', () => {
  const file = newFile();
  const writer = new ProjectConnection(file, { readOnly: false, busyTimeoutMs: 100, migrations });
  const second = Project.open(file, { busyTimeoutMs: 150 });
  writer.write(() => {
    const startedMs = performance.now();
    const { code, message } = appFailure(() => second.addRun(sampleRun('b')));
    expect(code).toBe('busy');
    expect(message).toBe(
      `${file}: another program is writing to it and did not finish within 0.15 s. Wait until it has finished, or close it, then try again; nothing was changed.`,
    );
    expect(performance.now() - startedMs).toBeGreaterThan(100);
  });
  expect(second.addRun(sampleRun('b'))).toBe(2);
  writer.close();
  second.close();
});

it('a foreign program that locks the file is told the same way', () => {
  const file = newFile();
  const other = new Database(file);
  other.exec('BEGIN IMMEDIATE');
  const project = Project.open(file, { busyTimeoutMs: 50 });
  expect(appFailure(() => project.setName('x')).code).toBe('busy');
  expect(project.runs()).toHaveLength(1);
  other.exec('ROLLBACK');
  project.setName('x');
  other.close();
  project.close();
});

it('two that make the same project at once get the same one', () => {
  const file = join(temporaryFolder(), 'new.quietboard');
  const [one, other] = [Project.open(file, { create: true }), Project.open(file, { create: true })];
  one.addRun(sampleRun());
  expect(other.runs()).toHaveLength(1);
  one.close();
  other.close();
});
