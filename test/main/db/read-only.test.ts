import { execFileSync, spawnSync } from 'node:child_process';
import { chmodSync, existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { expect, it, onTestFinished } from 'vitest';
import { Project } from '../../../main/db/project.ts';
import { appFailure } from '../../support/app-failure.ts';
import { sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

/** Built, as Node 20 runs no TypeScript. */
const PROJECT_MODULE = join(process.cwd(), 'dist/main/db/project.js');
const NOBODY = 65534;

function projectFile(): string {
  const folder = temporaryFolder();
  chmodSync(folder, 0o755);
  const project = Project.open(join(folder, 'board.quietboard'), { create: true });
  project.addRun(sampleRun('a'));
  project.close();
  chmodSync(project.file, 0o644);
  return project.file;
}

/** Opens a project as a user without rights of root, and says what came of it. */
function asNobody(file: string, options: object, use: string): string {
  expect(existsSync(PROJECT_MODULE), 'run "npm run build" first').toBe(true);
  const script = `
    import { Project } from ${JSON.stringify(pathToFileURL(PROJECT_MODULE).href)};
    try {
      const project = Project.open(${JSON.stringify(file)}, ${JSON.stringify(options)});
      console.log(JSON.stringify((${use})(project)));
      project.close();
    } catch (error) {
      console.log(error.code + ': ' + error.message);
    }`;
  const user = process.getuid?.() === 0 ? { uid: NOBODY, gid: NOBODY } : {};
  const { stdout, stderr } = spawnSync(process.execPath, ['--input-type=module', '-e', script], {
    ...user,
    encoding: 'utf8',
  });
  return stdout.trim() || stderr;
}

const LOOK = '(p) => [p.isReadOnly, p.runs().length, p.run(1).result.points.length, p.doctor().isFine]';
const points = sampleRun('a').result.points.length;

it('a read-only file in a read-only folder is read; writing is refused with the reason; the file stays as it is', () => {
  const file = projectFile();
  const before = readFileSync(file);
  chmodSync(file, 0o444);
  chmodSync(join(file, '..'), 0o555);
  onTestFinished(() => chmodSync(join(file, '..'), 0o755));
  expect(asNobody(file, { readOnly: true }, LOOK)).toBe(JSON.stringify([true, 1, points, true]));
  expect(asNobody(file, {}, LOOK)).toBe(`file: ${file}: cannot be written: access denied`);
  expect(asNobody(file, { readOnly: true }, '(p) => p.setName("x")')).toBe(
    `file: ${file}: is open for reading only; nothing was changed`,
  );
  expect(readFileSync(file).equals(before)).toBe(true);
  expect(readdirSync(join(file, '..'))).toEqual(['board.quietboard']);
});

it.each([
  ['file', 0o444, 0o777],
  ['folder', 0o666, 0o555],
])('a read-only %s alone is enough to be read only', (_, fileMode, folderMode) => {
  const file = projectFile();
  chmodSync(file, fileMode);
  chmodSync(join(file, '..'), folderMode);
  onTestFinished(() => chmodSync(join(file, '..'), 0o755));
  expect(asNobody(file, { readOnly: true }, LOOK)).toBe(JSON.stringify([true, 1, points, true]));
  expect(asNobody(file, {}, LOOK)).toContain('cannot be written: access denied');
  expect(readdirSync(join(file, '..'))).toEqual(['board.quietboard']);
});

it('changes that lie beside a file in a read-only folder are read, too', () => {
  const file = projectFile();
  const writer = Project.open(file);
  writer.addRun(sampleRun('b'));
  chmodSync(join(file, '..'), 0o555);
  onTestFinished(() => chmodSync(join(file, '..'), 0o755));
  expect(readdirSync(join(file, '..'))).toContain('board.quietboard-wal');
  const seen = asNobody(file, { readOnly: true }, '(p) => p.runs().length');
  expect(seen).toBe('2');
  writer.close();
});

it('a file that may not be read is told', () => {
  const file = projectFile();
  chmodSync(file, 0o000);
  expect(asNobody(file, { readOnly: true }, LOOK)).toBe(`file: ${file}: cannot be read: access denied`);
});

it('opened for reading only by choice: shared with a writer, nothing is left beside it', () => {
  const file = projectFile();
  const before = readFileSync(file);
  const reader = Project.open(file, { readOnly: true });
  expect(reader.runs()).toHaveLength(1);
  expect(appFailure(() => reader.addRun(sampleRun())).message).toContain('is open for reading only');
  reader.close();
  expect(readFileSync(file).equals(before)).toBe(true);
  expect(readdirSync(join(file, '..'))).toEqual(['board.quietboard']);
  const [shared, writer] = [Project.open(file, { readOnly: true }), Project.open(file)];
  writer.addRun(sampleRun('b'));
  expect(shared.runs()).toHaveLength(2);
  shared.close();
  writer.close();
});

it('a file system that is mounted read-only', () => {
  const folder = temporaryFolder();
  const mount = (options: string) =>
    execFileSync('mount', ['-t', 'tmpfs', '-o', options, 'tmpfs', folder], { stdio: 'ignore' });
  try {
    mount('size=4m');
  } catch {
    console.warn('read-only test: no file system may be mounted here; only read-only rights are tested');
    return;
  }
  onTestFinished(() => void execFileSync('umount', ['-l', folder]));
  const file = join(folder, 'board.quietboard');
  const project = Project.open(file, { create: true });
  project.addRun(sampleRun());
  project.close();
  mount('remount,ro,size=4m');
  const reader = Project.open(file, { readOnly: true });
  expect(reader.run(1).result).toEqual(sampleRun().result);
  reader.close();
  expect(appFailure(() => Project.open(file)).message).toBe(`${file}: cannot be written: the file system is read-only`);
});
