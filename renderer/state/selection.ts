import type { LineDetail } from '../../app/contract/line-detail.ts';
import { AppError } from '../../app/errors.ts';
import type { Detector, ResultPoint } from '../../app/estimate/result.ts';
import { call } from '../api/api.ts';
import { getState, type Hover, NO_HOVER, NO_SELECTION, type Selection, setState } from './app-store.ts';
import { failureText } from './notices.ts';
import { documentRefOf, type Work } from './work.ts';

/** What is chosen and what the pointer is over: one line, net, cable … that every part shows in its own way. */

/** Stepping through lines with the keys asks only for the one that stays. */
const DETAIL_AFTER_MS = 120;
const MOST_CACHED = 60;

/** By the state a result was made of, then by frequency. */
const cache = new WeakMap<Work, Map<number, LineDetail>>();
let timer: ReturnType<typeof setTimeout> | undefined;
let runningJob: string | null = null;

const choose = (change: Partial<Selection>): void =>
  setState(({ selection }) => ({ selection: { ...selection, ...change } }));

/** Chooses a spectral line and loads what it is made of. Without a detector, the one with the smallest margin counts. */
export function selectLine(lineHz: number | null, detector: Detector | null = null): void {
  choose({ lineHz, detector, piece: null });
  if (lineHz === null) forgetDetail();
  else loadDetail(lineHz);
}

export const selectNet = (net: string | null): void => choose({ net, cable: null, finding: null, piece: null });
export const selectCable = (cable: string | null): void => choose({ cable, net: null, finding: null, piece: null });
export const selectFinding = (finding: number | null): void => choose({ finding });

/** A piece of the line's detail; its net is chosen with it. */
export function selectPiece(piece: number | null): void {
  const { detail } = getState();
  const net = piece !== null && detail.kind === 'ready' ? detail.detail.pieces[piece]?.net : undefined;
  choose({ piece, ...(net !== undefined && { net, cable: null }) });
}

/** Takes back the most particular choice. Says whether there was one. */
export function stepBackSelection(): boolean {
  const { selection } = getState();
  if (selection.piece !== null) choose({ piece: null });
  else if (selection.finding !== null) choose({ finding: null });
  else if (selection.net !== null || selection.cable !== null) choose({ net: null, cable: null });
  else if (selection.lineHz !== null) selectLine(null);
  else return false;
  return true;
}

export function clearSelection(): void {
  setState({ selection: NO_SELECTION, hover: NO_HOVER });
  forgetDetail();
}

export const hover = (change: Partial<Hover>): void => setState((state) => ({ hover: { ...state.hover, ...change } }));

/** Moves to the next (+1) or previous (−1) of the given frequencies; from nothing, to the first or last. */
export function stepLine(points: readonly ResultPoint[], by: 1 | -1): void {
  const frequenciesHz = [...new Set(points.map(({ frequencyHz }) => frequencyHz))].sort((a, b) => a - b);
  const { lineHz } = getState().selection;
  const next =
    by === 1
      ? frequenciesHz.find((frequencyHz) => lineHz === null || frequencyHz > lineHz)
      : frequenciesHz.findLast((frequencyHz) => lineHz === null || frequencyHz < lineHz);
  if (next !== undefined) selectLine(next);
}

function forgetDetail(): void {
  clearTimeout(timer);
  stopRunning();
  setState({ detail: { kind: 'none' } });
}

function stopRunning(): void {
  if (runningJob !== null) void call('job.stop', { jobId: runningJob });
  runningJob = null;
}

function loadDetail(lineHz: number): void {
  clearTimeout(timer);
  stopRunning();
  const { result } = getState();
  if (result === null) return;
  const known = cache.get(result.work)?.get(lineHz);
  if (known !== undefined) {
    setState({ detail: { kind: 'ready', lineHz, detail: known } });
    return;
  }
  setState({ detail: { kind: 'loading', lineHz } });
  timer = setTimeout(() => void fetchDetail(result.work, lineHz), DETAIL_AFTER_MS);
}

async function fetchDetail(work: Work, lineHz: number): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  const jobId = crypto.randomUUID();
  runningJob = jobId;
  const isStillWanted = () => runningJob === jobId;
  try {
    const { projectId } = project;
    const document = documentRefOf(work);
    const { settings } = work;
    const { detail } = await call('estimate.line-detail', {
      projectId,
      jobId,
      document,
      settings,
      frequencyHz: lineHz,
    });
    keep(work, lineHz, detail);
    if (isStillWanted()) setState({ detail: { kind: 'ready', lineHz, detail } });
  } catch (error) {
    if (!isStillWanted() || (error instanceof AppError && error.code === 'cancelled')) return;
    setState({ detail: { kind: 'failed', lineHz, message: failureText(error) ?? '' } });
  } finally {
    if (isStillWanted()) runningJob = null;
  }
}

function keep(work: Work, lineHz: number, detail: LineDetail): void {
  const ofWork = cache.get(work) ?? new Map<number, LineDetail>();
  ofWork.set(lineHz, detail);
  const oldest = ofWork.keys().next();
  if (ofWork.size > MOST_CACHED && !oldest.done) ofWork.delete(oldest.value);
  cache.set(work, ofWork);
}
