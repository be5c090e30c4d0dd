import { type Band, BandFinder, bandsOfLines } from '../compare/bands.ts';
import type { EstimateResult, ResultPoint } from '../estimate/result.ts';
import type { LimitLine } from '../limits/limit-line.ts';
import { CAUTIONS_SHORT } from './cautions.ts';
import { byMessage, groupCaveats } from './caveat-groups.ts';
import { isItself, KIND_PHRASE, mainContributor, pathText } from './contributor-text.ts';
import { bandText, countText, frequencyText, levelText, marginText, rangeText, trimmed } from './format.ts';
import { Markup, markup, shortName } from './markup.ts';
import { limitName, verdictText } from './verdict.ts';

export interface JUnitOptions {
  /** ISO 8601 start of the run; without it the report has none and the same input gives the same bytes. */
  readonly startedAt?: string;
  /** Number of the run in its project. */
  readonly run?: number;
}

/** Lines named in a failure; the rest is counted. */
const LINES_NAMED = 10;
/** Unicode's non-characters, which XML does not allow; control characters are written out by `markup`. */
const NON_CHARACTERS = /[\ufffe\uffff]/g;

/**
 * JUnit XML for a build server: one test case a limit band (a piece of a limit line between two break points, by detector),
 * so the names stay the same from build to build. It fails when the band's worst margin is below the required margin. A judged
 * band without any line passes, with a note: nothing the board emits is there. A band above the judged range is `skipped`: a
 * pass would claim a check that never ran, and leaving it out would let a list of cases change with a clock.
 */
export function junitReport(
  result: EstimateResult,
  limitLines: readonly LimitLine[],
  options: JUnitOptions = {},
): string {
  const bands = bandsOfLines(limitLines);
  const finder = new BandFinder(bands);
  const pointsOf = bands.map((): ResultPoint[] => []);
  for (const point of result.points) pointsOf[finder.indexOf(point)]?.push(point);
  const cases = bands.map((band, i) => testCase(band, pointsOf[i]!, result));
  const totals = markup`tests="${cases.length}" failures="${count(cases, 'failed')}" errors="0" skipped="${count(cases, 'skipped')}" time="0"`;
  const name = xml(`quietboard ${limitName(result)}`);
  const timestamp = options.startedAt !== undefined && markup` timestamp="${xml(timestampText(options.startedAt))}"`;
  const page = markup`<?xml version="1.0" encoding="UTF-8"?>
<testsuites name="quietboard" ${totals}>
<testsuite name="${name}" ${totals}${timestamp}>
<properties>
${properties(result, options)}
</properties>
${cases.map(({ source }) => source)}
<system-out>${closing(result)}</system-out>
</testsuite>
</testsuites>
`;
  return page.source;
}

/** XML Schema's dateTime as build servers read it: seconds, no fraction; the time zone is UTC. */
const timestampText = (startedAt: string): string => startedAt.replace(/(?:\.\d+)?Z$/, '');

const count = (cases: readonly { readonly outcome: string }[], outcome: string): number =>
  cases.filter((each) => each.outcome === outcome).length;

/** Text from a file: cut, non-characters removed; `markup` escapes it and writes control characters out. */
const xml = (text: string, length = 400): string => shortName(text.replace(NON_CHARACTERS, ''), length);

/** Build servers split class names at dots: one name, no tree. */
const className = (result: EstimateResult): string => xml(`quietboard.${limitName(result).replaceAll('.', '_')}`);

interface TestCase {
  readonly outcome: 'passed' | 'failed' | 'skipped';
  readonly source: Markup;
}

