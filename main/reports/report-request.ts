import type { Board } from '../../app/board/board.ts';
import type { Comparison, Trend } from '../../app/compare/types.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { LimitLine } from '../../app/limits/limit-line.ts';
import type { Paper, ReportTitle } from '../../app/report/report-title.ts';

/** A result with what its reports show beside it. */
export interface ReportedRun {
  readonly result: EstimateResult;
  readonly board: Board;
  readonly limitLines: readonly LimitLine[];
  /** ISO 8601; absent: not kept in a project. */
  readonly startedAt?: string;
}

/** What is reported about, as plain data: it can be sent to a thread. */
export type ReportSubject =
  | { readonly kind: 'run'; readonly run: ReportedRun }
  | { readonly kind: 'comparison'; readonly comparison: Comparison }
  | { readonly kind: 'trend'; readonly trend: Trend };

export type ReportFormat = 'pdf' | 'html' | 'csv' | 'json' | 'junit';

export interface ReportRequest {
  readonly subject: ReportSubject;
  readonly format: ReportFormat;
  readonly paper: Paper;
  readonly title: ReportTitle;
  readonly programVersion: string;
}

export interface RenderedReport {
  /** For a file; may hold signs that a file system forbids. */
  readonly name: string;
  readonly mediaType: string;
  readonly bytes: Uint8Array;
}
