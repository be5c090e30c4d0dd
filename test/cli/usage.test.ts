import { describe, expect, it } from 'vitest';
import { runCli } from '../support/run-cli.ts';

const COMMANDS = [
  ...['estimate', 'nets', 'import', 'limits', 'field', 'validate', 'schema', 'serve'],
  ...['runs', 'show', 'compare', 'trend', 'rerun', 'note', 'delete', 'backup', 'export', 'restore', 'doctor'],
];

describe('help', () => {
  it('lists every command and fits 80 columns', async () => {
    const { code, stdout, stderr } = await runCli(['--help']);
    expect([code, stderr]).toEqual([0, '']);
    for (const command of COMMANDS) expect(stdout).toMatch(new RegExp(`^  ${command} `, 'm'));
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
  });

  it.each(COMMANDS)('of %s has examples and fits 80 columns', async (command) => {
    const { code, stdout } = await runCli([command, '--help']);
    expect(code).toBe(0);
    expect(stdout).toMatch(new RegExp(`^Examples?:\n {2}quietboard ${command}`, 'm'));
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
  });

  it('--version prints the version alone', async () => {
    expect((await runCli(['--version'])).stdout).toMatch(/^\d+\.\d+\.\d+\n$/);
  });
});

describe('usage errors end with code 2 and a sentence on stderr', () => {
  it.each<[string[], string]>([
    [[], 'Usage: quietboard'],
    [['nonsense'], "unknown command 'nonsense'"],
    [['estimate'], "missing required argument 'board'"],
    [['estimate', 'a.json', 'b.json'], 'too many arguments'],
    [['estimate', 'a.json', '--what'], "unknown option '--what'"],
    [['estimate', 'a.json', '--distance', 'far'], 'It must be a number from 0.5 to 100 m.'],
    [['estimate', 'a.json', '--distance', '-3'], 'It must be a number from 0.5 to 100 m.'],
    [['estimate', 'a.json', '--distance', '3m'], 'It must be a number from 0.5 to 100 m.'],
    [['estimate', 'a.json', '--distance', '1e400'], 'It must be a number from 0.5 to 100 m.'],
    [['estimate', 'a.json', '--required-margin', ''], 'It must be a number from 0 to 100 dB.'],
    [['estimate', 'a.json', '--max-mhz', '0'], 'It must be a number from 1 to 1000000 MHz.'],
    [['estimate', 'a.json', '--top', '2.5'], 'It must be a whole number'],
    [['estimate', 'a.json', '--site', 'moon'], 'Allowed choices are ground-plane, free-space.'],
    [['estimate', 'a.json', '--measured-from', 'edge'], 'Allowed choices are boundary, center.'],
    [['estimate', 'a.json', '--orientation', 'askew'], 'Allowed choices are flat, upright.'],
    [['estimate', 'a.json', '--standard', 'house rule'], 'standard must be one of CISPR 32'],
    [['estimate', 'a.json', '--class', 'Z'], 'class must be one of A, B'],
    [['estimate', 'a.json', '--distance', '7'], '--convert-distance'],
    [['estimate', 'a.json', '--csv', '-'], '--csv must be a file'],
    [['estimate', 'a.json', '--note', 'text'], '--note must go with --project'],
    [['estimate', 'a.json', '--pdf', '-'], '--pdf must be a file'],
    [['estimate', 'a.json', '--paper', 'A5'], 'Allowed choices are A4, Letter.'],
    [['estimate', 'a.json', '--waveform-at', '3,0,1'], '--waveform-at is not in this version'],
    [['runs'], "required option '--project <file>' not specified"],
    [['runs', '--project', 'absent.quietboard'], 'absent.quietboard'],
    [['show', '--project', 'absent.quietboard', 'seven'], 'RUN must be the number of a run'],
    [['schema', 'everything'], 'Allowed choices are board, sources, result, field.'],
    [['limits', 'house rule'], 'must be the name of a standard (CISPR 32'],
  ])('%j', async (args, message) => {
    const { code, stdout, stderr } = await runCli(args);
    expect(stderr).toContain(message);
    expect([code, stdout]).toEqual([2, '']);
  });
});

describe('unexpected failures end with code 3', () => {
  it.each([
    ['thrown beside the command', 'setTimeout(() => { throw new Error("planted") }, 8000)'],
    ['a promise nobody awaits', 'setTimeout(() => Promise.reject(new Error("planted")), 8000)'],
    ['thrown in the command', 'JSON.stringify = () => { throw new Error("planted") }'],
  ])('%s', async (_what, script) => {
    // The timers keep the process alive after the command: the planted failure is what ends it.
    const { code, stderr } = await runCli(['limits', '--json', '-'], ['--import', `data:text/javascript,${script}`]);
    expect(stderr).toContain('unexpected failure, please report it: Error: planted');
    expect(code).toBe(3);
  });
});
