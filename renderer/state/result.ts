import type { Caveat } from '../../app/errors.ts';
import { AppError } from '../../app/errors.ts';
import type { EstimateResult, ResultPoint } from '../../app/estimate/result.ts';
import { call } from '../api/api.ts';
import { type AppState, getState, type ShownResult, setState, type Trial } from './app-store.ts';
import { editLayout, needBase, showWork } from './document.ts';
import { jobOf, runJob, stopJob } from './jobs.ts';
import { failureText } from './notices.ts';
import { refreshRuns } from './runs.ts';
import { selectLine } from './selection.ts';
import { documentRefOf, sameWork } from './work.ts';

/** Estimating, and what is shown of it. */

/** What the views draw: the lines of a running estimate, of a quick answer, or of the last whole result. */
export interface Shown {
  readonly source: 'partial' | 'trial' | 'result';
  readonly points: readonly ResultPoint[];
  readonly worst: EstimateResult['worst'];
  readonly verdict: EstimateResult['verdict'] | null;
  /** The document or the settings changed since. */
  readonly isOutdated: boolean;
}

/** The last `Shown` keeps its identity while nothing in it changed. */
let last: { readonly state: readonly unknown[]; readonly shown: Shown | null } | null = null;

export function shownOf(app: AppState): Shown | null {
  const state = [app.partial, app.trial, app.result, app.history?.present, app.isTrying];
  if (last?.state.every((value, i) => value === state[i])) return last.shown;
  last = { state, shown: deriveShown(app) };
  return last.shown;
}

function deriveShown({ partial, trial, result, history, isTrying }: AppState): Shown | null {
  if (partial.length > 0) return { source: 'partial', points: partial, worst: null, verdict: null, isOutdated: false };
  const isOf = (work: Trial['work']) => history !== null && sameWork(work, history.present);
  // Between a change and its quick answer the last one stays: else every move of a lever would flash the old result.
  if (isTrying && trial !== null) return { source: 'trial', ...trial, isOutdated: false };
  if (trial !== null && isOf(trial.work)) return { source: 'trial', ...trial, isOutdated: false };
  if (result === null) return null;
  const { points, worst, verdict } = result.result;
  return { source: 'result', points, worst, verdict, isOutdated: !isTrying && !isOf(result.work) };
}

/** Estimates the present document and keeps the run. */
export async function estimate(note = ''): Promise<void> {
  const { project, history, model } = getState();
  if (project === null || history === null || model === null || model.problems.length > 0) return;
  const work = history.present;
  const { projectId } = project;
  setState({ partial: [], failure: null });
  try {
    const { result, run } = await runJob('estimate', 'Preparing', (jobId) =>
      call('estimate.run', {
        projectId,
        jobId,
        document: documentRefOf(work),
        settings: work.settings,
        store: !project.isReadOnly,
        note,
      }),
    );
    if (getState().project?.projectId !== projectId) return;
    showResult({ result, work, run });
    await refreshRuns();
  } catch (error) {
    if (!(error instanceof AppError && error.code === 'cancelled')) setState({ failure: failureText(error) });
  } finally {
    if (jobOf('estimate') === undefined) setState({ partial: [] });
  }
}

/** The chosen line stays when the new result has it too, else the worst one is chosen. */
export function showResult(result: ShownResult): void {
  setState({ result, trial: null, detail: { kind: 'none' } });
  const { points, worst } = result.result;
  const { lineHz, detector } = getState().selection;
  const isThere = points.some((point) => point.frequencyHz === lineHz);
  if (isThere) selectLine(lineHz, detector);
  else selectLine(worst?.frequencyHz ?? null);
}

/** Stops what runs longest: the estimate, or else any other job. */
export async function stop(): Promise<void> {
  const job = jobOf('estimate') ?? getState().jobs[0];
  if (job !== undefined) await stopJob(job.id);
}

export function takePoints({ jobId, points }: { jobId: string; points: readonly ResultPoint[] }): void {
  if (jobOf('estimate')?.id === jobId) setState(({ partial }) => ({ partial: [...partial, ...points] }));
}

/** Shows a run of the ledger, with the document and the settings it was made of, as an undoable step. */
export async function loadRun(run: number): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  const { projectId } = project;
  const { document, settings, result } = await call('runs.load', { projectId, run });
  await needBase(projectId, document.baseId);
  const work = { ...document, settings };
  showWork(`Open run ${run}`, work);
  showResult({ result, work, run });
}

/** Changes from now on are compared against what is shown now. */
export function keepForComparison(): void {
  const { result, kept } = getState();
  if (kept === null && result !== null) setState({ kept: result });
}

export const showTrial = (trial: Trial | null): void => setState({ trial });

/** Back to the kept state, as one step. */
export function discardChanges(): void {
  const { kept } = getState();
  if (kept === null) return;
  showWork('Let the change go', kept.work);
  setState({ kept: null });
  showResult(kept);
}

/** The present state under a revision's name, estimated in full and kept in the ledger. */
export async function keepAsRevision(revision: string, note = ''): Promise<void> {
  await editLayout(`Revision ${revision}`, (layout) => ({ ...layout, revision }));
  await estimate(note);
  const { result, history } = getState();
  // Stopped or failed: the kept state stays, to go back to.
  if (result !== null && history !== null && sameWork(result.work, history.present))
    setState({ kept: null, trial: null });
}

/** Caveats that concern the chosen line, or all of them when none is chosen. */
export const caveatsAt = (caveats: readonly Caveat[], frequencyHz: number | null): readonly Caveat[] =>
  frequencyHz === null
    ? caveats
    : caveats.filter(({ fromHz, toHz }) => toHz === 0 || (fromHz <= frequencyHz && frequencyHz <= toHz));
