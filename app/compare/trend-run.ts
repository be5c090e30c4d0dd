import type { RunSummary, StoredRun } from '../project/stored-run.ts';
import { bandMargins, limitLinesOf } from './bands.ts';
import type { BandMargin, TrendRun, TrendSetup } from './types.ts';

/** What a trend needs of a run beside its summary; small, so that it can be kept with every run. */
export interface TrendPart {
  readonly setup: TrendSetup;
  readonly bands: readonly BandMargin[];
}

/** Computed once, when a run is stored. No bands where the run's standard is unknown to this version. */
export function trendPartOf({ settings, result }: Pick<StoredRun, 'settings' | 'result'>): TrendPart {
  const lines = limitLinesOf(settings);
  const { standard, class: className, distanceM } = result.limit;
  const { kind: site, measuredFrom, orientation } = result.site;
  return {
    setup: { standard, class: className, distanceM, measuredFrom, site, orientation, structure: result.structure },
    bands: lines ? bandMargins(lines, result) : [],
  };
}

/** A run as a point of a trend. */
export function trendRun(summary: RunSummary, part: TrendPart): TrendRun {
  const { run, startedAt, board, revision, requiredMarginDb, worst, verdict, programVersion } = summary;
  return { run, startedAt, board, revision, requiredMarginDb, worst, verdict, programVersion, ...part };
}

/** The same from the whole run. */
export const trendRunOf = (run: StoredRun): TrendRun => trendRun(run, trendPartOf(run));
