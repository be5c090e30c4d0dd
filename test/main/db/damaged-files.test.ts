import { copyFileSync, mkdirSync, readdirSync, readFileSync, symlinkSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { AppError } from '../../../app/errors.ts';
import { Project } from '../../../main/db/project.ts';
import { appFailure } from '../../support/app-failure.ts';
import { sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

const SEED = 77;

function projectFile(): string {
  const project = Project.open(join(temporaryFolder(), 'board.quietboard'), { create: true });
  project.addRun(sampleRun('a'));
  project.addRun(sampleRun('b'));
  project.close();
  return project.file;
}

describe('what is no project is refused and stays as it is', () => {
  const foreign = (file: string) => {
    const db = new Database(file);
    db.exec('CREATE TABLE mine (x); INSERT INTO mine VALUES (1)');
    db.close();
  };
  it.each<[string, (file: string) => void, string]>([
    ['a database of another program', foreign, 'it is an SQLite database of another program'],
    [
      'a text',
      (file) => writeFileSync(file, 'x'.repeat(5000)),
      'it is another kind of file, or its beginning is damaged',
    ],
    ['a short text', (file) => writeFileSync(file, 'SQLite format 3\0'), 'it is another kind of file'],
    ['an empty file', (file) => writeFileSync(file, ''), 'must be a Quietboard project; it is empty'],
  ])('%s', (_, make, message) => {
    const file = join(temporaryFolder(), 'x.quietboard');
    make(file);
    const before = readFileSync(file);
    for (const options of [{}, { create: true }, { readOnly: true }]) {
      const failure = appFailure(() => Project.open(file, options));
      expect(failure.code).toBe('file');
      expect(failure.message).toContain(`${file}: `);
      expect(failure.message).toContain(message);
    }
    expect(readFileSync(file).equals(before)).toBe(true);
    expect(readdirSync(join(file, '..'))).toEqual(['x.quietboard']);
  });

  it('a folder', () => {
    const file = join(temporaryFolder(), 'x.quietboard');
    mkdirSync(file);
    expect(appFailure(() => Project.open(file, { create: true })).message).toContain('it is a folder or a device');
  });

  it('a name below a file, a folder that is not there', () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'file'), '');
    const below = (name: string) => appFailure(() => Project.open(join(folder, name), { create: true })).message;
    expect(below('file/x.quietboard')).toContain('a part of the path is not a folder');
    expect(below('none/x.quietboard')).toContain(`the folder ${join(folder, 'none')} does not exist`);
    expect(below('a\0b')).toContain('null bytes');
  });
});

it('a link to a project is the project: its log of changes lies beside the file itself', () => {
  const file = projectFile();
  const link = join(temporaryFolder(), 'link.quietboard');
  symlinkSync(file, link);
  const project = Project.open(link);
  project.addRun(sampleRun('c'));
  project.close();
  expect(readdirSync(join(link, '..'))).toEqual(['link.quietboard']);
  const again = Project.open(file);
  expect(again.runs()).toHaveLength(3);
  again.close();
});

describe('a damaged project', () => {
  it.each([1, 4096, 3 * 4096, 3 * 4096 + 100])('cut short by %i bytes is refused and stays as it is', (missing) => {
    const file = projectFile();
    const whole = readFileSync(file).length;
    truncateSync(file, whole - missing);
    const before = readFileSync(file);
    for (const readOnly of [false, true]) {
      expect(appFailure(() => Project.open(file, { readOnly })).message).toBe(
        `${file}: is cut short: must have ${whole} bytes; it has ${whole - missing}. Restore a backup`,
      );
    }
    expect(readFileSync(file).equals(before)).toBe(true);
  });

  /** Everything that reads; what each throws. */
  const readAll = (project: Project): unknown[] => {
    const uses = [
      () => project.runs(),
      () => project.run(1),
      () => project.run(2),
      () => project.revisions(),
      () => project.exportJson(),
    ];
    return uses.flatMap((use) => {
      try {
        use();
        return [];
      } catch (error) {
        return [error];
      }
    });
  };

  /** The examination's word; a file that does not even let it begin is not fine. */
  function isFine(project: Project): boolean {
    try {
      return project.doctor().isFine;
    } catch (error) {
      expect(error).toBeInstanceOf(AppError);
      return false;
    }
  }

  it('with flipped bytes anywhere: never another number, never another failure, and the examination sees it', () => {
    const file = projectFile();
    const sound = readFileSync(file);
    const whole = Project.open(file);
    const [one, two] = [whole.run(1), whole.run(2)].map((run) =>
      JSON.stringify([run.result, run.document, run.settings]),
    );
    whole.close();
    let seen = 0;
    fc.assert(
      fc.property(
        fc.oneof(fc.integer({ min: 0, max: 4095 }), fc.integer({ min: 0, max: sound.length - 16 })),
        fc.integer({ min: 1, max: 255 }),
        (at, mask) => {
          const damaged = Buffer.from(sound);
          for (let i = 0; i < 16; i++) damaged[at + i]! ^= mask;
          writeFileSync(file, damaged);
          let project: Project;
          try {
            project = Project.open(file, { readOnly: true });
          } catch (error) {
            expect(error).toBeInstanceOf(AppError);
            seen++;
            return;
          }
          try {
            for (const error of readAll(project)) {
              expect(error).toBeInstanceOf(AppError);
              expect((error as AppError).code).toMatch(/^(file|input)$/);
            }
            const isSeen = !isFine(project);
            for (const [number, expected] of [
              [1, one],
              [2, two],
            ] as const) {
              try {
                const run = project.run(number);
                expect(JSON.stringify([run.result, run.document, run.settings])).toBe(expected);
              } catch (error) {
                expect(error).toBeInstanceOf(AppError);
              }
            }
            if (isSeen) seen++;
          } finally {
            project.close();
          }
          expect(readFileSync(file).equals(damaged)).toBe(true);
        },
      ),
      {
        seed: SEED,
        numRuns: 40,
        // A null where none can be; a column under another name.
        examples: [
          [4097, 1],
          [2401, 128],
        ],
      },
    );
    // What is not seen lies in unused space of pages, or in what nothing else repeats (a run's note and start).
    expect(seen).toBeGreaterThan(20);
  });

  it('says what to do', () => {
    const file = projectFile();
    const bytes = readFileSync(file);
    const at = bytes.indexOf('QBPJ');
    for (let i = 0; i < 8; i++) bytes[at + 30 + i]! ^= 0x55;
    writeFileSync(file, bytes);
    const project = Project.open(file);
    const report = project.doctor();
    expect(report.isFine).toBe(false);
    expect(report.findings.filter(({ isFine }) => !isFine).map(({ code }) => code)).toContain('documents');
    expect(report.findings.find(({ code }) => code === 'documents')!.message).toMatch(
      /^\w+ [0-9a-f]{12} has changed bytes$/,
    );
    const messages = readAll(project).map((error) => (error as AppError).message);
    expect(messages.length).toBeGreaterThan(0);
    for (const message of messages) {
      expect(message).toMatch(
        /board\.quietboard: is damaged \(\w+ [0-9a-f]{12} has changed bytes\); nothing was changed\. Restore a backup/,
      );
    }
    project.close();
  });

  it('with a stray log of another file beside it is still itself', () => {
    const file = projectFile();
    const other = projectFile();
    const open = Project.open(other);
    open.addRun(sampleRun('c'));
    copyFileSync(`${other}-wal`, `${file}-wal`);
    open.close();
    const project = Project.open(file);
    expect(project.doctor().findings.filter(({ isFine }) => !isFine)).toEqual([]);
    project.close();
  });
});
