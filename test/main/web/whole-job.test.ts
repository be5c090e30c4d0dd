import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import type { EventOf } from '../../../app/contract/events.ts';
import type { Output } from '../../../app/contract/procedures.ts';
import { runSettingsSchema } from '../../../app/project/run-settings.ts';
import { Project } from '../../../main/db/project.ts';
import { TestHost } from '../../support/host.ts';
import { testFolder } from '../../support/run-cli.ts';

/**
 * The window's whole job over HTTP, against the built program. Oracles: the contract; what a second connection to the project's
 * file sees; the estimate of the command line's own tests is not repeated here.
 */

const SAMPLE = new URL('../../../samples/valve-controller/', import.meta.url);
const sampleBytes = (name: string) => new Uint8Array(readFileSync(new URL(name, SAMPLE)));
/** Few lines and no planes: a second instead of half a minute. */
const QUICK = runSettingsSchema.parse({ structure: 'pair-only', maxHz: 200e6 });
const LONG = runSettingsSchema.parse({});

let host: TestHost;
let project: Output<'project.open'>['project'];
let opened: Output<'board.open'>;
const events: { name: string; payload: unknown }[] = [];
const ending = new AbortController();
const eventsNamed = <T>(name: string) =>
  events.filter((event) => event.name === name).map(({ payload }) => payload as T);

async function upload(name: string, bytes = sampleBytes(name)): Promise<string> {
  return (await host.call('file.upload', { name, bytes })).uploadId;
}

beforeAll(async () => {
  host = await TestHost.start({ home: testFolder().folder });
  await host.listen((name, payload) => events.push({ name, payload }), ending.signal);
  ({ project } = await host.call('project.open', { create: true }));
  const uploadIds = [await upload('rev-b.board.json'), await upload('rev-b.sources.json')];
  opened = await host.call('board.open', { projectId: project.projectId, jobId: 'open', uploadIds });
});
afterAll(async () => {
  ending.abort();
  await host.stop();
});

const document = () => ({ baseId: opened.baseId, sources: opened.sources });
const estimateInput = (jobId: string, settings = QUICK) => ({
  projectId: project.projectId,
  jobId,
  document: document(),
  settings,
  store: true,
});

test('a project without a place is a file in the program’s own folder', () => {
  expect(project.file).toBe(join(host.home, 'projects', 'Untitled.quietboard'));
  expect(project).toMatchObject({ name: 'Untitled', isReadOnly: false, runCount: 0 });
});

test('board and sources come back as one document, its base by id', async () => {
  const { base } = await host.call('base.get', { projectId: project.projectId, baseId: opened.baseId });
  expect(base).toEqual(opened.base);
  expect(base.layout.name).toBe('Orchard valve controller');
  expect(base.layout).not.toHaveProperty('drives');
  expect(opened.sources.drives!.length).toBeGreaterThan(3);
  expect(base.openingNotes.join()).toMatch(/^Sources from "rev-b.sources.json" \(SHA-256 [0-9a-f]{64}\)\.$/);
});

test('an estimate tells its progress and its lines as they come, and keeps the run', async () => {
  const { result, run } = await host.call('estimate.run', { ...estimateInput('quick'), note: 'first' });
  expect(run).toBe(1);
  const progress = eventsNamed<EventOf<'job.progress'>>('job.progress').filter(({ jobId }) => jobId === 'quick');
  expect(progress.at(-1)!.done).toBe(progress.at(-1)!.total);
  for (const [i, { done }] of progress.entries()) expect(done).toBeGreaterThanOrEqual(progress[i - 1]?.done ?? 0);
  const points = eventsNamed<EventOf<'job.points'>>('job.points').flatMap(({ points }) => points);
  // Every judged line has come; those alone in the receiver's bandwidth with their final level.
  const key = (point: (typeof points)[number]) => `${point.frequencyHz} ${point.detector}`;
  expect(new Set(points.map(key))).toEqual(new Set(result.points.map(key)));
  const { runs } = await host.call('runs.list', { projectId: project.projectId });
  expect(runs).toMatchObject([{ run: 1, note: 'first', worst: result.worst, verdict: result.verdict }]);
  const loaded = await host.call('runs.load', { projectId: project.projectId, run: 1 });
  expect(loaded.result).toEqual(result);
  expect(loaded.document).toEqual(document());
  expect(loaded.settings).toEqual(QUICK);
});

