import type { ErrorCode } from '../../app/errors.ts';
import type { LeverAnswer } from '../../app/levers/levers.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';

/** What a levers thread is started with. */
export interface LeversStart {
  readonly document: RunDocument;
  readonly settings: RunSettings;
  readonly programVersion: string;
}

/** What it is asked, any number of times; answers come in the same order. */
export interface LeversQuestion {
  readonly sources: SourcesPart;
  readonly settings: RunSettings;
}

export interface LeversFailure {
  readonly kind: 'failed';
  readonly code: ErrorCode;
  readonly message: string;
  readonly path: string | undefined;
}

/** What it says: progress, then `ready` or a failure; then to each question an answer or a failure. */
export type LeversMessage =
  | { readonly kind: 'progress'; readonly done: number; readonly total: number }
  | { readonly kind: 'ready' }
  | { readonly kind: 'answer'; readonly answer: LeverAnswer }
  | LeversFailure;
