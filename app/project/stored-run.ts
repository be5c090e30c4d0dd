import type { BoardFile } from '../board/board-file.ts';
import type { SampleColumns } from '../board/convert-waveforms.ts';
import type { EstimateResult, Verdict } from '../estimate/result.ts';
import type { RunSettings } from './run-settings.ts';

/** What was estimated: the board with its sources merged in, and the waveform files it names. */
export interface RunDocument {
  readonly board: BoardFile;
  /** By the `file` text of the waveform. */
  readonly samples: Readonly<Record<string, SampleColumns>>;
  /** Of the board's or layout's bytes as they were opened, hexadecimal. */
  readonly sourceSha256: string;
  /** What opening the files said (imports, sources): the result repeats it. */
  readonly openingNotes: readonly string[];
}

/** One row of the list of runs. */
export interface RunSummary {
  /** Counts from 1 in a project and is never given twice. */
  readonly run: number;
  /** ISO 8601, UTC. */
  readonly startedAt: string;
  readonly board: string;
  readonly revision: string;
  /** Of the layout part of the document: the same copper has the same hash, whatever the sources. */
  readonly layoutSha256: string;
  readonly sourcesSha256: string;
  readonly standard: string;
  readonly class: string;
  readonly distanceM: number;
  readonly requiredMarginDb: number;
  readonly structure: 'solved' | 'pair-only';
  readonly worst: { readonly frequencyHz: number; readonly marginDb: number } | null;
  readonly verdict: Verdict;
  readonly programVersion: string;
  readonly note: string;
}

/** A run with all that is needed to show, compare and recompute it. */
export interface StoredRun extends RunSummary {
  /** Of the computation. */
  readonly durationS: number;
  readonly document: RunDocument;
  readonly settings: RunSettings;
  readonly result: EstimateResult;
}
