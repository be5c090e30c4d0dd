import { parentPort, workerData } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import { solveUnit } from '../../app/estimate/estimate.ts';
import { finishEstimate } from '../../app/estimate/finish.ts';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import { planEstimate } from '../../app/estimate/plan.ts';
import { workUnits } from '../../app/estimate/work-units.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import type { EstimateMessage, EstimateQuestion } from './estimate-messages.ts';
import type { EstimateJob } from './job.ts';

/** Entry of an estimate's thread: models the board once, then does what it is asked until it is ended. */

const PROGRESS_INTERVAL_MS = 100;

const say = (message: EstimateMessage): void => parentPort!.postMessage(message);
const { board, request: plain, limits, catalogue } = workerData as EstimateJob;

let saidAtMs = 0;
let newLevels: LineLevel[] = [];

function onProgress(done: number, total: number): void {
  const nowMs = performance.now();
  if (nowMs - saidAtMs < PROGRESS_INTERVAL_MS && done < total) return;
  saidAtMs = nowMs;
  say({ kind: 'progress', done, levels: newLevels });
  newLevels = [];
}

/** Failures in words go to the caller; any other ends the thread. */
function telling(step: () => EstimateMessage): void {
  try {
    say(step());
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    say({ kind: 'failed', code: error.code, message: error.message, path: error.path });
  }
}

telling(() => {
  const request = { ...plain, limits: chooseLimits(limits, catalogue) };
  const plan = planEstimate(board, request);
  const units = workUnits(plan);
  parentPort!.on('message', (question: EstimateQuestion) => {
    telling(() => {
      if (question.kind === 'finish') {
        return { kind: 'result', result: finishEstimate(board, request, plan, question.levels) };
      }
      const onLevel = (level: LineLevel): void => void newLevels.push(level);
      return { kind: 'unit', levels: solveUnit(plan, units[question.index]!, { onProgress, onLevel }) };
    });
  });
  return { kind: 'ready', unitLines: units.map(({ from, to }) => to - from) };
});
