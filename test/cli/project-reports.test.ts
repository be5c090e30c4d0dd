import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { SaxesParser } from 'saxes';
import { beforeAll, describe, expect, it } from 'vitest';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { clockBoard, SHORT } from '../support/cli-project.ts';
import { runCli, testFolder } from '../support/run-cli.ts';

const { folder, write } = testFolder();
const project = join(folder, 'valve.quietboard');
const at = (name: string) => join(folder, name);
const on = (command: string, ...args: string[]) => runCli([command, '--project', project, ...args]);
const bytes = (name: string): Buffer => readFileSync(at(name));
const FORMATS = ['pdf', 'html', 'csv', 'json', 'junit'] as const;
const outputs = (stem: string, formats: readonly string[] = FORMATS) =>
  formats.flatMap((format) => [`--${format}`, at(`${stem}.${format}`)]);

beforeAll(async () => {
  const [quiet, loud] = [write('a.board.json', clockBoard('A', 0.1)), write('b.board.json', clockBoard('B', 500))];
  const margin = ['--required-margin', '6', '--author', 'A. Designer'];
  const codes = [
    (await runCli(['estimate', quiet, ...SHORT, ...margin, '--project', project, ...outputs('first')])).code,
    (await runCli(['estimate', loud, ...SHORT, ...margin, '--project', project, '--junit', at('loud.junit')])).code,
  ];
  expect(codes).toEqual([0, 1]);
}, 60_000);

/** Pages of a PDF file; the objects of its pages are not compressed. */
const pageCount = (pdf: Buffer): number => pdf.toString('latin1').match(/\/Type \/Page\b/g)!.length;

describe('the same stored run gives the same bytes', () => {
  it('when it is estimated and whenever it is shown, in every format', async () => {
    expect((await on('show', '1', '--author', 'A. Designer', ...outputs('again'))).code).toBe(0);
    for (const format of FORMATS) expect(bytes(`again.${format}`).equals(bytes(`first.${format}`))).toBe(true);
    expect(bytes('first.pdf').toString('latin1', 0, 5)).toBe('%PDF-');
    expect(pageCount(bytes('first.pdf'))).toBeGreaterThan(2);
  });

  it('of a comparison and a trend, too', async () => {
    for (const [command, ...runs] of [['compare', '1', '2'], ['trend']] as const) {
      for (const stem of ['x', 'y']) {
        expect((await on(command, ...runs, ...outputs(stem, ['pdf', 'html', 'csv', 'json']))).code).toBe(0);
      }
      for (const format of ['pdf', 'html', 'csv', 'json']) {
        expect(bytes(`x.${format}`).equals(bytes(`y.${format}`))).toBe(true);
      }
    }
  });

  it('another run, paper, author or date gives another report of as many pages, on paper of its own', async () => {
    const widthOf = (pdf: Buffer) => Number(/\/MediaBox \[0 0 ([\d.]+)/.exec(pdf.toString('latin1'))![1]);
    await on('show', '1', '--pdf', at('other.pdf'), '--author', 'B. Reader', '--date', '1 May 2031');
    await on('show', '1', '--pdf', at('letter.pdf'), '--author', 'A. Designer', '--paper', 'Letter');
    expect(bytes('other.pdf').equals(bytes('first.pdf'))).toBe(false);
    expect(pageCount(bytes('other.pdf'))).toBe(pageCount(bytes('first.pdf')));
    // ISO 216 A4: 210 mm; US Letter: 8.5 in; in points of 1/72 in.
    expect(widthOf(bytes('first.pdf'))).toBeCloseTo((210 / 25.4) * 72, 1);
    expect(widthOf(bytes('letter.pdf'))).toBeCloseTo(8.5 * 72, 1);
  });
});

interface Case {
  readonly name: string;
  outcome: 'passed' | 'failure' | 'skipped' | 'error';
  text: string;
}

/** Test cases of a JUnit file, read by a strict XML parser, with the counts its suite gives. */
function junitOf(name: string): { cases: Case[]; suite: Record<string, string> } {
  const cases: Case[] = [];
  let suite: Record<string, string> = {};
  const parser = new SaxesParser();
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', (tag) => {
    const attributes = tag.attributes as Record<string, string>;
    if (tag.name === 'testsuite') suite = attributes;
    if (tag.name === 'testcase') cases.push({ name: attributes.name!, outcome: 'passed', text: '' });
    if (tag.name !== 'failure' && tag.name !== 'skipped' && tag.name !== 'error') return;
    Object.assign(cases.at(-1)!, { outcome: tag.name, text: attributes.message });
  });
  parser.write(readFileSync(at(name), 'utf8')).close();
  return { cases, suite };
}

