import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { comparisonSchema } from '../../app/compare/comparison-schema.ts';
import { trendSchema } from '../../app/compare/trend-schema.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { clockBoard, FORMULA_NET, hostileClockBoard, isPlain, SHORT, widthOf } from '../support/cli-project.ts';
import { type CliRun, runCli, testFolder } from '../support/run-cli.ts';

const { folder, write } = testFolder();
const project = join(folder, 'valve.quietboard');
const json = <T>({ stdout }: CliRun): T => JSON.parse(stdout) as T;
const on = (command: string, ...args: string[]) => runCli([command, '--project', project, ...args]);
const estimate = (file: string, ...args: string[]) => runCli(['estimate', file, ...SHORT, ...args]);

/** Levels fall by 20 dB from A to B: the drive's swing is a tenth (the model is linear). */
const SWING_V = { A: 500, B: 50 };
let first: CliRun;
let second: CliRun;

beforeAll(async () => {
  const [a, b] = (['A', 'B'] as const).map((revision) =>
    write(`${revision}.board.json`, hostileClockBoard(revision, SWING_V[revision])),
  );
  first = await estimate(a!, '--project', project, '--note', 'first \u001b[31mlayout');
  second = await estimate(b!, '--project', project, '--required-margin', '0', '--json', '-');
}, 60_000);

describe('estimate --project', () => {
  it('makes the project, keeps the run, says its number, and ends as without a project', () => {
    expect(first).toMatchObject({ code: 1, stderr: '' });
    expect(first.stdout.trimEnd().split('\n').at(-1)).toBe(`Kept as run #1 in ${project}.`);
    expect(isPlain(first.stdout)).toBe(true);
  });

  it('with --json - only the JSON is on standard output, the number on the other', () => {
    expect(json<EstimateResult>(second).format).toBe('quietboard-result');
    expect(second.stderr).toBe(`Kept as run #2 in ${project}.\n`);
  });

  it('is found out before the work, and leaves no project, when the note is too long', async () => {
    const absent = join(folder, 'absent.quietboard');
    const run = await estimate('nowhere.json', '--project', absent, '--note', 'x'.repeat(10_001));
    expect(run).toMatchObject({ code: 2, stdout: '' });
    expect(run.stderr).toContain('note must be a text of 0 to 10000 characters');
    expect(existsSync(absent)).toBe(false);
  });

  it('leaves no empty project when the board cannot be estimated', async () => {
    const absent = join(folder, 'absent.quietboard');
    const silent = write('silent.board.json', { ...clockBoard('A', 1), drives: [] });
    expect((await estimate(silent, '--project', absent)).code).toBe(2);
    expect(existsSync(absent)).toBe(false);
  });

  it('shows the result even when the project went away meanwhile, and says so', async () => {
    const gone = join(folder, 'gone.quietboard');
    // The estimate has begun; then a file that is no project takes the name.
    const script = `import fs from 'node:fs'; import { Worker } from 'node:worker_threads'; const post = Worker.prototype.postMessage;
      Worker.prototype.postMessage = function (...a) { fs.writeFileSync(${JSON.stringify(gone)}, 'text'); return post.apply(this, a); };`;
    const run = await runCli(
      ['estimate', join(folder, 'B.board.json'), ...SHORT, '--project', gone],
      ['--import', `data:text/javascript,${encodeURIComponent(script)}`],
    );
    expect(run.stdout).toContain('lines:');
    expect(run.stdout).not.toContain('Kept as run');
    expect(run.stderr).toContain('gone.quietboard: must be a Quietboard project');
    expect(run.code).toBe(2);
  });
});

