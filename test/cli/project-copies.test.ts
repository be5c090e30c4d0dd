import { copyFileSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { Project } from '../../main/db/project.ts';
import { widthOf } from '../support/cli-project.ts';
import { sampleRun } from '../support/project-fixture.ts';
import { runCli, testFolder } from '../support/run-cli.ts';

/** A project of so many runs in a folder of its own. */
function projectOf(runs: number) {
  const { folder, write } = testFolder();
  const file = join(folder, 'valve.quietboard');
  const project = Project.open(file, { create: true });
  for (let run = 1; run <= runs; run++) project.addRun(sampleRun('a', { note: `run ${run}` }));
  project.close();
  return { folder, write, file, at: (name: string) => join(folder, name) };
}

const notesOf = (file: string): string[] => {
  const project = Project.open(file, { readOnly: true });
  try {
    return project.runs().map(({ note }) => note);
  } finally {
    project.close();
  }
};

/** Some bytes inside a project's largest document. */
function damage(file: string): void {
  const content = readFileSync(file);
  const start = content.indexOf('QBPJ', Math.floor(content.length / 2));
  for (let i = 0; i < 8; i++) content[start + 40 + i]! ^= 0x55;
  writeFileSync(file, content);
}

describe('backup, export and restore', () => {
  it('make the same project again, either way', async () => {
    const { file, at, folder } = projectOf(2);
    for (const [command, copy] of [
      ['backup', at('copy.quietboard')],
      ['export', at('copy.json')],
    ] as const) {
      const made = await runCli([command, '--project', file, copy]);
      expect(made).toEqual({ code: 0, stdout: `${copy} written.\n`, stderr: '' });
      const restored = at(`from-${command}.quietboard`);
      const { code, stdout } = await runCli(['restore', copy, '--project', restored]);
      expect([code, stdout]).toEqual([0, `${restored} made, with 2 runs.\n`]);
    }
    const texts = ['valve', 'from-backup', 'from-export'].map((stem) => {
      const project = Project.open(at(`${stem}.quietboard`), { readOnly: true });
      const json = JSON.stringify(project.exportJson());
      project.close();
      return json;
    });
    expect(new Set(texts).size).toBe(1);
    expect(readdirSync(folder).filter((name) => name.includes('tmp') || name.includes('-wal'))).toEqual([]);
    const exported = await runCli(['export', '--project', file, '-']);
    expect(exported.stdout).toBe(readFileSync(at('copy.json'), 'utf8'));
  });

  it.each(['backup', 'export'])('over a project keeps that one under another name: %s', async (command) => {
    const { file, at } = projectOf(2);
    const copy = at('copy');
    await runCli([command, '--project', file, copy]);
    const newer = Project.open(file);
    newer.addRun(sampleRun('b', { note: 'run 3' }));
    newer.close();
    for (const kept of [at('valve.before-restore.quietboard'), at('valve.before-restore-2.quietboard')]) {
      const before = notesOf(file);
      const { code, stdout } = await runCli(['restore', copy, '--project', file]);
      expect(code).toBe(0);
      expect(stdout).toBe(`${file} made, with 2 runs.\nWhat was there before is now ${kept}.\n`);
      expect([notesOf(file), notesOf(kept)]).toEqual([['run 2', 'run 1'], before]);
    }
  });

  it('refuse what would lose data, and change nothing', async () => {
    const { file, at, write } = projectOf(1);
    const backup = at('b.quietboard');
    const text = write('report.txt', 'my report');
    await runCli(['backup', '--project', file, backup]);
    await runCli(['export', '--project', file, at('e.json')]);
    const cases: [string[], string][] = [
      [['backup', '--project', file, backup], 'b.quietboard: is there already; nothing was changed'],
      [['backup', '--project', file, file], 'is there already'],
      [['export', '--project', file, file], 'which is an input file of this run'],
      [['restore', backup, '--project', backup], 'must be another file than the one it is made from'],
      [['restore', at('e.json'), '--project', at('e.json')], 'must be another file than the one it is made from'],
      [['restore', backup, '--project', text], 'is no Quietboard project and will not be replaced'],
      [['restore', at('e.json'), '--project', text], 'is no Quietboard project and will not be replaced'],
      [['restore', at('e.json'), '--project', at('none/x.quietboard')], 'does not exist'],
    ];
    for (const [args, message] of cases) {
      const before = [file, backup, text, at('e.json')].map((each) => readFileSync(each, 'latin1'));
      const { code, stdout, stderr } = await runCli(args);
      expect(stderr).toContain(message);
      expect([code, stdout]).toEqual([2, '']);
      expect([file, backup, text, at('e.json')].map((each) => readFileSync(each, 'latin1'))).toEqual(before);
    }
  });

  it('refuse an unsound source by name, and leave the project as it was', async () => {
    const { file, at, write, folder } = projectOf(1);
    copyFileSync(file, at('damaged.quietboard'));
    damage(at('damaged.quietboard'));
    await runCli(['export', '--project', file, at('e.json')]);
    const exported = readFileSync(at('e.json'), 'utf8');
    const cases: [string, string | RegExp][] = [
      [at('damaged.quietboard'), 'damaged.quietboard: is damaged and was not restored: '],
      [write('cut.json', exported.slice(0, exported.length / 2)), 'cut.json: must be JSON'],
      [
        write('forged.json', exported.replace('"distanceM":3', '"distanceM":4')),
        /forged\.json: documents\.\w+\[0\]\.sha256 must be .* \(it was changed\)/,
      ],
      [
        write('newer.json', exported.replace('"version":1', '"version":2')),
        'newer.json: version must be 1; received 2',
      ],
      [write('board.json', { format: 'quietboard-board', version: 1 }), 'format must be "quietboard-project"'],
      [write('note.txt', 'hello'), 'note.txt: must be JSON'],
      [at('nowhere.json'), 'nowhere.json: cannot be read: not found'],
    ];
    const before = [readFileSync(file, 'latin1'), readdirSync(folder)];
    for (const [source, message] of cases) {
      const { code, stdout, stderr } = await runCli(['restore', source, '--project', file]);
      expect(stderr).toMatch(message);
      expect([code, stdout]).toEqual([2, '']);
    }
    expect([readFileSync(file, 'latin1'), readdirSync(folder)]).toEqual(before);
  });
});

describe('doctor', () => {
  it('says what a project holds, in columns of 80, and ends with 0 where nothing is amiss', async () => {
    const { file } = projectOf(2);
    const { code, stdout } = await runCli(['doctor', '--project', file]);
    expect(code).toBe(0);
    expect(widthOf(stdout.replace(file, ''))).toBeLessThanOrEqual(80);
    expect(stdout).toMatch(
      /^Holds {4}2 runs, 1 layout, 1 set of sources, 1 measured waveform, 1 set-up, 1\n {9}result$/m,
    );
    expect(stdout).toMatch(/^fine {5}the structure of the file is sound$/m);
    expect(stdout).toMatch(/\nNothing is amiss\.\n$/);
  });

  it('ends with 1 where something is amiss, and says what; as JSON, too', async () => {
    const { file } = projectOf(1);
    damage(file);
    const { code, stdout } = await runCli(['doctor', '--project', file]);
    expect(code).toBe(1);
    expect(stdout).toMatch(/^AMISS {4}.* has changed bytes$/m);
    expect(stdout).toContain('Something is amiss: restore a backup');
    const asJson = await runCli(['doctor', '--project', file, '--json', '-']);
    expect([asJson.code, asJson.stderr]).toEqual([1, '']);
    expect(JSON.parse(asJson.stdout)).toMatchObject({ format: 'quietboard-doctor', isFine: false });
  });
});
