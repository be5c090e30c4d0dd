import type { Detector, Polarization, Verdict } from '../estimate/result.ts';
import type { RunSummary } from '../project/stored-run.ts';

/**
 * Comparison of two runs and trend over revisions, as the JSON contract has them ("quietboard-comparison",
 * "quietboard-trend"). Numbers unrounded; changes are after minus before, so a positive margin change is better.
 * Texts are plain sentences without control characters; names inside them are cut to 64 characters.
 */

/** One reading of a line, as the receiver had it. */
export interface LineReading {
  readonly levelDbuvPerM: number;
  readonly limitDbuvPerM: number;
  readonly marginDb: number;
  readonly polarization: Polarization;
  readonly antennaHeightM: number;
  readonly turntableDeg: number;
}

/** Worst reading of a run with its strongest contributor and where that radiates from ("pair", "plane", "loop" or a cable). */
export interface WorstLine {
  readonly frequencyHz: number;
  readonly detector: Detector;
  readonly marginDb: number;
  readonly contributor: { readonly kind: ContributorKind; readonly name: string; readonly path: string } | null;
}

export type ContributorKind = 'net' | 'loop' | 'cable';

/** One side of a comparison. */
export interface ComparedRun {
  readonly run: number;
  readonly startedAt: string;
  readonly board: string;
  readonly revision: string;
  readonly layoutSha256: string;
  readonly sourcesSha256: string;
  readonly programVersion: string;
  readonly note: string;
  /** "CISPR 32 class B at 3 m". */
  readonly limit: string;
  readonly requiredMarginDb: number;
  readonly verdict: Verdict;
  readonly worst: WorstLine | null;
}

/**
 * What one contributor did at a line through one path: its own level in either run, at that run's own maximum (height,
 * angle, polarisation). Own levels say who changed; because fields add as phasors they need not add up to the total's change.
 */
export interface ContributorChange {
  readonly kind: ContributorKind;
  readonly name: string;
  /** "pair", "plane", "loop" or a cable's name. */
  readonly path: string;
  /** null: did not contribute, or next to nothing (below −50 dBµV/m). */
  readonly beforeDbuvPerM: number | null;
  readonly afterDbuvPerM: number | null;
  /** null when it contributes on one side only. */
  readonly changeDb: number | null;
  /** Its part of Σ|change of own power| over all contributors and paths of the line, 0 to 1. */
  readonly share: number;
}

/** Where a line stands against the limit: over in both runs, in one, or in none. A line that is absent is under. */
export type Crossing = 'newly-over' | 'still-over' | 'newly-under' | 'under';

/** One spectral line by one detector. */
export interface LineChange {
  readonly frequencyHz: number;
  readonly detector: Detector;
  /** `unchanged`: level and limit within `UNCHANGED_DB`. `new`, `gone`: no reading before, after. */
  readonly status: 'changed' | 'unchanged' | 'new' | 'gone';
  readonly before: LineReading | null;
  readonly after: LineReading | null;
  /** null for lines of one side only. */
  readonly levelChangeDb: number | null;
  readonly limitChangeDb: number | null;
  /** Positive is better. */
  readonly marginChangeDb: number | null;
  readonly crossing: Crossing;
  /** Those that made the change, strongest first; small ones and those after the eighth are left out. */
  readonly contributors: readonly ContributorChange[];
  /** Indexes into `changes`: what changed about these contributors, the board or the set-up. */
  readonly causes: readonly number[];
}

/** Worst margin of a band, and how many readings of it are over the limit. */
export interface BandState {
  readonly worst: { readonly frequencyHz: number; readonly marginDb: number } | null;
  readonly lines: number;
  readonly over: number;
}

/** A piece of a limit line between two of its break points; where the runs' limits differ, between break points of either. */
export interface BandChange {
  readonly detector: Detector;
  readonly fromHz: number;
  readonly toHz: number;
  readonly before: BandState;
  readonly after: BandState;
  /** null when either side has no line in the band. */
  readonly marginChangeDb: number | null;
}

export type ChangeKind =
  | 'setup'
  | 'limit'
  | 'program'
  | 'waveform'
  | 'drive'
  | 'load'
  | 'loop'
  | 'cable'
  | 'trace'
  | 'net'
  | 'plane'
  | 'stackup'
  | 'outline'
  | 'structure'
  | 'board';

/** What a change did to the level that its net, loop or cable makes by itself, at the line where that counts most. */
export interface ChangeEffect {
  readonly frequencyHz: number;
  readonly detector: Detector;
  /** The contributor, or the path (a cable) whose level it is. */
  readonly name: string;
  readonly beforeDbuvPerM: number | null;
  readonly afterDbuvPerM: number | null;
  /** null when it contributes on one side only. */
  readonly changeDb: number | null;
  /** False: other changes act on the same net, loop or cable too; the effect is that of all of them together. */
  readonly isAlone: boolean;
}

