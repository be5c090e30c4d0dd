import { parentPort, workerData } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import { type LeverRequest, prepareLevers } from '../../app/levers/levers.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { joinParts, splitParts } from '../../app/project/board-parts.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import { estimateJob } from './estimate-job.ts';
import type { LeversMessage, LeversQuestion, LeversStart } from './levers-messages.ts';

/** Entry of a levers thread: solves once, then answers questions until it is ended. */

const PROGRESS_INTERVAL_MS = 100;

const say = (message: LeversMessage): void => parentPort!.postMessage(message);
const { document, settings, programVersion } = workerData as LeversStart;
const { layout } = splitParts(document.board);

let saidAtMs = 0;
function onProgress(done: number, total: number): void {
  const nowMs = performance.now();
  if (nowMs - saidAtMs < PROGRESS_INTERVAL_MS && done < total) return;
  saidAtMs = nowMs;
  say({ kind: 'progress', done, total });
}

function modelOf(changed: RunDocument, changedSettings: RunSettings) {
  const { board, request, limits, catalogue } = estimateJob(changed, changedSettings, programVersion);
  const leverRequest: LeverRequest = { ...request, limits: chooseLimits(limits, catalogue) };
  return [board, leverRequest] as const;
}

/** Failures in words go to the caller; any other ends the thread. */
function telling(step: () => LeversMessage): boolean {
  try {
    say(step());
    return true;
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    say({ kind: 'failed', code: error.code, message: error.message, path: error.path });
    return false;
  }
}

telling(() => {
  const levers = prepareLevers(...modelOf(document, settings), { onProgress });
  parentPort!.on('message', (question: LeversQuestion) => {
    telling(() => {
      const changed = { ...document, board: joinParts(layout, question.sources) };
      return { kind: 'answer', answer: levers.try(...modelOf(changed, question.settings)) };
    });
  });
  return { kind: 'ready' };
});
