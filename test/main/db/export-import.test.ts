import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { exactJson } from '../../../app/project/exact-json.ts';
import { projectExportSchema } from '../../../app/project/project-export.ts';
import type { RunDocument } from '../../../app/project/stored-run.ts';
import { Project } from '../../../main/db/project.ts';
import { appFailure } from '../../support/app-failure.ts';
import { HOSTILE_NAMES, hostileResult } from '../../support/hostile-names.ts';
import { SETTINGS, sampleDocument, sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

const SEED = 20250304;

const folder = mkdtempSync(join(tmpdir(), 'quietboard-db-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));
let files = 0;
const nextFile = () => join(folder, `${files++}.quietboard`);

function textOf(project: Project): string {
  const pieces: string[] = [];
  project.exportText((text) => pieces.push(text));
  return pieces.join('');
}

/** Any text: halves of surrogate pairs, NUL, emoji, names of object internals, what the text columns use as a mark. */
const anyText = fc.oneof(
  { weight: 4, arbitrary: fc.string({ unit: 'binary', maxLength: 40 }) },
  {
    weight: 2,
    arbitrary: fc
      .array(fc.integer({ min: 0, max: 0xffff }), { maxLength: 12 })
      .map((codes) => String.fromCharCode(...codes)),
  },
  fc.constantFrom(...HOSTILE_NAMES),
  fc.constantFrom(
    '__proto__',
    'constructor',
    '\0',
    'a\0b',
    '😀',
    '\ud83d',
    '\ude00\ud83d',
    '\u0001json:"x"',
    '\u0001',
    'λ'.repeat(999),
  ),
);
const anyName = anyText.map((text) => text.slice(0, 900) || 'n');
const anyNumber = fc.double({ noNaN: true, noDefaultInfinity: true });

const bits = (number: number) => Buffer.from(new Float64Array([number]).buffer).toString('hex');

/** Data in a form that tells −0 from 0, own keys "__proto__" from prototypes, and the order of keys. */
function exactForm(value: unknown): unknown {
  if (typeof value === 'number') return bits(value);
  if (Array.isArray(value)) return value.map(exactForm);
  if (typeof value === 'object' && value !== null)
    return Object.entries(value).map(([key, item]) => [key, exactForm(item)]);
  return value;
}
const sortedForm = (value: unknown): unknown => JSON.parse(JSON.stringify(exactForm(value)));

const anyDocument: fc.Arbitrary<RunDocument> = fc
  .record({
    name: anyText,
    revision: anyText,
    net: anyName,
    files: fc.uniqueArray(anyName, { maxLength: 3 }),
    columns: fc.array(fc.tuple(anyNumber, anyNumber), { maxLength: 5 }),
    notes: fc.array(anyText, { maxLength: 3 }),
  })
  .map(({ name, revision, net, files: names, columns, notes }) => {
    const { board } = sampleDocument('b');
    return {
      board: { ...board, name, revision, nets: board.nets.map((one, i) => (i === 0 ? { ...one, name: net } : one)) },
      samples: Object.fromEntries(
        names.map((file) => [
          file,
          { timesS: columns.map(([timeS]) => timeS), values: columns.map(([, value]) => value) },
        ]),
      ),
      sourceSha256: 'ab'.repeat(32),
      openingNotes: notes,
    };
  });

const anyRun = fc
  .record({
    document: anyDocument,
    note: anyText.map((text) => text.slice(0, 9000)),
    levels: fc.array(anyNumber, { minLength: 5, maxLength: 5 }),
    cable: anyText,
  })
  .map(({ document, note, levels, cable }) => {
    const result = hostileResult();
    const [first, ...points] = result.points.slice(0, 3);
    const [contributor] = first!.contributors;
    const contributors = [
      {
        ...contributor!,
        levelDbuvPerM: levels[0]!,
        viaDbuvPerM: Object.fromEntries([
          [cable, levels[1]!],
          ['__proto__', levels[2]!],
          ['plane', -0],
        ]),
      },
    ];
    const changed = { ...first!, levelDbuvPerM: levels[3]!, marginDb: levels[4]!, contributors };
    const board = { ...result.board, name: document.board.name, revision: document.board.revision };
    return sampleRun('b', {
      document,
      note,
      result: { ...result, board, points: [changed, ...points], currentMaps: [] },
    });
  });

describe('export and import', () => {
  it('any project: every number bit for bit, every text, and export → import → export gives the same text', () => {
    const project = fc.record({
      runs: fc.array(anyRun, { minLength: 1, maxLength: 3 }),
      name: anyName.map((name) => name.slice(0, 200)),
      state: fc.array(fc.tuple(anyText, fc.jsonValue()), { maxLength: 3 }),
      measured: fc.array(fc.tuple(anyName, fc.double({ noNaN: true, min: 1, max: 1e12 }), anyNumber), { maxLength: 2 }),
      drafts: fc.array(anyDocument, { maxLength: 1 }),
    });
    fc.assert(
      fc.property(project, ({ runs, name, state, measured, drafts }) => {
        const first = Project.open(nextFile(), { create: true });
        first.setName(name);
        for (const run of runs) first.addRun(run);
        for (const [key, value] of state) first.putUiState(key, value);
        for (const [source, frequencyHz, levelDbuvPerM] of measured) {
          const points = [{ frequencyHz, levelDbuvPerM, detector: 'peak' as const }];
          first.addMeasurement({ name: source.slice(0, 200), revision: source, source, points });
        }
        for (const document of drafts) first.saveDraft({ document, settings: SETTINGS }, 0);
        first.deleteRun(1);
        first.addRun(runs[0]!);

        const exported = textOf(first);
        const file = nextFile();
        writeFileSync(`${file}.json`, exported);
        const second = Project.importFile(file, `${file}.json`);
        const third = Project.importJson(nextFile(), JSON.parse(exported));
        expect(textOf(second)).toBe(exported);
        expect(textOf(third)).toBe(exported);

        for (const copy of [first, second]) {
          const { document, result, note } = copy.run(runs.length + 1);
          const given = runs[0]!;
          expect(exactForm(result)).toEqual(exactForm(given.result));
          expect(note).toBe(given.note);
          expect(document.openingNotes).toEqual(given.document.openingNotes);
          expect(sortedForm(Object.entries(document.samples).sort())).toEqual(
            sortedForm(Object.entries(given.document.samples).sort()),
          );
          expect(document.board).toEqual(given.document.board);
          expect(copy.runs({ revision: given.document.board.revision }).length).toBeGreaterThan(0);
          expect(copy.runs()[0]).toMatchObject({
            board: given.document.board.name,
            revision: given.document.board.revision,
          });
          expect(copy.info().name).toBe(name);
          expect(copy.doctor().findings.filter(({ isFine }) => !isFine)).toEqual([]);
        }
        for (const one of [first, second, third]) one.close();
      }),
      { seed: SEED, numRuns: 30 },
    );
  });

  it('the export keeps to its schema, and holds a document once', () => {
    const project = Project.open(nextFile(), { create: true });
    for (const letter of ['a', 'a', 'b'] as const) project.addRun(sampleRun(letter));
    project.addMeasurement({
      name: 'm',
      revision: 'A',
      source: 's',
      points: [{ frequencyHz: 1e8, levelDbuvPerM: 1, detector: 'peak' }],
    });
    const json = project.exportJson();
    expect(projectExportSchema.parse(json)).toEqual(json);
    expect(json.documents.layout).toHaveLength(2);
    expect(json.runs.map(({ run }) => run)).toEqual([1, 2, 3]);
    project.close();
  });

  it('numbers of deleted runs stay used', () => {
    const project = Project.open(nextFile(), { create: true });
    project.addRun(sampleRun());
    project.addRun(sampleRun());
    project.deleteRun(2);
    const copy = Project.importJson(nextFile(), project.exportJson());
    expect(copy.addRun(sampleRun())).toBe(3);
    project.close();
    copy.close();
  });

  it('never replaces a file', () => {
    const project = Project.open(nextFile(), { create: true });
    const json = project.exportJson();
    const before = readFileSync(project.file);
    expect(appFailure(() => Project.importJson(project.file, json)).message).toContain('is there already');
    expect(readFileSync(project.file).equals(before)).toBe(true);
    project.close();
  });
});

describe('a wrong export is refused with the place, and no file is made', () => {
  const exported = () => {
    const project = Project.open(nextFile(), { create: true });
    project.addRun(sampleRun('a'));
    project.addRun(sampleRun('b'));
    project.saveDraft(sampleRun('a'), 0);
    const text = textOf(project);
    project.close();
    return JSON.parse(text) as ReturnType<Project['exportJson']>;
  };
  type Json = ReturnType<typeof exported>;
  const other = 'f'.repeat(64);
  const cases: [string, (json: Json) => unknown, RegExp][] = [
    ['another kind', () => ({ format: 'quietboard-board', version: 1 }), /^format must be "quietboard-project"/],
    ['a later version', (json) => ({ ...json, version: 2 }), /^version must be 1; received 2/],
    ['a list that is missing', ({ runs, ...json }) => json, /^runs must be a list/],
    ['a key that is not known', (json) => ({ ...json, extra: 1 }), /^extra must be left out/],
    [
      'a changed number',
      (json) => {
        const [result] = json.documents.result;
        const points = result!.document.points.with(0, { ...result!.document.points[0]!, marginDb: 99 });
        return {
          ...json,
          documents: {
            ...json.documents,
            result: json.documents.result.with(0, { ...result!, document: { ...result!.document, points } }),
          },
        };
      },
      /^documents\.result\[0\]\.sha256 must be [0-9a-f]{64}, as the document is \(it was changed\); received/,
    ],
    [
      'a wrong document',
      (json) => ({
        ...json,
        documents: { ...json.documents, settings: [{ sha256: other, document: { site: 'pool' } }] },
      }),
      /^documents\.settings\[0\]: document\.site must be "ground-plane" or "free-space"/,
    ],
    [
      'a run whose layout is missing',
      (json) => ({ ...json, runs: json.runs.with(1, { ...json.runs[1]!, layout: other }) }),
      /^runs\[1\]\.layout must be the hash of a document of this file/,
    ],
    [
      'a run whose result is missing',
      (json) => ({ ...json, runs: json.runs.with(1, { ...json.runs[1]!, result: other }) }),
      /^runs\[1\]\.result must be the hash/,
    ],
    [
      'samples that are missing',
      (json) => ({ ...json, documents: { ...json.documents, samples: [] } }),
      /^documents\.sources must be the hash of a document/,
    ],
    [
      'a draft without layout',
      (json) => ({ ...json, draft: { ...json.draft!, layout: other } }),
      /^draft\.layout must be the hash/,
    ],
    [
      'a run number twice',
      (json) => ({ ...json, runs: json.runs.with(1, { ...json.runs[1]!, run: 1 }) }),
      /^runs\[1\]\.run must be a number that no other run has; received 1/,
    ],
    ['a last run below the runs', (json) => ({ ...json, lastRun: 1 }), /^lastRun must be at least 2/],
    ['null', () => null, /^the file must be an object/],
  ];

  it.each(cases)('%s', (_, change, message) => {
    const file = nextFile();
    const json = change(exported());
    const { code, message: told } = appFailure(() => Project.importJson(file, json));
    expect(told).toMatch(message);
    expect(code).toBe('input');
    expect(appFailure(() => Project.open(file)).message).toContain('not found');
    // The same from a file.
    writeFileSync(`${file}.json`, exactJson(json));
    expect(appFailure(() => Project.importFile(file, `${file}.json`)).message).toMatch(message);
    expect(appFailure(() => Project.open(file)).message).toContain('not found');
  });

  it.each([
    ['', /must be JSON; the whole is not/],
    ['{"runs":[1,]}', /runs\[0\]/],
    ['{"runs":[{"run":1} {}]}', /must be JSON; runs\[0\] is not/],
    ['{"format":"quietboard-project"', /must be JSON; the whole is not/],
    ['{"runs":["', /must be JSON; the whole is not/],
    ['{"runs":[]]', /must be JSON; the whole is not/],
    [Buffer.from([0x7b, 0xff, 0x7d]), /must be UTF-8/],
  ])('a file that is no JSON: %j', (content, message) => {
    const file = join(temporaryFolder(), 'export.json');
    writeFileSync(file, content);
    expect(appFailure(() => Project.importFile(nextFile(), file)).message).toMatch(message);
  });
});
