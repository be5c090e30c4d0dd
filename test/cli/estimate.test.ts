import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { resultSchema } from '../../app/estimate/result-schema.ts';
import { parseWith } from '../../app/schema/parse-with.ts';
import { orchardBoard } from '../board/example-board.ts';
import { PROGRAM, runCli, testFolder } from '../support/run-cli.ts';

const { folder, write } = testFolder();

/** One clock on a 50 mm trace; the level of the drive decides the verdict. */
function clockBoard(highV: number) {
  const board = orchardBoard();
  board.waveforms![0] = { name: 'clk', kind: 'trapezoid', frequencyMhz: 50, lowV: 0, highV, riseNs: 1, fallNs: 1 };
  board.loops = [];
  board.cables = [];
  return board;
}
const quiet = write('quiet.board.json', clockBoard(0.1));
const loud = write('loud.board.json', clockBoard(500));

const estimate = async (...args: string[]) => {
  const run = await runCli(['estimate', ...args, '--json', '-']);
  return { ...run, result: JSON.parse(run.stdout === '' ? 'null' : run.stdout) as EstimateResult };
};

describe('estimate', () => {
  it('ends with 0 when every margin is kept, 1 when one falls short of the required margin', async () => {
    const { code, stderr, result } = await estimate(quiet);
    expect([code, stderr]).toEqual([0, '']);
    const worstDb = result.worst!.marginDb;
    expect(worstDb).toBeGreaterThan(0);
    expect(worstDb).toBeLessThan(100);
    const more = await estimate(quiet, '--required-margin', String(worstDb + 0.5));
    expect([more.code, more.result.verdict]).toEqual([1, 'falls-short']);
    const less = await estimate(quiet, '--required-margin', String(worstDb - 0.5));
    expect(less.code).toBe(0);
    expect(await estimate(loud)).toMatchObject({ code: 1, result: { verdict: 'exceeds' } });
  });

  it('follows the options and the documented result shape', async () => {
    const { result } = await estimate(
      ...[quiet, '--standard', 'fcc', '--class', 'a', '--distance', '10', '--max-mhz', '400'],
      ...['--measured-from', 'center', '--orientation', 'upright', '--required-margin', '6'],
    );
    parseWith(resultSchema, result);
    expect(result.limit).toMatchObject({ class: 'A', distanceM: 10, requiredMarginDb: 6, maxHz: 400e6 });
    expect(result.site).toMatchObject({ distanceM: 10, measuredFrom: 'center', orientation: 'upright' });
    expect(result.points.every((point) => point.frequencyHz <= 400e6 * (1 + 1e-9))).toBe(true);
    expect(result.board.sha256).toBe(createHash('sha256').update(readFileSync(quiet)).digest('hex'));
    expect(result.structure).toBe('solved');
  });

  it('judges by own limit lines, and scaling the drive by 2 moves every level by 6.02 dB', async () => {
    const limits = write('own.limits.json', {
      format: 'quietboard-limits',
      version: 1,
      lines: [
        {
          standard: 'Orchard rule',
          distanceM: 3,
          detector: 'peak',
          pointsMhzDbuvPerM: [
            [30, 20],
            [300, 20],
          ],
        },
      ],
    });
    const { result } = await estimate(quiet, '--limit-file', limits);
    expect(result.limit).toMatchObject({ standard: 'Orchard rule', sourceStatus: 'user file' });
    expect(result.points.map((point) => point.limitDbuvPerM)).toEqual(result.points.map(() => 20));
    const twice = await estimate(write('twice.board.json', clockBoard(0.2)), '--limit-file', limits);
    const levels = new Map(result.points.map((point) => [point.frequencyHz, point.levelDbuvPerM]));
    expect(levels.size).toBeGreaterThan(2);
    for (const point of twice.result.points) {
      // 20·log10(2): the model is linear in the drive.
      expect(point.levelDbuvPerM - levels.get(point.frequencyHz)!).toBeCloseTo(6.0206, 3);
    }
  });

  it('writes table, CSV and page, and prints rows as asked, within 80 columns', async () => {
    const [csv, html] = [join(folder, 'r.csv'), join(folder, 'r.html')];
    const { code, stdout } = await runCli(['estimate', quiet, '--csv', csv, '--html', html, '--top', '3']);
    expect(code).toBe(0);
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
    expect(stdout).toMatch(/\d+ more, with larger margins/);
    expect(readFileSync(csv, 'utf8').split('\r\n')[0]).toContain('margin (dB)');
    expect(readFileSync(html, 'utf8')).toContain('Orchard valve controller');
  });

  it('solves planes unless the file or the command line says pair-only', async () => {
    expect((await estimate(quiet)).result.structure).toBe('solved');
    expect((await estimate(quiet, '--structure', 'pair-only')).result.structure).toBe('pair-only');
    const inFile = write('pair.board.json', { ...clockBoard(0.1), structure: { planes: 'pair-only' } });
    expect((await estimate(inFile)).result.structure).toBe('pair-only');
    expect((await estimate(inFile, '--structure', 'solved')).result.structure).toBe('solved');
  });

  it('asks for sources when a board has none', async () => {
    const board = clockBoard(1);
    board.drives = [];
    const { code, stderr } = await runCli(['estimate', write('silent.board.json', board)]);
    expect(code).toBe(2);
    expect(stderr).toContain('drives');
  });
});

describe('Ctrl-C', () => {
  it('ends a running estimate with code 130 and leaves no file', async () => {
    const board = clockBoard(1);
    // Lines every 100 Hz from 30 MHz on: this would take far longer than the test may.
    board.waveforms![0] = {
      name: 'clk',
      kind: 'trapezoid',
      frequencyMhz: 1e-3,
      lowV: 0,
      highV: 1,
      riseNs: 1,
      fallNs: 1,
    };
    const file = write('slow.board.json', board);
    const before = readdirSync(folder);
    const [out, project] = [join(folder, 'slow.json'), join(folder, 'slow.quietboard')];
    // The program's own listener is there once it has loaded; the worker starts right after.
    const probe = 'setInterval(() => { if (process.listenerCount("SIGINT") > 0) console.error("ready") }, 500).unref()';
    const child = spawn(process.execPath, [
      '--import',
      `data:text/javascript,${probe}`,
      PROGRAM,
      'estimate',
      file,
      '--json',
      out,
      '--project',
      project,
    ]);
    child.stderr.once('data', () => child.kill('SIGINT'));
    const code = await new Promise((resolve) => child.on('close', resolve));
    expect(code).toBe(130);
    expect(existsSync(out)).toBe(false);
    expect(readdirSync(folder)).toEqual(before);
  });
});
