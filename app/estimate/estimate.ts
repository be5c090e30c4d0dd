import type { Board } from '../board/board.ts';
import { AppError } from '../errors.ts';
import type { EstimateHooks, EstimateRequest } from './estimate-request.ts';
import { finishEstimate } from './finish.ts';
import { type LineLevel, lineLevel } from './line-level.ts';
import { type EstimatePlan, planEstimate } from './plan.ts';
import type { EstimateResult } from './result.ts';
import type { FrequencyLines } from './spectrum-table.ts';
import { StructureResponder } from './structure-responder.ts';

/** A share of the work: a band of frequencies. Shares together make the whole. */
export interface WorkShare {
  readonly index: number;
  readonly of: number;
}

/** The level at every frequency of a share, null where nothing radiates. Throws `cancelled` on stop. */
export function solveShare(plan: EstimatePlan, share: WorkShare, hooks: EstimateHooks = {}): (LineLevel | null)[] {
  const { scene, table } = plan;
  const own = ownBand(table, share);
  const throwIfStopped = () => {
    if (hooks.stop?.()) throw new AppError('cancelled', 'stopped by the user');
  };
  if (own.length === 0) return [];
  const responder = scene.structure
    ? new StructureResponder(
        scene,
        scene.structure,
        own.map(({ frequencyHz }) => frequencyHz),
        throwIfStopped,
      )
    : null;
  const levels = own.map((lines, done) => {
    throwIfStopped();
    hooks.onProgress?.(done, own.length);
    const level = lineLevel(scene, lines, responder);
    if (level) hooks.onLevel?.(level);
    return level;
  });
  hooks.onProgress?.(own.length, own.length);
  return levels;
}

/** Work grows with frequency: more antenna angles and heights. Twice as much at this frequency. */
const TWICE_THE_WORK_HZ = 300e6;

/** Bands of about equal work: a band's frequencies are neighbours, so that interpolation over frequency serves them. */
function ownBand(table: readonly FrequencyLines[], { index, of }: WorkShare): readonly FrequencyLines[] {
  const work = table.map(({ frequencyHz }) => 1 + (frequencyHz / TWICE_THE_WORK_HZ) ** 2);
  const total = work.reduce((sum, value) => sum + value, 0);
  let done = 0;
  return table.filter((_, i) => {
    const band = Math.min(of - 1, Math.floor(((done + work[i]! / 2) / total) * of));
    done += work[i]!;
    return band === index;
  });
}

/** Puts the levels of all shares (in their order) together, in order of frequency. */
export const mergeShares = (shares: readonly (readonly (LineLevel | null)[])[]): LineLevel[] =>
  shares.flat().filter((level) => level !== null);

/**
 * The main job: the board's radiated-emission levels on a test site against limit lines.
 *
 * Every spectral line of the drives, loops and stated cable currents between the lowest limit frequency and the upper end
 * of the judged range is solved (net currents), scanned (height, turntable, both polarisations), read like a receiver and
 * held against each limit line that covers it. Throws `input` when the board cannot be modelled, `cancelled` on stop.
 */
export function estimate(board: Board, request: EstimateRequest, hooks: EstimateHooks = {}): EstimateResult {
  const plan = planEstimate(board, request);
  return finishEstimate(board, request, plan, mergeShares([solveShare(plan, { index: 0, of: 1 }, hooks)]));
}
