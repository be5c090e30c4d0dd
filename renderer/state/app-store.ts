import { create } from 'zustand';
import type { BoardBase, DocumentRef } from '../../app/contract/documents.ts';
import type { LineDetail } from '../../app/contract/line-detail.ts';
import type { Output } from '../../app/contract/procedures.ts';
import type { Detector, EstimateResult, ResultPoint } from '../../app/estimate/result.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import type { BoardModel } from './board-model.ts';
import type { History } from './history.ts';
import type { Work } from './work.ts';

/**
 * The one store of the window: plain data only. What changes it are the functions in the files beside this one; what reads
 * it are the hooks in `hooks.ts`. Nothing in here is ever changed in place.
 */

export type Project = Output<'project.info'>['project'];
export type RunSummary = Output<'runs.list'>['runs'][number];
export type Measurement = Output<'measurements.list'>['measurements'][number];
export type ImportSummary = NonNullable<Output<'board.open'>['summary']>;
export type AppInfo = Output<'app.info'>;
export type RecentProject = Output<'project.recent'>['projects'][number];

/** A whole result and what it was made of. */
export interface ShownResult {
  readonly result: EstimateResult;
  readonly work: Work;
  readonly run: number | null;
}

/** The quick answer to a change of sources: levels and margins, nothing solved again. */
export interface Trial {
  readonly points: readonly ResultPoint[];
  readonly worst: EstimateResult['worst'];
  readonly verdict: EstimateResult['verdict'];
  readonly work: Work;
}

export type JobKind = 'open' | 'estimate' | 'levers' | 'validate';

export interface Job {
  readonly id: string;
  readonly kind: JobKind;
  /** What is being done, for people. */
  readonly stage: string;
  readonly done: number;
  /** 0 while nobody knows. */
  readonly total: number;
  readonly isStopping: boolean;
}

export interface Draft {
  readonly document: DocumentRef;
  readonly settings: RunSettings;
  readonly version: number;
}

export type DraftState =
  | { readonly kind: 'saved' | 'waiting' | 'saving' | 'incomplete'; readonly version: number }
  | { readonly kind: 'failed'; readonly version: number; readonly message: string }
  /** Another window saved first. */
  | { readonly kind: 'conflict'; readonly version: number; readonly theirs: Draft };

export interface Selection {
  readonly lineHz: number | null;
  readonly detector: Detector | null;
  readonly net: string | null;
  readonly cable: string | null;
  /** Index into the shown result's findings. */
  readonly finding: number | null;
  /** Index into the line detail's pieces. */
  readonly piece: number | null;
}

export interface Hover {
  readonly lineHz: number | null;
  readonly net: string | null;
  readonly cable: string | null;
  readonly piece: number | null;
}

export type DetailState =
  | { readonly kind: 'none' }
  | { readonly kind: 'loading'; readonly lineHz: number }
  | { readonly kind: 'ready'; readonly lineHz: number; readonly detail: LineDetail }
  | { readonly kind: 'failed'; readonly lineHz: number; readonly message: string };

export interface AppState {
  readonly info: AppInfo | null;
  readonly recent: readonly RecentProject[];
  readonly project: Project | null;
  /** Its draft and its runs are being read. */
  readonly isOpening: boolean;
  /** Newest first, without those about to be deleted. */
  readonly runs: readonly RunSummary[];
  /** Deleted for the eye; really gone when the time to undo is over. */
  readonly vanishingRuns: ReadonlySet<number>;
  readonly measurements: readonly Measurement[];

  readonly bases: ReadonlyMap<string, BoardBase>;
  readonly history: History<Work> | null;
  readonly model: BoardModel | null;
  /** Of the layout opened last in this window; null for board files. */
  readonly importSummary: ImportSummary | null;
  readonly draft: DraftState;

  readonly result: ShownResult | null;
  /** What changes are compared against: drawn as a ghost. */
  readonly kept: ShownResult | null;
  readonly trial: Trial | null;
  /** The quick answer to the present document is under way: what is shown is of a moment ago. */
  readonly isTrying: boolean;
  /** Lines finished so far of the running estimate. */
  readonly partial: readonly ResultPoint[];
  readonly jobs: readonly Job[];
  /** Why the last estimate gave no result. */
  readonly failure: string | null;

  readonly selection: Selection;
  readonly hover: Hover;
  readonly detail: DetailState;

  /** What is remembered about the views, of this project and of the program. */
  readonly remembered: ReadonlyMap<string, unknown>;
}

export const NO_SELECTION: Selection = {
  lineHz: null,
  detector: null,
  net: null,
  cable: null,
  finding: null,
  piece: null,
};
export const NO_HOVER: Hover = { lineHz: null, net: null, cable: null, piece: null };

export const EMPTY_PROJECT = {
  runs: [],
  vanishingRuns: new Set<number>(),
  measurements: [],
  bases: new Map<string, BoardBase>(),
  history: null,
  model: null,
  importSummary: null,
  draft: { kind: 'saved', version: 0 },
  result: null,
  kept: null,
  trial: null,
  isTrying: false,
  partial: [],
  failure: null,
  selection: NO_SELECTION,
  hover: NO_HOVER,
  detail: { kind: 'none' },
} as const satisfies Partial<AppState>;

export const useApp = create<AppState>()(() => ({
  info: null,
  recent: [],
  project: null,
  isOpening: false,
  jobs: [],
  remembered: new Map<string, unknown>(),
  ...EMPTY_PROJECT,
}));

export const { getState, setState, subscribe } = useApp;
