import type { StoredRun } from '../project/stored-run.ts';
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
export function trendRunOf(run: StoredRun): TrendRun {
  const { run: number, startedAt, board, revision, requiredMarginDb, worst, verdict, programVersion } = run;
  return {
    run: number,
    startedAt,
    board,
    revision,
    requiredMarginDb,
    worst,
    verdict,
    programVersion,
    ...trendPartOf(run),
  };
}