describe('runs', () => {
  it('lists newest first, within 80 columns, notes below; nothing of a name reaches the terminal', async () => {
    const { code, stdout } = await on('runs');
    expect(code).toBe(0);
    expect([widthOf(stdout) <= 80, isPlain(stdout)]).toEqual([true, true]);
    expect(stdout).toMatch(/^ #2 {2}\d{4}-\d\d-\d\d \d\d:\d\d {2}B .*\n #1 .* A .*exceeds/m);
    expect(stdout).toContain('#1: first \\x1b[31mlayout');
  });

  it('has the keys of the contract', async () => {
    const { runs } = json<{ runs: { run: number; startedAt: string; worst: unknown }[] }>(
      await on('runs', '--json', '-'),
    );
    const contract = ['run', 'startedAt', 'board', 'revision', 'standard', 'class', 'distanceM', 'worst', 'verdict'];
    expect(runs.map(({ run }) => run)).toEqual([2, 1]);
    for (const run of runs) {
      for (const key of contract) expect(run).toHaveProperty(key);
      expect(run.worst).toMatchObject({ frequencyHz: expect.any(Number), marginDb: expect.any(Number) });
      expect(run.startedAt).toMatch(/^\d{4}-\d\d-\d\dT[\d:.]+Z$/);
    }
  });

  it('of a revision that has none names those that have', async () => {
    expect((await on('runs', '--revision', 'B')).stdout).not.toContain('#1');
    const { code, stdout } = await on('runs', '--revision', 'Z');
    expect([code, stdout]).toEqual([0, 'No runs of this revision. There are runs of: A, B.\n']);
  });
});

describe('show', () => {
  it('gives the result as it was, ends with 0 whatever the verdict, and takes #2 for 2', async () => {
    expect((await on('show', '#2', '--json', '-')).stdout).toBe(second.stdout);
    const { code, stdout } = await on('show', '1', '--top', '2');
    expect(code).toBe(0);
    expect(stdout).toContain('2 more, with larger margins');
    expect([widthOf(stdout) <= 80, isPlain(stdout)]).toEqual([true, true]);
  });

  it('writes CSV in which no name is a formula', async () => {
    const csv = join(folder, 'run.csv');
    await on('show', '1', '--csv', csv, '--top', '0');
    const text = readFileSync(csv, 'utf8');
    expect(text).toContain(`"'${FORMULA_NET.replaceAll('"', '""')}`);
    expect(text).not.toMatch(/(^|,|\n)"?[=+@]/);
  });
});

describe('compare', () => {
  it('has a tenth of the swing as 20 dB, in table and JSON, and ends with 0', async () => {
    const run = await on('compare', '1', '2', '--json', '-');
    const comparison = comparisonSchema.parse(json(run));
    expect([run.code, run.stderr]).toEqual([0, '']);
    // 20·log10(500/50): the model is linear in the drive.
    expect(comparison.worstMarginChangeDb).toBeCloseTo(20, 6);
    expect(comparison.lines).toHaveLength(4);
    for (const line of comparison.lines) expect(line.levelChangeDb).toBeCloseTo(-20, 6);
    expect(comparison.changes.map(({ kind }) => kind)).toContain('waveform');

    const { code, stdout } = await on('compare', '1', '2');
    expect([code, widthOf(stdout) <= 80, isPlain(stdout)]).toEqual([0, true, true]);
    expect(stdout).toContain('+20.0');
    expect(stdout).toContain('500 → 50 V');
  });

  it('writes CSV in which no name is a formula, and the dates of a page in words', async () => {
    const [csv, html] = [join(folder, 'c.csv'), join(folder, 'c.html')];
    expect((await on('compare', '1', '2', '--csv', csv, '--html', html)).code).toBe(0);
    expect(readFileSync(csv, 'utf8')).not.toMatch(/(^|,|\n)"?[=+@]/);
    const page = readFileSync(html, 'utf8');
    expect(page).toMatch(/run 1, revision .{0,40}A.{0,20}, \d{4}-\d\d-\d\d \d\d:\d\d UTC/);
    expect(page).not.toMatch(/\d\dT\d\d:\d\d/);
    expect(page).not.toContain('<b>valve');
  });

  it('of a run with itself finds nothing', async () => {
    const { code, stdout } = await on('compare', '2', '2');
    expect(code).toBe(0);
    expect(stdout).toContain('nothing in board, sources and set-up');
  });
});

describe('trend', () => {
  it('goes from revision to revision, and ends with 0', async () => {
    const run = await on('trend', '--json', '-');
    const { groups } = trendSchema.parse(json(run));
    expect([run.code, run.stderr]).toEqual([0, '']);
    expect(groups.map(({ points }) => points.map(({ revision, run: number }) => [revision, number]))).toEqual([
      [
        ['A', 1],
        ['B', 2],
      ],
    ]);
    expect(groups[0]!.points[1]!.changeDb).toBeCloseTo(20, 6);
    const { stdout } = await on('trend');
    expect(stdout).toContain('better by 20.0 dB from A to B');
    expect([widthOf(stdout) <= 80, isPlain(stdout)]).toEqual([true, true]);
  });
});

describe('rerun', () => {
  it('gives the same result bit for bit', async () => {
    const run = await on('rerun', '1', '--json', '-');
    expect(run).toMatchObject({ code: 0, stderr: '' });
    expect(json(run)).toMatchObject({ run: 1, isIdentical: true, pointCount: 4, largestDb: 0, otherKeys: [] });
    const { code, stdout } = await on('rerun', '2');
    expect([code, widthOf(stdout) <= 80]).toEqual([0, true]);
    expect(stdout.replaceAll('\n', ' ')).toContain('the same result, 4 readings, bit for bit.');
  });
});

describe('note and delete', () => {
  it('write, take away, and never give a number again', async () => {
    const copy = join(folder, 'copy.quietboard');
    await on('backup', copy);
    const there = (command: string, ...args: string[]) => runCli([command, '--project', copy, ...args]);
    expect((await there('note', '2', 'after the review')).stdout).toBe('Note of run #2 written.\n');
    expect((await there('runs')).stdout).toContain('#2: after the review');
    expect((await there('note', '1', '')).stdout).toBe('Note of run #1 taken away.\n');
    expect((await there('delete', '2', '#2')).stdout).toBe('Run #2 deleted.\n');
    const all = await there('delete', '1', '9');
    expect(all).toMatchObject({ code: 2, stdout: '' });
    expect(all.stderr).toContain('run must be one of 1; received 9');
    expect((await there('runs')).stdout).toContain('#1');
    expect((await estimate(join(folder, 'B.board.json'), '--project', copy)).stdout).toContain('Kept as run #3');
  });
});
