import { linkSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { AppError } from '../../../app/errors.ts';
import { Project } from '../../../main/db/project.ts';
import { sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

const newProject = () => {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun('a'));
  return project;
};
const exportOf = (project: Project): string => {
  const pieces: string[] = [];
  project.exportText((text) => pieces.push(text));
  return pieces.join('');
};
const failureOf = async (action: Promise<unknown>): Promise<AppError> => {
  const failure = await action.then(
    () => undefined,
    (error: unknown) => error,
  );
  expect(failure).toBeInstanceOf(AppError);
  return failure as AppError;
};
const namesBeside = (file: string) => readdirSync(join(file, '..')).sort();

it('a backup holds everything, also what is still in the log of changes, and is one file', async () => {
  const project = newProject();
  const backup = join(temporaryFolder(), 'copy.quietboard');
  expect(await project.backupTo(backup)).toBeUndefined();
  expect(namesBeside(backup)).toEqual(['copy.quietboard']);
  const copy = Project.open(backup);
  expect(exportOf(copy)).toBe(exportOf(project));
  expect(copy.doctor().isFine).toBe(true);
  copy.addRun(sampleRun('b'));
  expect(project.runs()).toHaveLength(1);
  copy.close();
  project.close();
});

it('goes on while another connection writes; what it holds is one moment', async () => {
  const project = newProject();
  const other = Project.open(project.file);
  const backup = join(temporaryFolder(), 'copy.quietboard');
  const writing = (async () => {
    for (let i = 0; i < 5; i++) {
      other.addRun(sampleRun('b', { note: String(i) }));
      await new Promise((resolve) => setImmediate(resolve));
    }
  })();
  await Promise.all([project.backupTo(backup), writing]);
  const copy = Project.open(backup);
  expect(copy.doctor().isFine).toBe(true);
  for (const { run } of copy.runs()) copy.run(run);
  for (const one of [copy, project, other]) one.close();
});

it('refuses to replace anything unless told', async () => {
  const project = newProject();
  const backup = join(temporaryFolder(), 'copy.quietboard');
  await project.backupTo(backup);
  const before = readFileSync(backup);
  project.addRun(sampleRun('b'));
  expect((await failureOf(project.backupTo(backup))).message).toBe(`${backup}: is there already; nothing was changed`);
  expect(readFileSync(backup).equals(before)).toBe(true);
  await project.backupTo(backup, 'replace');
  const copy = Project.open(backup);
  expect(copy.runs()).toHaveLength(2);
  copy.close();
  expect(namesBeside(backup)).toEqual(['copy.quietboard']);
  project.close();
});

it('never replaces what is no project, nor itself', async () => {
  const project = newProject();
  const folder = temporaryFolder();
  const text = join(folder, 'notes.txt');
  writeFileSync(text, 'my notes');
  expect((await failureOf(project.backupTo(text, 'replace'))).message).toContain('is no Quietboard project');
  expect(readFileSync(text, 'utf8')).toBe('my notes');
  mkdirSync(join(folder, 'sub'));
  expect((await failureOf(project.backupTo(join(folder, 'sub'), 'replace'))).message).toContain('a folder or a device');
  expect((await failureOf(project.backupTo(project.file, 'replace'))).message).toContain('must be another file');
  expect((await failureOf(project.backupTo(join(folder, 'none/x')))).message).toContain('does not exist');
  project.close();
});

it('a restore keeps what it replaces, and waits for nobody who has it open', async () => {
  const project = newProject();
  const backup = join(temporaryFolder(), 'copy.quietboard');
  await project.backupTo(backup);
  project.addRun(sampleRun('b'));
  const copy = Project.open(backup, { readOnly: true });
  const busy = await failureOf(copy.backupTo(project.file, 'keep-copy'));
  expect(busy.code).toBe('busy');
  expect(busy.message).toContain('another program has it open: close it');
  expect(project.runs()).toHaveLength(2);
  project.close();

  const kept = await copy.backupTo(project.file, 'keep-copy');
  expect(kept).toBe(join(project.file, '..', 'board.before-restore.quietboard'));
  expect(namesBeside(project.file)).toEqual(['board.before-restore.quietboard', 'board.quietboard']);
  const restored = Project.open(project.file);
  expect(exportOf(restored)).toBe(exportOf(copy));
  const old = Project.open(kept!);
  expect(old.runs()).toHaveLength(2);
  for (const one of [restored, old, copy]) one.close();
});

it('a restore replaces a damaged project, whose log of changes must not meet the new content', async () => {
  const project = newProject();
  const backup = join(temporaryFolder(), 'copy.quietboard');
  await project.backupTo(backup);
  project.close();
  const bytes = readFileSync(project.file);
  bytes.fill(0x5a, 100, 4096);
  writeFileSync(project.file, bytes);
  writeFileSync(`${project.file}-wal`, 'left over');
  const copy = Project.open(backup, { readOnly: true });
  await copy.backupTo(project.file, 'keep-copy');
  const restored = Project.open(project.file);
  expect(exportOf(restored)).toBe(exportOf(copy));
  restored.close();
  copy.close();
  expect(namesBeside(project.file)).toEqual(['board.before-restore.quietboard', 'board.quietboard']);
});

it('a damaged project is not backed up: the copy before stays', async () => {
  const project = newProject();
  for (let i = 0; i < 3; i++) project.addRun(sampleRun('b', { note: `n${i}` }));
  const backup = join(temporaryFolder(), 'copy.quietboard');
  await project.backupTo(backup);
  project.close();
  const before = readFileSync(backup);
  const bytes = readFileSync(project.file);
  // The page of the runs: their board's name stands on it.
  const at = bytes.indexOf(sampleRun('b').document.board.name);
  bytes.fill(0xff, at - (at % 4096), at - (at % 4096) + 64);
  writeFileSync(project.file, bytes);
  const damaged = Project.open(project.file);
  expect((await failureOf(damaged.backupTo(backup, 'replace'))).message).toContain('is damaged');
  expect(readFileSync(backup).equals(before)).toBe(true);
  expect(namesBeside(backup)).toEqual(['copy.quietboard']);
  damaged.close();
});

it('a second name of the project itself is no place for its backup', async () => {
  const project = newProject();
  const other = join(project.file, '..', 'other.quietboard');
  linkSync(project.file, other);
  expect((await failureOf(project.backupTo(other, 'replace'))).message).toContain('must be another file');
  expect(project.doctor().isFine).toBe(true);
  project.close();
});
