/** What a project file says about itself. */
export interface ProjectInfo {
  readonly name: string;
  /** ISO 8601, UTC. */
  readonly createdAt: string;
  /** Versions of this program. */
  readonly createdBy: string;
  readonly writtenBy: string;
  /** Of the tables in the file. */
  readonly schemaVersion: number;
  readonly runs: number;
  readonly measurements: number;
}

/** Worst margins of a revision under one set-up. */
export interface SetupMargins {
  readonly standard: string;
  readonly class: string;
  readonly distanceM: number;
  readonly structure: 'solved' | 'pair-only';
  readonly runs: number;
  readonly lastRun: number;
  /** Of the last run; null when no line fell into its judged range. */
  readonly lastMarginDb: number | null;
  /** The smallest of all its runs. */
  readonly lowestMarginDb: number | null;
}

/** A board's revision as it was estimated: its copper, and the runs of it. */
export interface RevisionSummary {
  readonly board: string;
  readonly revision: string;
  readonly layoutSha256: string;
  readonly firstRun: number;
  readonly lastRun: number;
  readonly firstStartedAt: string;
  readonly lastStartedAt: string;
  readonly runs: number;
  /** By standard, class, distance and structure. */
  readonly setups: readonly SetupMargins[];
}

/** One thing the examination of a project file looked at. */
export interface DoctorFinding {
  /** Stable kebab-case code. */
  readonly code: string;
  readonly isFine: boolean;
  readonly message: string;
}

/** What the examination of a project file found. */
export interface DoctorReport {
  readonly file: string;
  /** No finding is amiss. */
  readonly isFine: boolean;
  readonly findings: readonly DoctorFinding[];
  readonly schemaVersion: number;
  readonly sqliteVersion: string;
  readonly createdBy: string;
  readonly writtenBy: string;
  readonly sizeBytes: number;
  /** Free space inside the file that a later write will use. */
  readonly freeBytes: number;
  readonly counts: Readonly<Record<string, number>>;
}