describe('stopping', () => {
  test('ends within a second and leaves nothing', async () => {
    const reply = host.reply('estimate.run', estimateInput('long', LONG));
    await vi.waitFor(
      () => expect(eventsNamed<EventOf<'job.progress'>>('job.progress').at(-1)!.jobId).toBe('long'),
      20_000,
    );
    const startMs = performance.now();
    expect(await host.call('job.stop', { jobId: 'long' })).toEqual({ wasRunning: true });
    expect(await reply).toMatchObject({ ok: false, error: { code: 'cancelled' } });
    expect(performance.now() - startMs).toBeLessThan(1000);
    expect((await host.call('runs.list', { projectId: project.projectId })).runs).toHaveLength(1);
    expect(await host.call('job.stop', { jobId: 'long' })).toEqual({ wasRunning: false });
  });

  test('a caller that goes away ends its job', async () => {
    const leaving = new AbortController();
    const reply = host.reply('estimate.run', estimateInput('left', LONG), leaving.signal).catch(() => 'left');
    await vi.waitFor(
      () => expect(eventsNamed<EventOf<'job.progress'>>('job.progress').at(-1)!.jobId).toBe('left'),
      20_000,
    );
    leaving.abort();
    expect(await reply).toBe('left');
    await vi.waitFor(async () => {
      expect(await host.call('job.stop', { jobId: 'left' })).toEqual({ wasRunning: false });
    });
    expect((await host.call('runs.list', { projectId: project.projectId })).runs).toHaveLength(1);
  });

  test('two jobs of one id are refused', async () => {
    const first = host.reply('estimate.run', estimateInput('same', LONG));
    await vi.waitFor(
      () => expect(eventsNamed<EventOf<'job.progress'>>('job.progress').at(-1)!.jobId).toBe('same'),
      20_000,
    );
    expect(await host.reply('estimate.run', estimateInput('same'))).toMatchObject({ error: { code: 'busy' } });
    await host.call('job.stop', { jobId: 'same' });
    expect(await first).toMatchObject({ error: { code: 'cancelled' } });
  });
});

