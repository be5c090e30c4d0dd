import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parseBoardFile } from '../../app/board/parse-board.ts';
import { orchardBoard } from '../board/example-board.ts';
import { PROGRAM, runCli, testFolder } from '../support/run-cli.ts';

const { folder, write } = testFolder();
const boardFile = write('good.board.json', orchardBoard());

describe('input files that cannot be used end with code 2 and say why', () => {
  const deep = `${'['.repeat(100_000)}`;
  const xml = '<?xml version="1.0"?><drawing/>';
  it.each<[string, string, string]>([
    ['absent', join(folder, 'absent.json'), 'cannot be read: not found'],
    ['a folder', folder, ''],
    ['empty', write('empty.json', ''), 'line 1, column 1 must be a value; received an empty file'],
    [
      'broken JSON',
      write('broken.json', '{\n  "format": "quietboard-board",,\n}'),
      'line 2, column 32 must be a key in double quotes; received ",',
    ],
    ['nested without end', write('deep.json', deep), 'column 100001 must be a value'],
    ['no UTF-8', write('latin.json', Buffer.from('{"name": "Gr\xfcn"}', 'latin1')), 'must be UTF-8 text'],
    [
      'sources given as the board',
      write('s.json', { format: 'quietboard-sources', version: 1 }),
      'format must be "quietboard-board"; received "quietboard-sources"',
    ],
    ['another XML', write('other.xml', xml), 'drawing'],
    [
      'a wrong value',
      write('wrong.json', { ...orchardBoard(), nets: [{ name: 7 }] }),
      'nets[0].name must be a text; received 7',
    ],
    [
      'a wrong reference',
      write('ref.json', { ...orchardBoard(), planes: [{ layer: 'GDN', net: 'GND' }] }),
      'planes[0].layer must be the name of a copper layer of the stackup (nearest: "GND"); received "GDN"',
    ],
  ])('%s', async (_what, file, message) => {
    const { code, stdout, stderr } = await runCli(['nets', file]);
    expect(stderr).toContain(`quietboard: ${file}`);
    expect(stderr).toContain(message);
    expect([code, stdout]).toEqual([2, '']);
  });

  it('names the sources file when the fault is in it', async () => {
    const sources = write('bad.sources.json', {
      format: 'quietboard-sources',
      version: 1,
      loads: [{ net: 'CLK', pin: 'U9.9' }],
    });
    const { code, stderr } = await runCli(['nets', boardFile, '--sources', sources]);
    expect(stderr).toContain(`${sources}: loads[0].pin must be a pin of net "CLK"`);
    expect(code).toBe(2);
  });

  it('a byte order mark is no fault', async () => {
    const file = write('bom.json', `\ufeff${JSON.stringify(orchardBoard())}`);
    expect((await runCli(['nets', file])).code).toBe(0);
  });

  it('waveform files are looked for beside the board, then beside the sources', async () => {
    mkdirSync(join(folder, 'kept'));
    const sources = write('kept/meas.sources.json', {
      format: 'quietboard-sources',
      version: 1,
      waveforms: [{ name: 'clk', kind: 'samples', file: 'edge.csv', periodNs: 40 }],
    });
    const run = () => runCli(['nets', boardFile, '--sources', sources]);
    const absent = await run();
    expect(absent.stderr).toContain(`${join(folder, 'kept/edge.csv')}: cannot be read: not found`);
    write('kept/edge.csv', 'Second,Volt\n0,0\n2e-8,3.3\n3.9e-8,0\n');
    expect(await run()).toMatchObject({ code: 0, stderr: '' });
    // The board's own folder comes first: a broken file there is not passed over.
    write('edge.csv', 'Second,Volt\n0,0\nx,1\n');
    expect((await run()).stderr).toContain(`${join(folder, 'edge.csv')}: line 3 must be a row of two numbers`);
  });
});

describe('output files', () => {
  it.each([
    ['a missing folder', join(folder, 'nowhere/out.json'), `the folder ${join(folder, 'nowhere')} does not exist`],
    ['a folder', folder, 'is a folder, not a file'],
    ['a file used as a folder', join(boardFile, 'out.json'), 'is not a folder'],
    ['the input itself', boardFile, 'which is an input file of this run'],
  ])('%s is refused before anything is computed', async (_what, target, message) => {
    const before = readFileSync(boardFile, 'utf8');
    const { code, stderr } = await runCli(['nets', boardFile, '--json', target]);
    expect(stderr).toContain(message);
    expect(code).toBe(2);
    expect(readFileSync(boardFile, 'utf8')).toBe(before);
  });

  it('a link to the input is the input, and one file cannot take two outputs', async () => {
    const link = join(folder, 'link.json');
    symlinkSync(boardFile, link);
    expect((await runCli(['nets', boardFile, '--json', link])).stderr).toContain('an input file of this run');
    const out = join(folder, 'twice');
    const { code, stderr } = await runCli(['nets', boardFile, '--json', out, '--csv', out]);
    expect(stderr).toContain('already the file of --json');
    expect([code, existsSync(out)]).toEqual([2, false]);
  });

  it('replace the old file whole, through a link, and leave nothing else behind', async () => {
    mkdirSync(join(folder, 'out'));
    const target = write('out/nets.json', 'old');
    symlinkSync(target, join(folder, 'out/link.json'));
    expect(await runCli(['nets', boardFile, '--json', join(folder, 'out/link.json')])).toMatchObject({ code: 0 });
    expect(JSON.parse(readFileSync(target, 'utf8')).nets).toHaveLength(3);
    expect(readdirSync(join(folder, 'out')).sort()).toEqual(['link.json', 'nets.json']);
  });

  it('a full device is an error, and the table is not printed as if all were well', async () => {
    const { code, stdout, stderr } = await runCli(['nets', boardFile, '--json', '/dev/full']);
    expect(stderr).toContain('/dev/full: cannot be written: no space left on the disk');
    expect([code, stdout]).toEqual([2, '']);
  });

  it('a write that breaks off midway leaves the old file and no temporary one', async () => {
    mkdirSync(join(folder, 'narrow'));
    const target = write('narrow/nets.json', 'old');
    // The shell's limit of 1 KB a file stops the write where a full disk would.
    const script = 'ulimit -f 1; exec "$0" "$@"';
    const child = spawn('bash', ['-c', script, process.execPath, PROGRAM, 'nets', boardFile, '--json', target]);
    let stderr = '';
    child.stderr.setEncoding('utf8').on('data', (text: string) => (stderr += text));
    const code = await new Promise((resolve) => child.on('close', resolve));
    expect(stderr).toContain(`${target}: cannot be written: too large for the file system`);
    expect(code).toBe(2);
    expect(readFileSync(target, 'utf8')).toBe('old');
    expect(readdirSync(join(folder, 'narrow'))).toEqual(['nets.json']);
  });

  it('a failing job leaves the old file as it was', async () => {
    const old = write('result.json', 'old');
    const broken = write('nothing.board.json', { ...orchardBoard(), drives: [{ net: 'CLK', waveform: 'none' }] });
    expect((await runCli(['nets', broken, '--json', old])).code).toBe(2);
    expect(readFileSync(old, 'utf8')).toBe('old');
  });
});

