import { SaxesParser } from 'saxes';
import { describe, expect, it } from 'vitest';
import { limitLinesOf } from '../../app/compare/bands.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import { junitReport } from '../../app/report/junit.ts';
import { HOSTILE_NAMES, hostileResult } from '../support/hostile-names.ts';
import { denseResult, emptyResult, resultWith, sampleResult } from '../support/sample-result.ts';

const LINES = limitLinesOf(runSettingsSchema.parse({}))!;

interface Node {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: Node[];
  text: string;
}

/** Parses strictly and rejects characters outside XML 1.0's Char production (section 2.2), which saxes lets pass in part. */
function parse(source: string): Node {
  expect(source).not.toMatch(/[^\t\n\r\u{20}-\u{d7ff}\u{e000}-\u{fffd}\u{10000}-\u{10ffff}]/u);
  const root: Node = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  const parser = new SaxesParser();
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', ({ name, attributes }) => {
    const node: Node = { name, attributes: attributes as Record<string, string>, children: [], text: '' };
    open.at(-1)!.children.push(node);
    open.push(node);
  });
  parser.on('closetag', () => void open.pop());
  parser.on('text', (text) => {
    open.at(-1)!.text += text;
  });
  parser.write(source).close();
  return root.children[0]!;
}

/**
 * What build servers agree on (the schema of the xUnit plugin "junit-10.xsd", from memory): elements, their order, their
 * required attributes, integer counts.
 */
const ALLOWED: Readonly<
  Record<string, { children: readonly string[]; required: readonly string[]; optional: readonly string[] }>
> = {
  testsuites: {
    children: ['testsuite'],
    required: [],
    optional: ['name', 'time', 'tests', 'failures', 'errors', 'skipped'],
  },
  testsuite: {
    children: ['properties', 'testcase', 'system-out', 'system-err'],
    required: ['name', 'tests'],
    optional: ['failures', 'errors', 'skipped', 'time', 'timestamp', 'hostname', 'id', 'package'],
  },
  properties: { children: ['property'], required: [], optional: [] },
  property: { children: [], required: ['name', 'value'], optional: [] },
  testcase: {
    children: ['skipped', 'error', 'failure', 'system-out', 'system-err'],
    required: ['name'],
    optional: ['classname', 'time', 'status', 'assertions'],
  },
  failure: { children: [], required: [], optional: ['type', 'message'] },
  skipped: { children: [], required: [], optional: ['type', 'message'] },
  'system-out': { children: [], required: [], optional: [] },
};

function checkSchema(node: Node): void {
  const rule = ALLOWED[node.name];
  if (!rule) throw new Error(`element ${node.name} is not in the schema`);
  const names = Object.keys(node.attributes);
  for (const name of rule.required) expect(names, node.name).toContain(name);
  for (const name of names) expect([...rule.required, ...rule.optional], node.name).toContain(name);
  for (const name of ['tests', 'failures', 'errors', 'skipped']) {
    if (node.attributes[name] !== undefined) expect(node.attributes[name]).toMatch(/^\d+$/);
  }
  const order = node.children.map((child) => rule.children.indexOf(child.name));
  expect(order, `children of ${node.name}`).toEqual(order.toSorted((a, b) => a - b));
  expect(order).not.toContain(-1);
  if (rule.children.length > 0) expect(node.text.trim(), node.name).toBe('');
  for (const child of node.children) checkSchema(child);
}

const suiteOf = (result: EstimateResult, options = {}) => parse(junitReport(result, LINES, options)).children[0]!;
const casesOf = (suite: Node) => suite.children.filter(({ name }) => name === 'testcase');
const outcome = (test: Node) =>
  test.children.find(({ name }) => name === 'failure' || name === 'skipped')?.name ?? 'passed';