/** One difference between what was estimated. */
export interface Change {
  readonly kind: ChangeKind;
  /** Names of the nets, loops and cables it acts on; empty: on the whole board or set-up. */
  readonly nets: readonly string[];
  readonly loops: readonly string[];
  readonly cables: readonly string[];
  /** One sentence without a full stop: "CLK_25M: rise time 1 → 3 ns". */
  readonly text: string;
  /** null: no line carries it, or it acts on everything. */
  readonly effect: ChangeEffect | null;
}

export interface ComparisonWarning {
  readonly code: 'setups-differ' | 'programs-differ' | 'boards-differ' | 'ranges-differ';
  readonly message: string;
}

/** Readings by what happened to them. */
export interface ComparisonCounts {
  readonly better: number;
  readonly worse: number;
  readonly unchanged: number;
  readonly new: number;
  readonly gone: number;
  readonly newlyOver: number;
  readonly newlyUnder: number;
  readonly stillOver: number;
}

export interface Comparison {
  readonly format: 'quietboard-comparison';
  readonly version: 1;
  readonly before: ComparedRun;
  readonly after: ComparedRun;
  /** "Revision C against B: worst margin 4.2 dB at 375 MHz by CLK_25M through the valve cable (was −3.1 dB at 125 MHz)". */
  readonly headline: string;
  /** Why margins are not comparable, or only with care; empty when they are. */
  readonly warnings: readonly ComparisonWarning[];
  /** null when either run has no line. Positive is better. */
  readonly worstMarginChangeDb: number | null;
  readonly counts: ComparisonCounts;
  /** Strongest first: by what it did to a level against the limit, then by kind. */
  readonly changes: readonly Change[];
  readonly bands: readonly BandChange[];
  /** Worst margin first (the smaller of both runs'), ties by frequency and detector. */
  readonly lines: readonly LineChange[];
}

/** Worst margin of one band of one run: small enough to be kept with every run's row. */
export interface BandMargin {
  readonly detector: Detector;
  readonly fromHz: number;
  readonly toHz: number;
  /** The limit at both ends. */
  readonly fromDbuvPerM: number;
  readonly toDbuvPerM: number;
  /** null: no line of the board in this band. */
  readonly worst: { readonly frequencyHz: number; readonly marginDb: number } | null;
}

/** What two runs must share for their margins to be on one line of a trend (with standard, class and distance). */
export interface TrendSetup {
  readonly standard: string;
  readonly class: string;
  readonly distanceM: number;
  readonly measuredFrom: 'boundary' | 'center';
  readonly site: 'ground-plane' | 'free-space';
  readonly orientation: 'flat' | 'upright';
  readonly structure: 'solved' | 'pair-only';
}

/** What `trendOf` needs of a run. `trendRunOf(run)` takes it from a stored run; a database keeps `setup` and `bands` with every run. */
export interface TrendRun
  extends Pick<
    RunSummary,
    'run' | 'startedAt' | 'board' | 'revision' | 'requiredMarginDb' | 'worst' | 'verdict' | 'programVersion'
  > {
  readonly setup: TrendSetup;
  readonly bands: readonly BandMargin[];
}

export type TrendDirection = 'first' | 'better' | 'worse' | 'unchanged' | 'unknown';

/** A step from one revision to the next. */
export interface TrendStep {
  /** null for the first revision and where either side has no line. Positive is better. */
  readonly changeDb: number | null;
  readonly direction: TrendDirection;
  /** "better by 5.1 dB", "worse by 3 dB", "unchanged within 0.1 dB"; empty for the first. */
  readonly text: string;
}

/** A revision on the line of one set-up: its latest run. */
export interface TrendPoint extends TrendStep {
  readonly revision: string;
  readonly run: number;
  readonly startedAt: string;
  /** Runs of this revision with this set-up. */
  readonly runCount: number;
  readonly programVersion: string;
  /** Another program version than at the point before: part of the step may be the program's. */
  readonly isOtherProgram: boolean;
  readonly worst: { readonly frequencyHz: number; readonly marginDb: number } | null;
  readonly requiredMarginDb: number;
  readonly verdict: Verdict;
}

export interface TrendBand {
  readonly detector: Detector;
  readonly fromHz: number;
  readonly toHz: number;
  /** One for each point of the group. */
  readonly steps: readonly (TrendStep & { readonly worst: BandMargin['worst'] })[];
}

/** Runs of one board with one set-up. */
export interface TrendGroup {
  readonly board: string;
  readonly setup: TrendSetup;
  /** "CISPR 32 class B at 3 m". */
  readonly limit: string;
  /** Of the latest run. */
  readonly requiredMarginDb: number;
  /** In the order in which the revisions were first estimated. */
  readonly points: readonly TrendPoint[];
  readonly bands: readonly TrendBand[];
  /** "better by 5.1 dB from A to C"; empty with one revision. */
  readonly headline: string;
}

export interface Trend {
  readonly format: 'quietboard-trend';
  readonly version: 1;
  /** The set-up with the most revisions first, then the latest. */
  readonly groups: readonly TrendGroup[];
}