describe('standard output', () => {
  it('--json - prints JSON and nothing else', async () => {
    const { code, stdout, stderr } = await runCli(['nets', boardFile, '--json', '-']);
    expect([code, stderr]).toEqual([0, '']);
    expect(JSON.parse(stdout).nets[0]).toMatchObject({
      name: 'CLK',
      layers: ['TOP'],
      vias: 1,
      drives: [{ pin: 'U1.3', waveform: 'clk' }],
      references: [{ layer: 'GND', net: 'GND' }],
    });
  });

  it('a reader that closes early is no failure', async () => {
    const child = spawn(process.execPath, [PROGRAM, 'limits', '--json', '-']);
    let stderr = '';
    child.stderr.setEncoding('utf8').on('data', (text: string) => (stderr += text));
    child.stdout.once('data', () => child.stdout.destroy());
    const code = await new Promise((resolve) => child.on('close', resolve));
    expect([code, stderr]).toEqual([0, '']);
  });

  it('shows hostile names harmless, cut, and within 80 columns', async () => {
    const board = orchardBoard();
    const red = '\x1b[31mCLK\u202egnd\x07';
    board.nets[0]!.name = red;
    board.drives![0]!.net = red;
    board.loads![0]!.net = red;
    board.nets[1]!.name = `DATA${'x'.repeat(900)}`;
    board.nets[1]!.pins![0]!.name = '\x9b2J';
    const file = write('hostile.json', board);
    const { code, stdout } = await runCli(['nets', file]);
    expect(code).toBe(0);
    expect(stdout.replaceAll('\n', '')).not.toMatch(/[\p{Cc}\p{Cf}]/u);
    expect(stdout).toContain('\\x1b[31mCLK\\u{202e}gnd\\x07');
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
    const json = (await runCli(['nets', file, '--json', '-'])).stdout;
    expect(json.replaceAll('\n', '')).not.toMatch(/[\p{Cc}\p{Cf}]/u);
    expect(JSON.parse(json).nets.map((net: { name: string }) => net.name)).toContain(red);
    const unknown = write('unknown.json', { ...orchardBoard(), drives: [{ net: red, waveform: 'clk' }] });
    expect((await runCli(['nets', unknown])).stderr.replaceAll('\n', '')).not.toMatch(/[\p{Cc}\p{Cf}]/u);
  });

  it('CSV holds what a spreadsheet must not run as text', async () => {
    const board = orchardBoard();
    board.nets[1]!.name = '=1+1,"x"';
    const csv = join(folder, 'nets.csv');
    await runCli(['nets', write('formula.json', board), '--csv', csv]);
    const lines = readFileSync(csv, 'utf8').split('\r\n');
    expect(lines).toHaveLength(5);
    expect(lines[2]).toMatch(/^"'=1\+1,""x""",(40|39\.99999\d*),0,TOP,GND:GND,0,/);
  });
});

const layouts = new URL('../../../shared/data/boards/ipc2581/', import.meta.url);
const hasLayouts = existsSync(layouts);
if (!hasLayouts) console.log('skipped: the layouts of ../shared/data/boards are absent');

describe.runIf(hasLayouts)('a layout in an open format', () => {
  const layout = new URL('kicad9-revC-DM0002.xml', layouts).pathname;

  it('becomes a board file that reads back, with a summary', async () => {
    const out = join(folder, 'dm.board.json');
    const { code, stdout } = await runCli(['import', layout, '-o', out]);
    expect(code).toBe(0);
    // Counts from the data folder's README.
    expect(stdout).toContain('Nets    64, of which 42 with traces');
    expect(stdout).toContain('436 segments, 0 arcs, 60 vias');
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80);
    expect(parseBoardFile(JSON.parse(readFileSync(out, 'utf8'))).nets.length).toBeGreaterThanOrEqual(64);
    const direct = (await runCli(['nets', layout, '--json', '-'])).stdout;
    expect((await runCli(['nets', out, '--json', '-'])).stdout).toBe(direct);
  });

  it('--json - prints the summary alone', async () => {
    const { stdout } = await runCli(['import', layout, '--json', '-']);
    expect(JSON.parse(stdout)).toMatchObject({ format: 'quietboard-import', nets: 64, segments: 436, vias: 60 });
  });
});
