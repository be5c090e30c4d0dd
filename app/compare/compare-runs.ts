import type { StoredRun } from '../project/stored-run.ts';
import { frequencyText } from '../report/format.ts';
import { shortName } from '../report/markup.ts';
import { bandChanges } from './band-changes.ts';
import { limitLinesOf } from './bands.ts';
import { allChanges } from './changes/all-changes.ts';
import type { Draft } from './changes/draft.ts';
import { weighChanges } from './effects.ts';
import { lineChange, UNCHANGED_DB } from './line-changes.ts';
import { matchLines } from './match-lines.ts';
import { comparedRun, headlineText } from './run-text.ts';
import type { Comparison, ComparisonCounts, ComparisonWarning, LineChange } from './types.ts';

/**
 * What is different between two runs: line by line, band by band, and what changed about board, sources and set-up in
 * words. Changes are after minus before. `compareRuns(b, a)` is the same with all signs turned; of a run with itself
 * nothing is left but unchanged lines. Levels of contributors are their own, each at its run's own maximum.
 */
export function compareRuns(before: StoredRun, after: StoredRun): Comparison {
  const { drafts, renames } = allChanges(before, after);
  const pairs = matchLines(before.result.points, after.result.points);
  const { changes, causesOf } = weighChanges(drafts, pairs, renames);
  const lines = pairs
    .map((pair) => lineChange(pair, renames))
    .map((line): LineChange => ({ ...line, causes: causesOf(line) }))
    .sort(worstFirst);
  const [one, other] = [comparedRun(before), comparedRun(after)];
  return {
    format: 'quietboard-comparison',
    version: 1,
    before: one,
    after: other,
    headline: headlineText(one, other),
    warnings: warningsOf(before, after, drafts),
    worstMarginChangeDb: one.worst && other.worst ? other.worst.marginDb - one.worst.marginDb : null,
    counts: countsOf(lines),
    changes,
    bands: bandChanges(before.result, after.result, limitLinesOf(before.settings), limitLinesOf(after.settings)),
    lines,
  };
}

const worstMarginDb = ({ before, after }: LineChange): number =>
  Math.min(before?.marginDb ?? Infinity, after?.marginDb ?? Infinity);

const worstFirst = (one: LineChange, other: LineChange): number =>
  worstMarginDb(one) - worstMarginDb(other) ||
  one.frequencyHz - other.frequencyHz ||
  (one.detector < other.detector ? -1 : 1);

/** Better and worse by the margin; a line whose level and limit moved together counts as unchanged. */
function countsOf(lines: readonly LineChange[]): ComparisonCounts {
  const count = (test: (line: LineChange) => boolean) => lines.filter(test).length;
  const change = ({ marginChangeDb }: LineChange) => marginChangeDb ?? 0;
  return {
    better: count((line) => change(line) >= UNCHANGED_DB),
    worse: count((line) => change(line) <= -UNCHANGED_DB),
    unchanged: count(({ marginChangeDb }) => marginChangeDb !== null && Math.abs(marginChangeDb) < UNCHANGED_DB),
    new: count(({ status }) => status === 'new'),
    gone: count(({ status }) => status === 'gone'),
    newlyOver: count(({ crossing }) => crossing === 'newly-over'),
    newlyUnder: count(({ crossing }) => crossing === 'newly-under'),
    stillOver: count(({ crossing }) => crossing === 'still-over'),
  };
}

function warningsOf(before: StoredRun, after: StoredRun, drafts: readonly Draft[]): ComparisonWarning[] {
  const warnings: ComparisonWarning[] = [];
  const differences = drafts.filter(({ isBreaking }) => isBreaking).map(({ text }) => text);
  if (differences.length > 0) {
    const message = `The set-ups differ (${differences.join('; ')}): margins cannot be compared; part of every change comes from that`;
    warnings.push({ code: 'setups-differ', message });
  }
  const [was, is] = [before.programVersion, after.programVersion];
  if (was !== is) {
    const message = `The runs were made by different versions of the program (${shortName(was)} and ${shortName(is)}): part of a change may be the program's; run both again with one version to be sure`;
    warnings.push({ code: 'programs-differ', message });
  }
  if (before.board !== after.board) {
    const message = `The runs are of different boards (${shortName(before.board)} and ${shortName(after.board)})`;
    warnings.push({ code: 'boards-differ', message });
  }
  const [wasHz, isHz] = [before.result.limit.maxHz, after.result.limit.maxHz];
  if (wasHz !== isHz) {
    const message = `Lines above ${frequencyText(Math.min(wasHz, isHz))} were judged in one run only, up to ${frequencyText(Math.max(wasHz, isHz))}`;
    warnings.push({ code: 'ranges-differ', message });
  }
  return warnings;
}