describe('files', () => {
  const open = async (files: Record<string, string>, onto = false) => {
    const uploadIds: string[] = [];
    for (const [name, text] of Object.entries(files))
      uploadIds.push(await upload(name, new TextEncoder().encode(text)));
    const input = { projectId: project.projectId, jobId: 'files', uploadIds, ...(onto && { onto: document() }) };
    return host.reply('board.open', input);
  };

  test('a broken file is told by its name, never by where it was kept', async () => {
    const reply = await open({ 'broken.json': '{ "format": ' });
    expect(reply).toMatchObject({ ok: false, error: { code: 'file' } });
    expect(JSON.stringify(reply)).toMatch(/"broken\.json: line 1/);
    expect(JSON.stringify(reply)).not.toContain('tmp');
  });

  test.each([
    ['of another format', { 'a.xml': '<svg/>' }, 'a.xml: is an XML file of another kind (svg)'],
    ['that say nothing', { 'a.json': '{}' }, 'a.json:\n  format must be "quietboard-board"; received nothing'],
    ['with sources alone', { 's.json': '{"format":"quietboard-sources","version":1}' }, 'open a board first'],
  ])('files %s', async (_name, files, message) => {
    const reply = await open(files);
    expect(reply).toMatchObject({ ok: false });
    expect(JSON.stringify(reply)).toContain(JSON.stringify(message).slice(1, -1));
  });

  test('sources and a waveform table are added to the document that is open', async () => {
    const table = 'time,volts\n0,0\n1e-9,3.3\n20e-9,3.3\n21e-9,0\n39e-9,0\n';
    const sources = {
      format: 'quietboard-sources',
      version: 1,
      waveforms: [{ name: 'measured', kind: 'samples', file: 'edges/clock.csv', periodNs: 40 }],
    };
    const missing = await open({ 's.json': JSON.stringify(sources) }, true);
    expect(JSON.stringify(missing)).toContain('edges/clock.csv: is needed by the waveform');
    const reply = await open({ 's.json': JSON.stringify(sources), 'clock.csv': table }, true);
    expect(reply).toMatchObject({ ok: true });
    const { base, sources: merged } = (reply as { value: Output<'board.open'> }).value;
    expect(base.samples['edges/clock.csv']).toEqual({
      timesS: [0, 1e-9, 20e-9, 21e-9, 39e-9],
      values: [0, 3.3, 3.3, 0, 0],
    });
    expect(merged.waveforms!.map(({ name }) => name)).toContain('measured');
    expect(merged.drives).toEqual(opened.sources.drives);
  });

  test('script in a net name stays text inside JSON', async () => {
    const name = '</script><img src=x onerror=alert(1)>';
    const board = JSON.parse(new TextDecoder().decode(sampleBytes('rev-b.board.json')));
    board.nets[0].name = name;
    const response = await fetch(`${host.origin}/rpc/board.open`, {
      method: 'POST',
      headers: { Authorization: `Bearer ${host.token}`, 'Content-Type': 'application/json' },
      body: JSON.stringify({
        projectId: project.projectId,
        jobId: 'script',
        uploadIds: [await upload('a.json', new TextEncoder().encode(JSON.stringify(board)))],
      }),
    });
    expect(response.headers.get('content-type')).toBe('application/json');
    expect(response.headers.get('x-content-type-options')).toBe('nosniff');
    const reply = (await response.json()) as { value: Output<'board.open'> };
    expect(reply.value.base.layout.nets[0]!.name).toBe(name);
  });
});

describe('one project in two windows', () => {
  test('a draft of an old version is refused, the newest one is loaded', async () => {
    const { projectId } = project;
    const save = (basedOn: number, clientId: string) =>
      host.reply('draft.save', { projectId, document: document(), settings: QUICK, basedOn, clientId });
    expect(await save(0, 'one')).toEqual({ ok: true, value: { version: 1 } });
    expect(await save(0, 'two')).toMatchObject({ ok: false, error: { code: 'busy' } });
    expect(await save(1, 'two')).toEqual({ ok: true, value: { version: 2 } });
    const { draft } = await host.call('draft.load', { projectId });
    expect(draft).toEqual({ document: document(), settings: QUICK, version: 2 });
    const saves = eventsNamed<EventOf<'project.changed'>>('project.changed').filter(({ what }) => what === 'draft');
    expect(saves.map(({ clientId }) => clientId)).toEqual(['one', 'two']);
  });

  test('both have one id; the project stays open until the last one closes it', async () => {
    const again = await host.call('project.open', { file: project.file, create: false });
    expect(again.project.projectId).toBe(project.projectId);
    await host.call('project.close', { projectId: project.projectId });
    expect((await host.call('project.info', { projectId: project.projectId })).project.runCount).toBe(1);
  });

  test('what another program changes is told', async () => {
    events.length = 0;
    const other = Project.open(project.file);
    other.setNote(1, 'from elsewhere');
    other.close();
    await vi.waitFor(() => {
      const changes = eventsNamed<EventOf<'project.changed'>>('project.changed');
      expect(new Set(changes.map(({ what }) => what))).toEqual(new Set(['info', 'runs', 'draft', 'measurements']));
      expect(changes.every(({ clientId }) => clientId === null)).toBe(true);
    }, 3000);
    expect((await host.call('runs.list', { projectId: project.projectId })).runs[0]!.note).toBe('from elsewhere');
  });

  test('the program’s own writes are not taken for another’s', async () => {
    events.length = 0;
    await host.call('runs.note', { projectId: project.projectId, run: 1, note: 'from here' });
    await new Promise((resolve) => setTimeout(resolve, 1200));
    expect(eventsNamed<EventOf<'project.changed'>>('project.changed').map(({ what }) => what)).toEqual(['runs']);
  });
});

test('levers: prepared once, then quick answers; what they cannot tell is said', async () => {
  const { leversId } = await host.call('levers.prepare', {
    projectId: project.projectId,
    jobId: 'levers',
    document: document(),
    settings: QUICK,
  });
  const { result } = await host.call('runs.load', { projectId: project.projectId, run: 1 });
  const same = await host.call('levers.try', { leversId, sources: opened.sources, settings: QUICK });
  if ('needsSolve' in same) throw new Error(same.needsSolve);
  // What the levers promise beside an estimate (app/levers/levers.ts).
  expect(same.worst!.marginDb).toBeCloseTo(result.worst!.marginDb, 3);
  const other = await host.call('levers.try', {
    leversId,
    sources: { ...opened.sources, cables: [] },
    settings: QUICK,
  });
  expect(other).toEqual({ needsSolve: 'the cables are others' });
  await host.call('levers.release', { leversId });
  const gone = await host.reply('levers.try', { leversId, sources: opened.sources, settings: QUICK });
  expect(gone).toMatchObject({ ok: false, error: { code: 'input' } });
});

test('one line looked at closely', async () => {
  const { result } = await host.call('runs.load', { projectId: project.projectId, run: 1 });
  const worst = result.points.find(({ contributors }) => contributors[0]?.name === 'CLK_25M');
  const { detail } = await host.call('estimate.line-detail', {
    projectId: project.projectId,
    jobId: 'line',
    document: document(),
    settings: QUICK,
    frequencyHz: worst!.frequencyHz,
  });
  expect(detail.frequencyHz).toBe(worst!.frequencyHz);
  expect(detail.pieces.length).toBeGreaterThan(3);
});

describe('reports', () => {
  const run = { kind: 'run' as const, run: 1 };
  const render = (
    subject: Parameters<typeof host.call<'report.render'>>[1]['subject'],
    format: 'pdf' | 'html' | 'csv' | 'json' | 'junit',
  ) => host.call('report.render', { projectId: project.projectId, subject, format, dateText: '1 December 2026' });

  test.each([
    ['pdf', 'application/pdf', '%PDF-1.'],
    ['html', 'text/html; charset=utf-8', '<!doctype html>'],
    ['csv', 'text/csv; charset=utf-8', 'frequency'],
    ['json', 'application/json', '{\n  "format": "quietboard-result"'],
    ['junit', 'application/xml', '<?xml version="1.0" encoding="UTF-8"?>'],
  ] as const)('of a run as %s', async (format, mediaType, start) => {
    const report = await render(run, format);
    expect(report.mediaType).toBe(mediaType);
    expect(report.name).toMatch(/^Orchard valve controller B run 1\./);
    expect(new TextDecoder().decode(report.bytes.subarray(0, 200)).toLowerCase()).toContain(start.toLowerCase());
  });

  test('of a comparison and of the trend', async () => {
    await host.call('estimate.run', estimateInput('second'));
    const comparison = await host.call('runs.compare', { projectId: project.projectId, before: 1, after: 2 });
    expect(comparison.comparison.worstMarginChangeDb).toBe(0);
    const { trend } = await host.call('runs.trend', { projectId: project.projectId });
    expect(trend.groups.map(({ points }) => points.length)).toEqual([1]);
    for (const subject of [{ kind: 'comparison' as const, before: 1, after: 2 }, { kind: 'trend' as const }]) {
      const pdf = await render(subject, 'pdf');
      expect(new TextDecoder('latin1').decode(pdf.bytes.subarray(0, 5))).toBe('%PDF-');
    }
    const html = await render({ kind: 'comparison', before: 1, after: 2 }, 'html');
    expect(new TextDecoder().decode(html.bytes)).toContain('Comparison');
    const csv = await render({ kind: 'trend' }, 'csv');
    expect(csv.bytes.length).toBeGreaterThan(50);
    const wrong = host.reply('report.render', {
      projectId: project.projectId,
      subject: { kind: 'trend' },
      format: 'junit',
    });
    expect(await wrong).toMatchObject({ ok: false, error: { code: 'input', path: 'format' } });
  });
});

test('measurements: read, listed, deleted', async () => {
  const { projectId } = project;
  const uploadId = await upload(
    'lab.csv',
    new TextEncoder().encode('Frequency (MHz);dBµV/m;Detector\n50;31.5;QP\n125;38;PK\n'),
  );
  const { measurement } = await host.call('measurements.add', { projectId, uploadId, name: 'Lab', revision: 'B' });
  expect(measurement.points).toEqual([
    { frequencyHz: 50e6, levelDbuvPerM: 31.5, detector: 'quasi-peak' },
    { frequencyHz: 125e6, levelDbuvPerM: 38, detector: 'peak' },
  ]);
  expect((await host.call('measurements.list', { projectId })).measurements).toEqual([measurement]);
  await host.call('measurements.delete', { projectId, id: measurement.id });
  expect((await host.call('measurements.list', { projectId })).measurements).toEqual([]);
});

test('save as: a whole copy, open from then on; a file that is there is not overwritten', async () => {
  const { projectId } = project;
  const { project: copy } = await host.call('project.save-as', { projectId, file: 'Valve' });
  expect(copy.file).toBe(join(host.home, 'projects', 'Valve.quietboard'));
  expect(copy.projectId).not.toBe(projectId);
  expect((await host.call('runs.list', { projectId: copy.projectId })).runs).toHaveLength(2);
  expect(await host.reply('project.save-as', { projectId, file: 'Valve' })).toMatchObject({ ok: false });
  const { name, bytes } = await host.call('project.export', { projectId });
  expect(name).toBe('Untitled.quietboard');
  expect(new TextDecoder('latin1').decode(bytes.subarray(0, 15))).toBe('SQLite format 3');
});

test('killed and started again: nothing is lost, references still hold', async () => {
  const { home } = host;
  await host.kill();
  host = await TestHost.start({ home, project: project.file });
  const { startProject } = await host.call('app.info', {});
  const { projectId } = startProject!;
  const { draft } = await host.call('draft.load', { projectId });
  expect(draft).toEqual({ document: document(), settings: QUICK, version: 2 });
  const { base } = await host.call('base.get', { projectId, baseId: opened.baseId });
  expect(base).toEqual(opened.base);
  expect((await host.call('runs.list', { projectId })).runs).toHaveLength(2);
  const { projects } = await host.call('project.recent', {});
  expect(projects.map(({ name }) => name)).toEqual(['Valve', 'Untitled']);
});

test('the sample project opens within a second', async () => {
  const startMs = performance.now();
  const { project: sample } = await host.call('project.open-sample', {});
  const { draft } = await host.call('draft.load', { projectId: sample.projectId });
  expect(performance.now() - startMs).toBeLessThan(1000);
  expect(draft!.document.sources.drives!.length).toBeGreaterThan(3);
  const { project: another } = await host.call('project.open-sample', {});
  expect(another.file).not.toBe(sample.file);
});

test('Ctrl-C ends it with code 0, whatever it is doing, and leaves projects as single files', async () => {
  const other = await TestHost.start();
  const { project: own } = await other.call('project.open', { create: true });
  const uploadIds = [];
  for (const name of ['rev-b.board.json', 'rev-b.sources.json']) {
    uploadIds.push((await other.call('file.upload', { name, bytes: sampleBytes(name) })).uploadId);
  }
  const { projectId } = own;
  const { baseId, sources } = await other.call('board.open', { projectId, jobId: 'open', uploadIds });
  const input = { projectId, jobId: 'x', document: { baseId, sources }, settings: LONG, store: true };
  const reply = other.reply('estimate.run', input).catch(() => 'cut off');
  await new Promise((resolve) => setTimeout(resolve, 300));
  const startMs = performance.now();
  expect(await other.stop()).toBe(0);
  expect(performance.now() - startMs).toBeLessThan(2000);
  await reply;
  expect(existsSync(`${own.file}-wal`)).toBe(false);
});
