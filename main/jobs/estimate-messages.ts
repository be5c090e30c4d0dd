import type { ErrorCode } from '../../app/errors.ts';
import type { UnitLevels } from '../../app/estimate/estimate.ts';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';

/** What an estimate's thread (started with an `EstimateJob`) is asked once it is ready, one at a time. */
export type EstimateQuestion =
  | { readonly kind: 'unit'; readonly index: number }
  | { readonly kind: 'finish'; readonly levels: readonly LineLevel[] };

export interface EstimateFailure {
  readonly kind: 'failed';
  readonly code: ErrorCode;
  readonly message: string;
  readonly path: string | undefined;
}

/** What it says: `ready` (lines of every unit) or a failure; then to each question, after any progress, an answer or a failure. */
export type EstimateMessage =
  | { readonly kind: 'ready'; readonly unitLines: readonly number[] }
  /** Lines of the unit that are done, and the levels found since the last word. */
  | { readonly kind: 'progress'; readonly done: number; readonly levels: readonly LineLevel[] }
  | { readonly kind: 'unit'; readonly levels: UnitLevels }
  | { readonly kind: 'result'; readonly result: EstimateResult }
  | EstimateFailure;
