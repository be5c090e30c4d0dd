import { sourcesPartSchema } from '../../app/contract/documents.ts';
import { AppError } from '../../app/errors.ts';
import { call } from '../api/api.ts';
import { type Draft, type DraftState, getState, setState, subscribe } from './app-store.ts';
import { needBase, showWork } from './document.ts';
import { failureText } from './notices.ts';
import { documentRefOf, sameWork, type Work } from './work.ts';

/** The draft saves itself shortly after the last change; a change by another window is never overwritten unasked. */

/** Names this window in the events. */
export const CLIENT_ID = crypto.randomUUID();

const SAVE_AFTER_MS = 700;

let timer: ReturnType<typeof setTimeout> | undefined;
/** What the host has under `draft.version`. */
let savedWork: Work | null = null;
/** The save that is on its way: the next one waits for its version. */
let sending: Promise<void> | null = null;

const setDraft = (draft: DraftState): void => setState({ draft });
const workOf = ({ document, settings }: Draft): Work => ({ ...document, settings });

/** Watches the document from now on; the returned function ends it. */
export const startAutosave = (): (() => void) =>
  subscribe((state, before) => {
    if (state.history !== null && state.history.present !== before.history?.present) schedule();
  });

/** The draft as the host has it: nothing to save. */
export function takeSaved(work: Work, version: number): void {
  clearTimeout(timer);
  savedWork = work;
  setDraft({ kind: 'saved', version });
}

export function forgetDraft(): void {
  clearTimeout(timer);
  savedWork = null;
}

function schedule(): void {
  const { draft, history } = getState();
  if (draft.kind === 'conflict' || history === null) return;
  clearTimeout(timer);
  if (history.present === savedWork && sending === null) {
    setDraft({ kind: 'saved', version: draft.version });
    return;
  }
  setDraft({ kind: 'waiting', version: draft.version });
  timer = setTimeout(() => void saveDraft(), SAVE_AFTER_MS);
}

/** Saves now what is not saved yet. */
export async function saveDraft(): Promise<void> {
  clearTimeout(timer);
  while (sending !== null) await sending;
  const { project, history, draft } = getState();
  if (project === null || history === null || project.isReadOnly) return;
  if (draft.kind === 'conflict' || history.present === savedWork) return;
  const work = history.present;
  if (!sourcesPartSchema.safeParse(work.sources).success) {
    setDraft({ kind: 'incomplete', version: draft.version });
    return;
  }
  setDraft({ kind: 'saving', version: draft.version });
  sending = send(project.projectId, work, draft.version);
  await sending;
}

async function send(projectId: string, work: Work, basedOn: number): Promise<void> {
  const { settings } = work;
  const isStillOpen = () => getState().project?.projectId === projectId;
  try {
    const document = documentRefOf(work);
    const { version } = await call('draft.save', { projectId, document, settings, basedOn, clientId: CLIENT_ID });
    sending = null;
    if (!isStillOpen()) return;
    takeSaved(work, version);
    schedule();
  } catch (error) {
    sending = null;
    if (!isStillOpen()) return;
    if (error instanceof AppError && error.code === 'busy') await lookAtTheirs(projectId);
    else setDraft({ kind: 'failed', version: basedOn, message: failureText(error) ?? 'stopped' });
  }
}

/** Another window changed the draft. With nothing unsaved here it is simply shown; a step back leads to mine. */
export async function takeForeignDraft(): Promise<void> {
  const { project, history, draft } = getState();
  if (project === null || history === null || draft.kind === 'conflict' || sending !== null) return;
  await lookAtTheirs(project.projectId);
}

async function lookAtTheirs(projectId: string): Promise<void> {
  const { draft: theirs } = await call('draft.load', { projectId });
  if (theirs === null || theirs.version === getState().draft.version) return;
  await needBase(projectId, theirs.document.baseId);
  const { history, project, draft } = getState();
  if (history === null || project?.projectId !== projectId) return;
  if (sameWork(workOf(theirs), history.present)) takeSaved(history.present, theirs.version);
  else if (history.present === savedWork) adopt(theirs);
  else setDraft({ kind: 'conflict', version: draft.version, theirs });
}

function adopt(theirs: Draft): void {
  const work = workOf(theirs);
  takeSaved(work, theirs.version);
  showWork('Change by another window', work);
}

export function takeTheirs(): void {
  const { draft } = getState();
  if (draft.kind === 'conflict') adopt(draft.theirs);
}

export async function keepMine(): Promise<void> {
  const { draft } = getState();
  if (draft.kind !== 'conflict') return;
  setDraft({ kind: 'waiting', version: draft.theirs.version });
  await saveDraft();
}
