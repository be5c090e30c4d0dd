import { create } from 'zustand';
import type { Output } from '../../app/contract/procedures.ts';
import { AppError } from '../../app/errors.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import { call } from '../api/api.ts';
import { getState, setState, subscribe } from '../state/app-store.ts';
import { jobOf, runJob } from '../state/jobs.ts';
import { failureText } from '../state/notices.ts';
import { keepForComparison, showTrial } from '../state/result.ts';
import { documentRefOf, sameWork, type Work } from '../state/work.ts';
import { changedLayout } from './same-copper.ts';

/**
 * The responses the host keeps for the open document, and their answer to whatever the document becomes: every change, from
 * the levers or from elsewhere, is asked about at once. One question is under way at a time; of those that come meanwhile the
 * newest counts.
 */

interface Prepared {
  readonly leversId: string;
  readonly projectId: string;
  readonly work: Work;
}

export interface LeversState {
  /** Longer than its job is listed: from the wish to the kept responses or a failure. */
  readonly isPreparing: boolean;
  readonly prepared: Prepared | null;
  /** Why the kept responses cannot tell, and about which state of the document. */
  readonly needsSolve: { readonly reason: string; readonly work: Work } | null;
  /** Why there are no kept responses, or no answer; `stopped` when the user did not want them. */
  readonly failure: { readonly kind: 'stopped' } | { readonly kind: 'failed'; readonly message: string } | null;
  /** The state the newest answer belongs to. */
  readonly answered: Work | null;
}

const NOTHING: LeversState = { isPreparing: false, prepared: null, needsSolve: null, failure: null, answered: null };

export const useLevers = create<LeversState>()(() => NOTHING);
const levers = useLevers;

type Answer = Output<'levers.try'>;

let isAsking = false;

/** Solves what stays the same and keeps it; what is shown now is then what changes are compared against. */
export async function prepare(): Promise<void> {
  const { project, history, model } = getState();
  if (project === null || history === null || model === null || model.problems.length > 0) return;
  const { projectId } = project;
  const work = history.present;
  letGo({ isPreparing: true });
  try {
    const { leversId } = await runJob('levers', 'Preparing the levers', (jobId) =>
      call('levers.prepare', { projectId, jobId, document: documentRefOf(work), settings: work.settings }),
    );
    if (getState().project?.projectId !== projectId) {
      await call('levers.release', { leversId });
      return;
    }
    levers.setState({ ...NOTHING, prepared: { leversId, projectId, work } });
    keepForComparison();
    void follow();
  } catch (error) {
    const message = failureText(error);
    if (getState().project?.projectId !== projectId || jobOf('levers') !== undefined) return;
    levers.setState({
      isPreparing: false,
      failure: message === null ? { kind: 'stopped' } : { kind: 'failed', message },
    });
  }
}

function letGo(next: Partial<LeversState> = {}): void {
  const { prepared } = levers.getState();
  if (prepared !== null) void call('levers.release', { leversId: prepared.leversId }).catch(() => {});
  levers.setState({ ...NOTHING, ...next });
}

/** One question to the kept responses about any sources; `null` when nothing is kept. */
export async function tryChange(sources: SourcesPart): Promise<Answer | null> {
  const { prepared } = levers.getState();
  const work = getState().history?.present;
  if (prepared === null || work === undefined) return null;
  return await call('levers.try', { leversId: prepared.leversId, sources, settings: work.settings });
}

/** Whether an answer to the present document is under way. */
export const isBusy = (): boolean => isAsking;

/** Asks until the answer is that of the present document. */
async function follow(): Promise<void> {
  if (isAsking) return;
  isAsking = true;
  try {
    for (let work = unanswered(); work !== null; work = unanswered()) {
      setState({ isTrying: true });
      await answer(work);
    }
  } finally {
    isAsking = false;
    if (getState().isTrying) setState({ isTrying: false });
  }
}

/** The present document, when the kept responses were not asked about it yet and could be. */
function unanswered(): Work | null {
  const { history, model } = getState();
  const { prepared, answered } = levers.getState();
  if (prepared === null || history === null || model === null || model.problems.length > 0) return null;
  return history.present === answered ? null : history.present;
}

async function answer(work: Work): Promise<void> {
  const { prepared } = levers.getState();
  const layout = changedLayout(getState().bases, prepared!.work.baseId, work.baseId);
  let reply: Answer;
  try {
    reply = layout ? { needsSolve: 'the layout is another one' } : (await tryChange(work.sources))!;
  } catch (error) {
    if (levers.getState().prepared !== prepared) return;
    const isLost = error instanceof AppError && (error.path === 'leversId' || error.code === 'cancelled');
    const message = failureText(error);
    levers.setState(isLost ? NOTHING : { answered: work, failure: { kind: 'failed', message: message ?? '' } });
    return;
  }
  if (levers.getState().prepared !== prepared) return;
  if ('needsSolve' in reply) {
    levers.setState({ answered: work, needsSolve: { reason: reply.needsSolve, work }, failure: null });
    return;
  }
  levers.setState({ answered: work, needsSolve: null, failure: null });
  const { result } = getState();
  // What was estimated in full is shown as it is.
  const isEstimated = result !== null && sameWork(result.work, work);
  showTrial(isEstimated ? null : { points: reply.points, worst: reply.worst, verdict: reply.verdict, work });
}

/** Follows the document from now on; called once. */
export function startFollowing(): () => void {
  return subscribe((state, before) => {
    const { prepared } = levers.getState();
    if (state.project?.projectId !== before.project?.projectId) {
      letGo();
    } else if (state.history !== before.history && prepared !== null) {
      void follow();
    }
  });
}