describe('JUnit', () => {
  it('has a case for every band of the limit line; all pass where every margin is kept', () => {
    const { cases, suite } = junitOf('first.junit');
    // CISPR 32 class B at 3 m has a step at 230 MHz; the bands above 1 GHz (average, peak) were not judged.
    expect(cases.map(({ name, outcome }) => [name, outcome])).toEqual([
      ['quasi-peak 30–230 MHz', 'passed'],
      ['quasi-peak 230 MHz–1 GHz', 'passed'],
      ...cases.slice(2).map(({ name }) => [name, 'skipped']),
    ]);
    expect(suite).toMatchObject({ failures: '0', errors: '0', tests: String(cases.length) });
  });

  it('fails exactly the bands whose worst margin falls short, with the reading that says so', async () => {
    const { cases, suite } = junitOf('loud.junit');
    const { points } = JSON.parse((await on('show', '2', '--json', '-')).stdout) as EstimateResult;
    const edgesHz = [30e6, 230e6, 1e9];
    for (const [i, fromHz] of edgesHz.slice(0, 2).entries()) {
      const own = points.filter(({ frequencyHz }) => frequencyHz >= fromHz && frequencyHz < edgesHz[i + 1]!);
      const worst = own.reduce((held, next) => (next.marginDb < held.marginDb ? next : held));
      expect(worst.marginDb).toBeLessThan(6);
      expect(cases[i]!.outcome).toBe('failure');
      expect(cases[i]!.text).toContain(`${Math.round(worst.frequencyHz / 1e6)} MHz: `);
      expect(cases[i]!.text).toContain(`margin ${worst.marginDb.toFixed(1)} dB (required 6 dB), mainly net CLK`);
    }
    expect(suite).toMatchObject({ failures: '2', errors: '0' });
  });

  it('of a stored run is the same file', async () => {
    await on('show', '2', '--junit', at('stored.junit'));
    expect(bytes('stored.junit').equals(bytes('loud.junit'))).toBe(true);
  });
});

describe('repeatable', () => {
  it('one thread and two give the stored result bit for bit', async () => {
    // The built ones: threads run built JavaScript.
    const built = <T>(path: string) => import(new URL(`../../dist/main/${path}`, import.meta.url).href) as Promise<T>;
    const { runEstimate } = await built<typeof import('../../main/jobs/run-estimate.ts')>('jobs/run-estimate.js');
    const { estimateJob } = await built<typeof import('../../main/jobs/estimate-job.ts')>('jobs/estimate-job.js');
    const { Project } = await built<typeof import('../../main/db/project.ts')>('db/project.js');
    const stored = Project.open(project, { readOnly: true });
    const { document, settings, programVersion, result } = stored.run(2);
    stored.close();
    for (const threads of [1, 2]) {
      const again = await runEstimate(estimateJob(document, settings, programVersion), {}, threads);
      expect(JSON.stringify(again)).toBe(JSON.stringify(result));
    }
  });

  it('rerun ends with 1 and says what differs where the stored result is another one', async () => {
    const file = at('changed.json');
    expect((await on('export', file)).code).toBe(0);
    const { createHash } = await import('node:crypto');
    const { exactJson } = await import('../../app/project/exact-json.ts');
    const exported = JSON.parse(readFileSync(file, 'utf8')) as {
      documents: { result: { sha256: string; document: EstimateResult }[] };
      runs: { run: number; result: string }[];
    };
    // A stored result 0.25 dB higher at its worst reading, under the hash it then has.
    const entry = exported.documents.result.find(({ sha256 }) => sha256 === exported.runs[0]!.result)!;
    const [worst, ...others] = entry.document.points;
    const points = [{ ...worst!, levelDbuvPerM: worst!.levelDbuvPerM + 0.25 }, ...others];
    entry.document = { ...entry.document, points };
    entry.sha256 = createHash('sha256').update(exactJson(entry.document)).digest('hex');
    exported.runs[0]!.result = entry.sha256;
    const other = at('changed.quietboard');
    expect(await runCli(['restore', write('changed.json', exported), '--project', other])).toMatchObject({ code: 0 });
    const run = await runCli(['rerun', '1', '--project', other]);
    expect([run.code, run.stderr]).toEqual([1, '']);
    expect(run.stdout.replaceAll('\n', ' ')).toContain(
      `another result: levels differ by up to 0.25 dB (at ${Math.round(worst!.frequencyHz / 1e6)} MHz)`,
    );
    expect((await runCli(['rerun', '2', '--project', other])).code).toBe(0);
  });
});
