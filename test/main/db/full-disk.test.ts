import { execFileSync } from 'node:child_process';
import { readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it, onTestFinished } from 'vitest';
import { ProjectConnection } from '../../../main/db/connection.ts';
import { migrations } from '../../../main/db/migrations/migrations.ts';
import { Project } from '../../../main/db/project.ts';
import { insertRun, listRuns } from '../../../main/db/runs-repository.ts';
import { appFailure } from '../../support/app-failure.ts';
import { resultOf, sampleDocument, sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

it('a file that may not grow: the write is refused whole, what was there stays', () => {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun());
  project.close();
  const connection = new ProjectConnection(project.file, { readOnly: false, busyTimeoutMs: 100, migrations });
  connection.read((db) => db.pragma(`max_page_count = ${(db.pragma('page_count', { simple: true }) as number) + 1}`));
  const { code, message } = appFailure(() => connection.write((db) => insertRun(db, 2, sampleRun('b'))));
  expect(code).toBe('file');
  expect(message).toBe(`${project.file}: cannot be written: no space left on the disk; nothing was changed`);
  expect(connection.read((db) => listRuns(db)).map(({ run }) => run)).toEqual([1]);
  connection.close();
  const again = Project.open(project.file);
  expect(again.doctor().isFine).toBe(true);
  expect(again.addRun(sampleRun('b'))).toBe(2);
  again.close();
});

/** A file system of 1 MB; undefined where none may be mounted. */
function smallDisk(): string | undefined {
  const folder = temporaryFolder();
  try {
    execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=1m', 'tmpfs', folder], { stdio: 'ignore' });
  } catch {
    console.warn('full-disk test: no file system may be mounted here; only the simulated full disk is tested');
    return undefined;
  }
  onTestFinished(() => void execFileSync('umount', ['-l', folder]));
  return folder;
}

/** A run of its own result, of some 20 kB. */
const largeRun = (i: number) => {
  const document = sampleDocument('b');
  const notes = Array.from({ length: 300 }, (_, n) => `${i}: ${Math.sin(i * 1000 + n)} ${Math.cos(i * 1000 + n)}`);
  return sampleRun('b', { result: resultOf(document, { notes }) });
};

it('a disk that is full: every run whose number was given is there, and no other', async () => {
  const folder = smallDisk();
  if (folder === undefined) return;
  const file = join(folder, 'board.quietboard');
  let project = Project.open(file, { create: true });
  let given = 0;
  let refusals = 0;
  for (let i = 0; refusals < 3; i++) {
    try {
      given = project.addRun(largeRun(i));
    } catch (error) {
      expect((error as Error).message).toBe(
        `${file}: cannot be written: no space left on the disk; nothing was changed`,
      );
      refusals++;
    }
  }
  expect(given).toBeGreaterThan(5);
  expect(project.runs()).toHaveLength(given);
  // Nothing else finds room, and nothing is left of the attempt.
  const names = readdirSync(folder).sort();
  await expect(project.backupTo(join(folder, 'copy.quietboard'))).rejects.toThrow(
    /copy\.quietboard: cannot be written: no space left/,
  );
  expect(appFailure(() => Project.open(join(folder, 'new.quietboard'), { create: true })).message).toContain(
    'no space left',
  );
  expect(readdirSync(folder).sort()).toEqual(names);
  project.close();

  project = Project.open(file);
  expect(project.doctor().findings.filter(({ isFine }) => !isFine)).toEqual([]);
  for (let run = 1; run <= given; run++) expect(project.run(run).result).toEqual(largeRun(run - 1).result);
  project.close();
});

it('a disk with no room at all can still be read', () => {
  const folder = smallDisk();
  if (folder === undefined) return;
  const file = join(folder, 'board.quietboard');
  const project = Project.open(file, { create: true });
  project.addRun(sampleRun());
  project.close();
  expect(() => writeFileSync(join(folder, 'filler'), Buffer.alloc(2 ** 20))).toThrow('ENOSPC');
  const reader = Project.open(file, { readOnly: true });
  expect(reader.run(1).result).toEqual(sampleRun().result);
  reader.close();
});
