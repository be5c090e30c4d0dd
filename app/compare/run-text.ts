import type { EstimateResult } from '../estimate/result.ts';
import type { StoredRun } from '../project/stored-run.ts';
import { pathsOf } from '../report/contributor-text.ts';
import { fixed, frequencyText } from '../report/format.ts';
import { shortName } from '../report/markup.ts';
import { limitName } from '../report/verdict.ts';
import type { ComparedRun, WorstLine } from './types.ts';

/** One side of a comparison. */
export const comparedRun = (run: StoredRun): ComparedRun => ({
  run: run.run,
  startedAt: run.startedAt,
  board: run.board,
  revision: run.revision,
  layoutSha256: run.layoutSha256,
  sourcesSha256: run.sourcesSha256,
  programVersion: run.programVersion,
  note: run.note,
  limit: limitName(run.result),
  requiredMarginDb: run.requiredMarginDb,
  verdict: run.verdict,
  worst: worstLine(run.result),
});

/** `points` worst margin first. */
function worstLine({ points }: EstimateResult): WorstLine | null {
  const point = points[0];
  if (!point) return null;
  const { frequencyHz, detector, marginDb, contributors } = point;
  const main = contributors[0];
  const contributor = main ? { kind: main.kind, name: main.name, path: pathsOf(main)[0]?.name ?? '' } : null;
  return { frequencyHz, detector, marginDb, contributor };
}

/** A number in a sentence: one decimal, true minus sign. */
export const dbText = (valueDb: number): string => fixed(valueDb, 1).replace('-', '−');

/** A change with its sign: "+4.2", "−3.1", "0.0". */
export function signedDbText(valueDb: number): string {
  const text = dbText(valueDb);
  return Number(fixed(valueDb, 1)) > 0 ? `+${text}` : text;
}

/** "the valve cable" where the name ends in what it is; other names stand alone. */
export const withArticle = (name: string): string =>
  /\b(cable|loop|harness|lead)$/i.test(name) ? `the ${shortName(name)}` : shortName(name);

/** Who makes the worst line: "CLK_25M through the valve cable", "the converter loop". */
export function makerText({ kind, name, path }: NonNullable<WorstLine['contributor']>): string {
  const who = kind === 'net' ? shortName(name) : withArticle(name);
  if (kind === 'cable') return `the stated current of ${who}`;
  if (path === '' || path === name || path === kind) return who;
  if (path === 'pair') return `the trace pair of ${who}`;
  return `${who} through ${path === 'plane' ? 'the plane' : withArticle(path)}`;
}

const atText = ({ marginDb, frequencyHz }: WorstLine): string =>
  `${dbText(marginDb)} dB at ${frequencyText(frequencyHz)}`;

/** "Revision C against B: worst margin 4.2 dB at 375 MHz by CLK_25M through the valve cable (was −3.1 dB at 125 MHz)". */
export function headlineText(before: ComparedRun, after: ComparedRun): string {
  const was = before.worst ? `was ${atText(before.worst)}` : 'before no line in the judged range';
  const is = after.worst
    ? `worst margin ${atText(after.worst)}${after.worst.contributor ? ` by ${makerText(after.worst.contributor)}` : ''}`
    : 'no line in the judged range';
  return `${againstText(before, after)}: ${is} (${was})`;
}

/** Revisions where they tell the runs apart, else run numbers. */
function againstText(before: ComparedRun, after: ComparedRun): string {
  const runs = `run ${after.run} against run ${before.run}`;
  if (before.board !== after.board) {
    return `Run ${after.run} (${boardText(after)}) against run ${before.run} (${boardText(before)})`;
  }
  if (before.revision !== after.revision && before.revision !== '' && after.revision !== '') {
    return `Revision ${shortName(after.revision)} against ${shortName(before.revision)}`;
  }
  const same = before.revision === after.revision && after.revision !== '';
  return `${runs[0]!.toUpperCase()}${runs.slice(1)}${same ? ` (revision ${shortName(after.revision)})` : ''}`;
}

const boardText = ({ board, revision }: ComparedRun): string =>
  revision === '' ? shortName(board) : `${shortName(board)}, revision ${shortName(revision)}`;
