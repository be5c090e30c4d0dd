import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { Project } from '../../../main/db/project.ts';
import { appFailure } from '../../support/app-failure.ts';
import { resultOf, SETTINGS, sampleDocument, sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

const newProject = () => Project.open(join(temporaryFolder(), 'valve.quietboard'), { create: true });

describe('runs', () => {
  it('come back as they went in, after closing and opening', () => {
    const project = newProject();
    const run = sampleRun('b', { note: 'first try' });
    expect(project.addRun(run)).toBe(1);
    project.close();
    const again = Project.open(project.file);
    const { document, settings, result, note, durationS, startedAt } = again.run(1);
    expect({ document, settings, result, note, durationS, startedAt }).toStrictEqual(run);
    again.close();
  });

  it('results keep the order of their keys', () => {
    const project = newProject();
    const { result } = sampleRun();
    project.addRun(sampleRun());
    expect(JSON.stringify(project.run(1).result)).toBe(JSON.stringify(result));
    project.close();
  });

  it('are listed newest first, by revision and to a limit, with what the result says', () => {
    const project = newProject();
    for (const letter of ['a', 'b', 'b', 'c'] as const) project.addRun(sampleRun(letter));
    expect(project.runs().map(({ run, revision }) => `${run}${revision}`)).toEqual(['4C', '3B', '2B', '1A']);
    expect(project.runs({ revision: 'B' }).map(({ run }) => run)).toEqual([3, 2]);
    expect(project.runs({ limit: 1 }).map(({ run }) => run)).toEqual([4]);
    const { result } = sampleRun('c');
    expect(project.runs()[0]).toMatchObject({
      board: result.board.name,
      standard: result.limit.standard,
      class: result.limit.class,
      distanceM: result.limit.distanceM,
      requiredMarginDb: result.limit.requiredMarginDb,
      structure: result.structure,
      worst: result.worst,
      verdict: result.verdict,
      programVersion: result.program.version,
      startedAt: sampleRun().startedAt,
      note: '',
    });
    project.close();
  });

  it('a run that is not there is refused with those that are', () => {
    const project = newProject();
    expect(appFailure(() => project.run(1)).message).toBe('run must be a stored run (there is none yet); received 1');
    for (let i = 0; i < 5; i++) project.addRun(sampleRun());
    project.deleteRun(3);
    for (const use of [() => project.run(9), () => project.setNote(9, ''), () => project.deleteRun(9)]) {
      const { code, message } = appFailure(use);
      expect({ code, message }).toEqual({ code: 'input', message: 'run must be one of 1 to 2, 4 to 5; received 9' });
    }
    project.close();
  });

  it('notes change; too long ones are refused', () => {
    const project = newProject();
    project.addRun(sampleRun());
    project.setNote(1, 'after the layer change');
    expect(project.runs()[0]!.note).toBe('after the layer change');
    expect(appFailure(() => project.setNote(1, 'x'.repeat(10_001))).code).toBe('input');
    project.close();
  });

  it('a number is never given twice', () => {
    const project = newProject();
    project.addRun(sampleRun());
    project.addRun(sampleRun());
    project.deleteRun(2);
    expect(project.addRun(sampleRun())).toBe(3);
    project.close();
  });

  it('a run that JSON cannot hold leaves nothing behind', () => {
    const project = newProject();
    const document = sampleDocument();
    const bad = { ...document, samples: { 'scope.csv': { timesS: [0, 1], values: [0, Number.NaN] } } };
    const { code, message } = appFailure(() => project.addRun(sampleRun('a', { document: bad })));
    expect({ code, message }).toEqual({ code: 'input', message: 'values[1] must be a finite number; received "NaN"' });
    const result = resultOf(document, { notes: [undefined as unknown as string] });
    expect(appFailure(() => project.addRun(sampleRun('a', { result }))).code).toBe('input');
    expect(Object.values(project.doctor().counts)).toEqual([0, 0, 0, 0, 0, 0, 0, 0, 0, 0]);
    expect(project.addRun(sampleRun())).toBe(1);
    project.close();
  });
});

describe('documents', () => {
  const counts = (project: Project) => project.doctor().counts;

  it('are kept once, however many runs name them, and go with the last of them', () => {
    const project = newProject();
    const worse = resultOf(sampleDocument(), { verdict: 'exceeds', notes: ['another'] });
    project.addRun(sampleRun('a'));
    project.addRun(sampleRun('a', { result: worse }));
    project.addRun(sampleRun('b'));
    expect(counts(project)).toMatchObject({
      run: 3,
      layout: 2,
      sources: 2,
      samples: 1,
      opening: 1,
      settings: 1,
      result: 3,
    });
    const [, second, first] = project.runs();
    expect(second!.layoutSha256).toBe(first!.layoutSha256);
    project.deleteRun(1);
    expect(counts(project)).toMatchObject({ run: 2, layout: 2, sources: 2, samples: 1, result: 2 });
    project.deleteRun(3);
    expect(counts(project)).toMatchObject({ run: 1, layout: 1, sources: 1, samples: 1, result: 1 });
    project.deleteRun(2);
    expect(Object.values(counts(project))).toEqual([0, 0, 0, 0, 0, 0, 0, 0, 0, 0]);
    project.close();
  });

  it('other samples under the same file name are other sources of the same layout', () => {
    const project = newProject();
    const document = sampleDocument();
    project.addRun(sampleRun());
    const samples = { 'scope.csv': { timesS: [0, 1e-9], values: [0, 1] } };
    project.addRun(sampleRun('a', { document: { ...document, samples } }));
    const [second, first] = project.runs();
    expect(second!.layoutSha256).toBe(first!.layoutSha256);
    expect(second!.sourcesSha256).not.toBe(first!.sourcesSha256);
    expect(project.run(2).document.samples).toStrictEqual(samples);
    expect(project.run(1).document.samples).toStrictEqual(document.samples);
    project.close();
  });

  it('the order of keys makes no other document', () => {
    const project = newProject();
    const document = sampleDocument();
    const turned = Object.fromEntries(Object.entries(document.board).reverse()) as unknown as typeof document.board;
    project.addRun(sampleRun());
    project.addRun(sampleRun('a', { document: { ...document, board: turned } }));
    expect(counts(project)).toMatchObject({ layout: 1, sources: 1 });
    project.close();
  });
});

describe('revisions', () => {
  it('one for each board, revision and layout, with the margins of every set-up', () => {
    const project = newProject();
    const document = sampleDocument('a');
    const withMargin = (marginDb: number, standard = 'CISPR 32') => {
      const base = resultOf(document);
      return resultOf(document, {
        worst: { frequencyHz: 50e6, marginDb },
        limit: { ...base.limit, standard },
      });
    };
    project.addRun(sampleRun('a', { result: withMargin(-4.5) }));
    project.addRun(sampleRun('b'));
    project.addRun(sampleRun('a', { result: withMargin(2.5), startedAt: '2025-03-05T00:00:00.000Z' }));
    project.addRun(sampleRun('a', { result: withMargin(7, 'FCC 15.109') }));
    project.addRun(sampleRun('a', { result: resultOf(document, { worst: null, structure: 'pair-only' }) }));
    const [a, b, ...others] = project.revisions();
    expect(others).toEqual([]);
    expect(b).toMatchObject({ revision: 'B', firstRun: 2, lastRun: 2, runs: 1 });
    expect(a).toMatchObject({ revision: 'A', firstRun: 1, lastRun: 5, runs: 4, firstStartedAt: sampleRun().startedAt });
    const setups = a!.setups.map(({ standard, structure, runs, lastRun, lastMarginDb, lowestMarginDb }) =>
      [standard, structure, runs, lastRun, lastMarginDb, lowestMarginDb].join(' '),
    );
    expect(setups).toEqual(['CISPR 32 solved 2 3 2.5 -4.5', 'FCC 15.109 solved 1 4 7 7', 'CISPR 32 pair-only 1 5  ']);
    project.close();
  });
});

describe('measurements, state of the window, draft', () => {
  const measured = {
    name: 'chamber, 3 m',
    revision: 'A',
    source: 'laboratory report 12',
    points: [
      { frequencyHz: 125e6, levelDbuvPerM: 41.25, detector: 'quasi-peak' as const, polarization: 'vertical' as const },
      { frequencyHz: 1.5e9, levelDbuvPerM: 44.1, detector: 'average' as const },
    ],
  };

  it('measured data is kept and deleted; a number is never given twice', () => {
    const project = newProject();
    expect(project.addMeasurement(measured)).toStrictEqual({ id: 1, ...measured });
    expect(project.addMeasurement({ ...measured, name: 'again' }).id).toBe(2);
    project.deleteMeasurement(2);
    expect(project.addMeasurement({ ...measured, name: 'third' }).id).toBe(3);
    expect(project.measurements().map(({ id }) => id)).toEqual([1, 3]);
    expect(project.measurements()[0]).toStrictEqual({ id: 1, ...measured });
    expect(appFailure(() => project.deleteMeasurement(2)).message).toBe('measurement must be one of 1, 3; received 2');
    expect(appFailure(() => project.addMeasurement({ ...measured, points: [] })).path).toBe('points');
    project.close();
  });

  it('state of the window: any JSON by key', () => {
    const project = newProject();
    expect(project.uiState('zoom')).toBeUndefined();
    for (const value of [{ x: [1, null, 'µ'] }, null, 0, 'text', false]) {
      project.putUiState('zoom', value);
      expect(project.uiState('zoom')).toStrictEqual(value);
    }
    project.putUiState('zoom', undefined);
    expect(project.uiState('zoom')).toBeUndefined();
    project.close();
  });

  it('the draft counts its saves, and refuses one that is based on an older', () => {
    const project = newProject();
    expect(project.draft()).toBeUndefined();
    const draft = { document: sampleDocument('c'), settings: SETTINGS };
    expect(project.saveDraft({ document: sampleDocument('a'), settings: SETTINGS }, 0)).toBe(1);
    expect(project.saveDraft(draft, 1)).toBe(2);
    expect(project.draft()).toMatchObject({ version: 2, ...draft });
    expect(appFailure(() => project.saveDraft(draft, 1)).code).toBe('busy');
    expect(project.doctor().counts).toMatchObject({ draft: 1, layout: 1, sources: 1 });
    project.addRun(sampleRun('c'));
    project.deleteRun(1);
    expect(project.draft()).toMatchObject(draft);
    project.close();
  });
});

describe('the file', () => {
  it('is one file after closing; its kind is told by any program', () => {
    const project = newProject();
    project.addRun(sampleRun());
    project.close();
    expect(readdirSync(join(project.file, '..'))).toEqual(['valve.quietboard']);
    const start = readFileSync(project.file).subarray(0, 100);
    expect(start.toString('latin1', 68, 72)).toBe('QBrd');
    expect(start.readUInt32BE(60)).toBe(10);
  });

  it('knows its name and the versions that made and wrote it', () => {
    const project = newProject();
    const version = (JSON.parse(readFileSync('package.json', 'utf8')) as { version: string }).version;
    expect(project.info()).toMatchObject({ name: 'valve', createdBy: version, writtenBy: version, schemaVersion: 10 });
    project.setName('Orchard valves');
    expect(project.info().name).toBe('Orchard valves');
    expect(appFailure(() => project.setName('')).path).toBe('name');
    project.close();
  });

  it('of an unknown name is made only when asked', () => {
    const file = join(temporaryFolder(), 'none.quietboard');
    expect(appFailure(() => Project.open(file)).message).toBe(`${file}: cannot be read: not found`);
    expect(readdirSync(join(file, '..'))).toEqual([]);
  });

  it.each([' leading.quietboard', 'a b?#%:é.quietboard', 'file:x.quietboard', ':memory:', 'quote\'".quietboard'])(
    'may be called %j',
    (name) => {
      const folder = temporaryFolder();
      const project = Project.open(join(folder, name), { create: true });
      project.addRun(sampleRun());
      project.close();
      expect(readdirSync(folder)).toEqual([name]);
      const again = Project.open(join(folder, name));
      expect(again.runs()).toHaveLength(1);
      again.close();
    },
  );

  it('may not be called with a space at the end, which the library would cut off', () => {
    const file = join(temporaryFolder(), 'name ');
    expect(appFailure(() => Project.open(file, { create: true })).message).toContain('does not end with a space');
  });
});
