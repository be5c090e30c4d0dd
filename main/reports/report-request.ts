import type { Comparison, Trend } from '../../app/compare/types.ts';
import type { StoredRun } from '../../app/project/stored-run.ts';
import type { Paper } from '../../app/report/report-title.ts';

/** What is reported about, as plain data: a report is made in a thread of its own. */
export type ReportSubject =
  | { readonly kind: 'run'; readonly run: StoredRun }
  | { readonly kind: 'comparison'; readonly comparison: Comparison }
  | { readonly kind: 'trend'; readonly trend: Trend };

export type ReportFormat = 'pdf' | 'html' | 'csv' | 'json' | 'junit';

export interface ReportRequest {
  readonly subject: ReportSubject;
  readonly format: ReportFormat;
  readonly paper: Paper;
  /** For the title block. */
  readonly project: string;
  readonly author: string;
  readonly dateText: string;
  readonly programVersion: string;
}

export interface RenderedReport {
  /** For a file; may hold signs that a file system forbids. */
  readonly name: string;
  readonly mediaType: string;
  readonly bytes: Uint8Array;
}
