import type { RunSettings } from './run-settings.ts';
import type { RunDocument } from './stored-run.ts';

/** What is being edited, so that it can be opened again as it was. */
export interface Draft {
  readonly document: RunDocument;
  readonly settings: RunSettings;
}

export interface StoredDraft extends Draft {
  /** Counts the saves from 1. */
  readonly version: number;
  /** ISO 8601, UTC. */
  readonly savedAt: string;
}