/** `points` worst margin first. */
function testCase(band: Band, points: readonly ResultPoint[], result: EstimateResult): TestCase {
  const { requiredMarginDb, maxHz, maxRule } = result.limit;
  const name = `${band.detector} ${bandText(band.fromHz, band.toHz)}`;
  const element = (outcome: TestCase['outcome'], inner: Markup): TestCase => ({
    outcome,
    source: markup`<testcase name="${xml(name)}" classname="${className(result)}" time="0">${inner}</testcase>
`,
  });
  if (points.length === 0 && band.fromHz >= maxHz) {
    const reason = `not judged: the range ends at ${frequencyText(maxHz)} (${maxRule})`;
    return element('skipped', markup`<skipped message="${xml(reason)}"/>`);
  }
  const worst = points[0];
  if (!worst) return element('passed', output(['No line of the board in this band.']));
  const short = points.filter(({ marginDb }) => marginDb < requiredMarginDb);
  if (short.length === 0) {
    const all = countText(points.length, 'reading');
    return element('passed', output([`${all}; worst: ${readingText(worst, requiredMarginDb)}`]));
  }
  const named = short.slice(0, LINES_NAMED).map((point) => readingText(point, requiredMarginDb));
  const more = short.length - named.length;
  const body = more > 0 ? [...named, `and ${more} more`] : named;
  const type = worst.marginDb < 0 ? 'limit exceeded' : 'margin too small';
  return element('failed', markup`<failure message="${xml(named[0]!)}" type="${type}">${lines(body)}</failure>`);
}

/** "125 MHz: 43.1 dBµV/m against 40 dBµV/m, margin -3.1 dB (required 6 dB), mainly net CLK_25M through valve cable". */
function readingText(point: ResultPoint, requiredMarginDb: number): string {
  const levels = `${levelText(point.levelDbuvPerM)} dBµV/m against ${levelText(point.limitDbuvPerM)} dBµV/m`;
  const margin = `margin ${marginText(point.marginDb)} dB (required ${trimmed(requiredMarginDb, 1)} dB)`;
  return `${frequencyText(point.frequencyHz)}: ${levels}, ${margin}${makerText(point)}`;
}

function makerText(point: ResultPoint): string {
  const main = mainContributor(point);
  if (!main) return '';
  const { contributor, path } = main;
  const through = path && !isItself(contributor, path) ? ` through ${xml(pathText(path.name), 64)}` : '';
  return `, mainly ${KIND_PHRASE[contributor.kind]}${xml(contributor.name, 64)}${through}`;
}

/** Each text on a line of its own. */
const lines = (texts: readonly string[]): Markup =>
  texts.reduce((all, text, i) => markup`${all}${i > 0 && new Markup('\n')}${xml(text)}`, markup``);

const output = (texts: readonly string[]): Markup => markup`<system-out>${lines(texts)}</system-out>`;

function properties(result: EstimateResult, { run }: JUnitOptions): Markup {
  const { board, program, limit, site } = result;
  const rows: readonly (readonly [name: string, value: string])[] = [
    ['board', board.name],
    ['revision', board.revision],
    ['sha256', board.sha256],
    ['program', `quietboard ${program.version}`],
    ...(run === undefined ? [] : [['run', String(run)] as const]),
    ['standard', limit.standard],
    ['class', limit.class],
    ['distanceM', String(limit.distanceM)],
    ['requiredMarginDb', String(limit.requiredMarginDb)],
    ['site', site.kind],
    ['structure', result.structure],
    ['verdict', result.verdict],
    ['worstMarginDb', result.worst ? String(result.worst.marginDb) : ''],
  ];
  return markup`${rows.map(([name, value], i) => markup`${i > 0 && new Markup('\n')}<property name="${name}" value="${xml(value)}"/>`)}`;
}

/** Verdict, caveats, caution: what a reader of the build log must know. */
function closing(result: EstimateResult): Markup {
  const caveats = groupCaveats(result.caveats, byMessage).map(
    ({ code, message, where, count: times, fromHz, toHz }) => {
      const places =
        where.length === 0
          ? ''
          : ` [${where
              .slice(0, 4)
              .map((place) => xml(place, 64))
              .join(', ')}]`;
      return `caveat ${code}${times > 1 ? ` ×${times}` : ''}: ${message}${places} (${rangeText(fromHz, toHz)})`;
    },
  );
  const verdict = `${limitName(result)}: ${verdictText(result)}`;
  return lines([verdict, ...(caveats.length === 0 ? ['no caveats'] : caveats), CAUTIONS_SHORT]);
}