describe('JUnit XML', () => {
  it.each<[string, EstimateResult]>([
    ['a usual result', sampleResult()],
    ['thousands of readings', denseResult(3000)],
    ['no line', emptyResult()],
    ['hostile names', hostileResult()],
  ])('keeps to the schema of build servers: %s', (_name, result) => {
    const root = parse(junitReport(result, LINES, { startedAt: '2031-04-05T06:07:08.123Z', run: 3 }));
    checkSchema(root);
    for (const suite of [root, root.children[0]!]) {
      const tests = casesOf(root.children[0]!);
      expect(Number(suite.attributes.tests)).toBe(tests.length);
      expect(Number(suite.attributes.failures)).toBe(tests.filter((test) => outcome(test) === 'failure').length);
      expect(Number(suite.attributes.skipped)).toBe(tests.filter((test) => outcome(test) === 'skipped').length);
    }
  });

  it('has one case a limit band, named the same whatever the board emits', () => {
    const names = (result: EstimateResult) => casesOf(suiteOf(result)).map(({ attributes }) => attributes.name);
    expect(names(sampleResult())).toEqual([
      'quasi-peak 30–230 MHz',
      'quasi-peak 230 MHz–1 GHz',
      'average 1–3 GHz',
      'average 3–6 GHz',
      'peak 1–3 GHz',
      'peak 3–6 GHz',
    ]);
    expect(names(emptyResult())).toEqual(names(sampleResult()));
    expect(names(denseResult(500))).toEqual(names(sampleResult()));
    expect(new Set(casesOf(suiteOf(sampleResult())).map(({ attributes }) => attributes.classname))).toEqual(
      new Set(['quietboard.CISPR 32 class B at 3 m']),
    );
  });

  it('fails a band when its worst margin is below the required one, and only then', () => {
    const [base] = sampleResult().points;
    const result = (lowDb: number, highDb: number) =>
      resultWith([
        { ...base!, frequencyHz: 60e6, limitDbuvPerM: 40, marginDb: lowDb, levelDbuvPerM: 40 - lowDb },
        { ...base!, frequencyHz: 600e6, limitDbuvPerM: 47, marginDb: highDb, levelDbuvPerM: 47 - highDb },
      ]);
    const outcomes = (lowDb: number, highDb: number) =>
      casesOf(suiteOf(result(lowDb, highDb)))
        .slice(0, 2)
        .map(outcome);
    // The sample requires 6 dB.
    expect(outcomes(6, 6)).toEqual(['passed', 'passed']);
    expect(outcomes(5.999, 6)).toEqual(['failure', 'passed']);
    expect(outcomes(7, -0.01)).toEqual(['passed', 'failure']);
  });

  it('says which line, by how much, and who', () => {
    const [worst] = sampleResult().points;
    const failure = casesOf(suiteOf(sampleResult()))
      .flatMap(({ children }) => children)
      .find(({ name }) => name === 'failure')!;
    const mhz = worst!.frequencyHz / 1e6;
    expect(failure.attributes.message).toContain(
      `${mhz} MHz: ${worst!.levelDbuvPerM.toFixed(1)} dBµV/m against ${worst!.limitDbuvPerM.toFixed(1)} dBµV/m`,
    );
    expect(failure.attributes.message).toContain(
      `margin ${worst!.marginDb.toFixed(1)} dB (required 6 dB), mainly net CLK_25M through damper cable`,
    );
    expect(failure.attributes.type).toBe('limit exceeded');
    // By hand from the rule: every reading of the band short of 6 dB, at most ten of them named.
    const shortCount = (result: EstimateResult) =>
      result.points.filter(({ frequencyHz, marginDb }) => frequencyHz <= 230e6 && marginDb < 6).length;
    expect(failure.text.split('\n')).toHaveLength(shortCount(sampleResult()));
    const many = denseResult(4000);
    const crowded = resultWith(many.points.map((point) => ({ ...point, marginDb: point.marginDb - 30 })));
    const [first] = casesOf(suiteOf(crowded)).flatMap(({ children }) => children);
    expect(shortCount(crowded)).toBeGreaterThan(10);
    expect(first!.text.split('\n').slice(10)).toEqual([`and ${shortCount(crowded) - 10} more`]);
  });

  it('passes a judged band without a line, with a note, and skips a band that was not judged', () => {
    const tests = casesOf(suiteOf(emptyResult()));
    expect(tests.map(outcome)).toEqual(['passed', 'passed', 'skipped', 'skipped', 'skipped', 'skipped']);
    expect(tests[0]!.children[0]!.text).toBe('No line of the board in this band.');
    expect(tests[2]!.children[0]!.attributes.message).toBe(
      'not judged: the range ends at 1 GHz (highest clock 25 MHz: 1 GHz)',
    );
  });

  it('carries what was estimated, and its caveats', () => {
    const suite = suiteOf(sampleResult(), { run: 12, startedAt: '2031-04-05T06:07:08.123Z' });
    expect(suite.attributes.timestamp).toBe('2031-04-05T06:07:08');
    const properties = new Map(
      suite.children[0]!.children.map(({ attributes }) => [attributes.name, attributes.value]),
    );
    const { board, program } = sampleResult();
    expect(properties.get('board')).toBe(board.name);
    expect(properties.get('revision')).toBe(board.revision);
    expect(properties.get('sha256')).toBe(board.sha256);
    expect(properties.get('program')).toBe(`quietboard ${program.version}`);
    expect(properties.get('run')).toBe('12');
    const log = suite.children.at(-1)!.text;
    for (const { code } of sampleResult().caveats) expect(log).toContain(code);
    expect(log).toContain('An estimate, not a measurement');
  });

  it('has a class name without dots beyond the first, and the same bytes for the same input', () => {
    const result = { ...sampleResult(), limit: { ...sampleResult().limit, standard: 'FCC 15.109' } };
    expect(casesOf(suiteOf(result))[0]!.attributes.classname).toBe('quietboard.FCC 15_109 class B at 3 m');
    expect(junitReport(sampleResult(), LINES)).toBe(junitReport(sampleResult(), LINES));
  });

  it('lets no character of a name out of its place', () => {
    const name = `${HOSTILE_NAMES[0]!}\ufffe\uffff\u0000\u0008`;
    const text = junitReport({ ...sampleResult(), board: { name, revision: name, sha256: name } }, LINES);
    checkSchema(parse(text));
    expect(text).not.toContain('<script>');
  });
});
