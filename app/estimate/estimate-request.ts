import type { LimitSet } from '../limits/choose.ts';
import type { SiteRequest } from '../site/site.ts';
import type { LineLevel } from './line-level.ts';

/** What to estimate a board against, and how. */
export interface EstimateRequest {
  readonly limits: LimitSet;
  readonly site: SiteRequest;
  readonly structure: 'solved' | 'pair-only';
  /** Upper end of the judged range; absent: the standard's rule from the highest clock. */
  readonly maxHz?: number;
  readonly requiredMarginDb: number;
  readonly boardSha256: string;
  readonly programVersion: string;
  /** What the program chose or read on the way (pins, imports): repeated in the result. */
  readonly notes: readonly string[];
}

/** Progress and stop of a long run. */
export interface EstimateHooks {
  onProgress?(done: number, total: number): void;
  /** Each level as it is found. */
  onLevel?(level: LineLevel): void;
  /** Asked once a line; true ends the run with a `cancelled` error. */
  stop?(): boolean;
}
