import type { Board } from '../board/board.ts';
import { AppError } from '../errors.ts';
import type { EstimateHooks, EstimateRequest } from './estimate-request.ts';
import { finishEstimate } from './finish.ts';
import { type LineLevel, lineLevel } from './line-level.ts';
import { type EstimatePlan, planEstimate } from './plan.ts';
import type { EstimateResult } from './result.ts';

/** A share of the work: every `of`-th frequency, from the `index`-th on. Shares together make the whole. */
export interface WorkShare {
  readonly index: number;
  readonly of: number;
}

/** The level at every frequency of a share, null where nothing radiates. Throws `cancelled` on stop. */
export function solveShare(
  plan: EstimatePlan,
  { index, of }: WorkShare,
  hooks: EstimateHooks = {},
): (LineLevel | null)[] {
  const own = plan.table.filter((_, i) => i % of === index);
  const levels = own.map((lines, done) => {
    if (hooks.stop?.()) throw new AppError('cancelled', 'stopped by the user');
    hooks.onProgress?.(done, own.length);
    return lineLevel(plan.scene, lines);
  });
  hooks.onProgress?.(own.length, own.length);
  return levels;
}

/** Puts the levels of all shares back in order of frequency. */
export function mergeShares(shares: readonly (readonly (LineLevel | null)[])[]): LineLevel[] {
  const count = shares.reduce((sum, levels) => sum + levels.length, 0);
  const merged = Array.from({ length: count }, (_, i) => shares[i % shares.length]![Math.floor(i / shares.length)]!);
  return merged.filter((level) => level !== null);
}

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
