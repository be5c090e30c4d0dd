import { NO_CLASS } from '../limits/limit-line.ts';
import { trimmed } from '../report/format.ts';
import { shortName } from '../report/markup.ts';
import { byDetectorAndFrequency } from './bands.ts';
import { UNCHANGED_DB } from './line-changes.ts';
import { dbText } from './run-text.ts';
import type { BandMargin, Trend, TrendBand, TrendGroup, TrendPoint, TrendRun, TrendSetup, TrendStep } from './types.ts';

/**
 * Worst margin over revisions, one line for each board and set-up: standard, class, distance and where it counts from,
 * site, orientation, structure, and the limit values themselves (a limit file may change them). Of a revision the latest
 * run counts; revisions stand in the order of their first run. Bands are the pieces of the limit lines.
 */
export function trendOf(runs: readonly TrendRun[]): Trend {
  const groups = new Map<string, TrendRun[]>();
  for (const run of [...runs].sort(byTime)) {
    const key = groupKey(run);
    const group = groups.get(key);
    if (group) group.push(run);
    else groups.set(key, [run]);
  }
  const found = [...groups.values()].map((group) => ({ last: group.at(-1)!, group: groupOf(group) }));
  found.sort((one, other) => other.group.points.length - one.group.points.length || byTime(other.last, one.last));
  return { format: 'quietboard-trend', version: 1, groups: found.map(({ group }) => group) };
}

const byTime = (one: TrendRun, other: TrendRun): number =>
  (one.startedAt < other.startedAt ? -1 : one.startedAt > other.startedAt ? 1 : 0) || one.run - other.run;

/**
 * Above it the judged range follows from the clocks: bands that start there do not tell set-ups apart, or a faster clock
 * would begin a new line. Below it a shorter range, asked for by the user, is another set-up.
 */
const ONE_GHZ = 1e9;

function groupKey({ board, setup, bands }: TrendRun): string {
  const { standard, class: className, distanceM, measuredFrom, site, orientation, structure } = setup;
  const limits = bands
    .filter(({ fromHz }) => fromHz < ONE_GHZ)
    .map(({ detector, fromHz, toHz, fromDbuvPerM, toDbuvPerM }) => [detector, fromHz, toHz, fromDbuvPerM, toDbuvPerM]);
  return JSON.stringify([board, standard, className, distanceM, measuredFrom, site, orientation, structure, limits]);
}

/** Runs of one set-up, in order of time. */
function groupOf(runs: readonly TrendRun[]): TrendGroup {
  const byRevision = new Map<string, TrendRun[]>();
  for (const run of runs) {
    const own = byRevision.get(run.revision);
    if (own) own.push(run);
    else byRevision.set(run.revision, [run]);
  }
  const revisions = [...byRevision.values()].map((own) => ({ latest: own.at(-1)!, count: own.length }));
  const latest = revisions.map((each) => each.latest);
  const { board, setup } = runs.at(-1)!;
  return {
    board,
    setup,
    limit: setupLimit(setup),
    requiredMarginDb: runs.at(-1)!.requiredMarginDb,
    points: revisions.map(({ latest: run, count }, i) => pointOf(run, latest[i - 1], count)),
    bands: bandsOf(latest),
    headline: headlineOf(latest),
  };
}

/** "CISPR 32 class B at 3 m". */
export function setupLimit({ standard, class: className, distanceM }: TrendSetup): string {
  return `${standard}${className === NO_CLASS ? '' : ` class ${className}`} at ${trimmed(distanceM, 2)} m`;
}

function pointOf(run: TrendRun, before: TrendRun | undefined, runCount: number): TrendPoint {
  return {
    ...stepOf(before?.worst, run.worst),
    revision: run.revision,
    run: run.run,
    startedAt: run.startedAt,
    runCount,
    programVersion: run.programVersion,
    isOtherProgram: before !== undefined && before.programVersion !== run.programVersion,
    worst: run.worst,
    requiredMarginDb: run.requiredMarginDb,
    verdict: run.verdict,
  };
}

type Worst = BandMargin['worst'];

/** `before` undefined: there is none. */
function stepOf(before: Worst | undefined, after: Worst): TrendStep {
  if (before === undefined) return { changeDb: null, direction: 'first', text: '' };
  if (before === null || after === null) {
    const text = before === after ? 'no line in either' : before === null ? 'no line before' : 'no line any more';
    return { changeDb: null, direction: 'unknown', text };
  }
  const changeDb = after.marginDb - before.marginDb;
  return { changeDb, ...directionOf(changeDb) };
}

/** In words: "better by 5.1 dB", "worse by 3.0 dB", "unchanged within 0.1 dB". */
export function directionOf(changeDb: number): Pick<TrendStep, 'direction' | 'text'> {
  if (Math.abs(changeDb) < UNCHANGED_DB) return { direction: 'unchanged', text: `unchanged within ${UNCHANGED_DB} dB` };
  const direction = changeDb > 0 ? 'better' : 'worse';
  return { direction, text: `${direction} by ${dbText(Math.abs(changeDb))} dB` };
}

/** Bands of all revisions by detector and frequency; a revision that was not judged there has none. */
function bandsOf(latest: readonly TrendRun[]): TrendBand[] {
  const keyOf = ({ detector, fromHz, toHz }: BandMargin) => `${detector} ${fromHz} ${toHz}`;
  const held = latest.map(({ bands }) => new Map(bands.map((band) => [keyOf(band), band])));
  const all = new Map(latest.flatMap(({ bands }) => bands.map((band) => [keyOf(band), band])));
  const inOrder = [...all].sort(([, one], [, other]) => byDetectorAndFrequency(one, other));
  return inOrder.map(([key, { detector, fromHz, toHz }]) => {
    const worst = held.map((bands) => bands.get(key)?.worst ?? null);
    return {
      detector,
      fromHz,
      toHz,
      steps: worst.map((own, i) => ({ ...stepOf(i === 0 ? undefined : worst[i - 1]!, own), worst: own })),
    };
  });
}

/** From the first revision to the last. */
function headlineOf(latest: readonly TrendRun[]): string {
  const [first, last] = [latest[0]!, latest.at(-1)!];
  if (first === last) return '';
  const name = ({ revision, run }: TrendRun) => (revision === '' ? `run ${run}` : shortName(revision));
  return `${stepOf(first.worst, last.worst).text} from ${name(first)} to ${name(last)}`;
}
