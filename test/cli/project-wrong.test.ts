import { copyFileSync, readdirSync, readFileSync, truncateSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { describe, expect, it } from 'vitest';
import { Project } from '../../main/db/project.ts';
import { clockBoard } from '../support/cli-project.ts';
import { sampleRun } from '../support/project-fixture.ts';
import { runCli, testFolder } from '../support/run-cli.ts';

const { folder, write } = testFolder();
const at = (name: string) => join(folder, name);

const project = Project.open(at('valve.quietboard'), { create: true });
for (const letter of ['a', 'b', 'c'] as const) project.addRun(sampleRun(letter));
project.deleteRun(2);
project.close();
Project.open(at('empty.quietboard'), { create: true }).close();
copyFileSync(at('valve.quietboard'), at('cut.quietboard'));
truncateSync(at('cut.quietboard'), 50_000);
copyFileSync(at('valve.quietboard'), at('newer.quietboard'));
const newer = new Database(at('newer.quietboard'));
newer.pragma('user_version = 999');
newer.close();
const foreign = new Database(at('foreign.quietboard'));
foreign.exec('CREATE TABLE mine (x)');
foreign.close();
write('text.quietboard', 'a text of my own');
write('none.quietboard', '');
write('board.json', clockBoard('A', 1));

const contentOf = () => readdirSync(folder).map((name) => [name, readFileSync(at(name)).toString('latin1')]);

/** `@name` is a file of the folder. */
async function refused(line: string): Promise<string> {
  const before = contentOf();
  const args = line.split(' ').map((arg) => (arg.startsWith('@') ? at(arg.slice(1)) : arg === "''" ? '' : arg));
  const { code, stdout, stderr } = await runCli(args);
  expect([code, stdout]).toEqual([2, '']);
  expect(contentOf()).toEqual(before);
  return stderr;
}

describe('what is no sound project is refused with a sentence that names it, and stays as it is', () => {
  it.each([
    ['runs --project @absent.quietboard', 'absent.quietboard: cannot be read: not found'],
    ['runs --project .', 'it is a folder or a device'],
    ['show 1 --project @text.quietboard', 'text.quietboard: must be a Quietboard project; it is another kind of file'],
    ['trend --project @none.quietboard', 'none.quietboard: must be a Quietboard project; it is empty'],
    ['doctor --project @cut.quietboard', 'cut.quietboard: is cut short'],
    ['compare 1 3 --project @foreign.quietboard', 'it is an SQLite database of another program'],
    ['runs --project @newer.quietboard', 'newer.quietboard: '],
    ['delete 1 --project @newer.quietboard', 'newer.quietboard: '],
    ['estimate @board.json --project @newer.quietboard', 'newer.quietboard: '],
    ['estimate @board.json --project @text.quietboard', 'it is another kind of file'],
    ['estimate @board.json --project @none.quietboard', 'it is empty'],
    ['estimate @board.json --project @nowhere/x.quietboard', 'does not exist'],
  ])('%s', async (line, message) => {
    expect(await refused(line)).toContain(message);
  });

  it('a newer one says by which program', async () => {
    expect(await refused('doctor --project @newer.quietboard')).toMatch(/newer\.quietboard: .*newer version/);
  });
});

describe('runs that are not there, or no numbers', () => {
  it.each([
    ['show 2 --project @valve.quietboard', 'run must be one of 1, 3; received 2'],
    ['show abc --project @valve.quietboard', 'RUN must be the number of a run, for example 7'],
    ['show 1.5 --project @valve.quietboard', 'received "1.5"'],
    ['show 0 --project @valve.quietboard', 'received "0"'],
    ['compare 1 9 --project @valve.quietboard', 'run must be one of 1, 3; received 9'],
    ['compare 1 --project @valve.quietboard', "missing required argument 'after'"],
    ['rerun 1e3 --project @valve.quietboard', 'received "1e3"'],
    ['note 2 text --project @valve.quietboard', 'received 2'],
    ['delete 1 2 --project @valve.quietboard', 'received 2'],
    ['show 1 --project @empty.quietboard', 'run must be a stored run (there is none yet)'],
    ['compare 1 2 --project @empty.quietboard', 'there is none yet'],
    ['runs', "required option '--project <file>' not specified"],
  ])('%s', async (line, message) => {
    expect(await refused(line)).toContain(message);
  });
});

describe('outputs are looked at before the work', () => {
  it.each([
    ['show 1 --project @valve.quietboard --json @valve.quietboard', 'which is an input file of this run'],
    ['show 1 --project @valve.quietboard --pdf -', '--pdf must be a file; received "-"'],
    ['trend --project @valve.quietboard --csv @x.csv --html @x.csv', 'already the file of --csv'],
    ['compare 1 3 --project @valve.quietboard --html @nowhere/x.html', 'does not exist'],
    ['estimate @board.json --project @x.quietboard --pdf @x.quietboard', '--project must be another file'],
    ['estimate @board.json --project @board.json', 'which is an input file of this run'],
    ['estimate @board.json --project -', '--project must be a file'],
    ["estimate @board.json --project ''", '--project must be the name of a file; received nothing'],
    ["estimate @board.json --pdf ''", '--pdf must be the name of a file; received nothing'],
    ['estimate @board.json --note x', '--note must go with --project'],
    ['estimate @board.json --paper A5', 'Allowed choices are A4, Letter.'],
    ['compare 1 3 --project @valve.quietboard --junit @x.xml', "unknown option '--junit'"],
  ])('%s', async (line, message) => {
    expect(await refused(line)).toContain(message);
  });
});

describe('an empty project', () => {
  it('has no runs, no trend, nothing amiss; reports of it can be written', async () => {
    const on = (command: string, ...args: string[]) => runCli([command, '--project', at('empty.quietboard'), ...args]);
    expect(await on('runs')).toMatchObject({ code: 0, stdout: expect.stringContaining('No runs yet.') as string });
    expect(await on('runs', '--json', '-')).toMatchObject({ code: 0, stdout: '{\n  "runs": []\n}\n' });
    const formats = ['pdf', 'html', 'csv', 'json'];
    const files = formats.flatMap((format) => [`--${format}`, at(`empty.${format}`)]);
    expect(await on('trend', ...files)).toEqual({ code: 0, stdout: 'No runs.\n', stderr: '' });
    for (const format of formats) expect(readFileSync(at(`empty.${format}`)).length).toBeGreaterThan(0);
    expect(await on('doctor')).toMatchObject({
      code: 0,
      stdout: expect.stringMatching(/^Holds {4}no runs yet$/m) as string,
    });
  });
});
