import type { Board } from '../board/board.ts';
import { eachLine } from './each-line.ts';
import type { EstimateHooks, EstimateRequest } from './estimate-request.ts';
import { finishEstimate } from './finish.ts';
import { type LineLevel, lineLevel } from './line-level.ts';
import { type EstimatePlan, planEstimate } from './plan.ts';
import type { EstimateResult } from './result.ts';
import { type WorkUnit, workUnits } from './work-units.ts';

/** The level at every frequency of a unit, null where nothing radiates. Throws `cancelled` on stop. */
export function solveUnit({ scene, table }: EstimatePlan, unit: WorkUnit, hooks: EstimateHooks = {}): UnitLevels {
  return eachLine(scene, table.slice(unit.from, unit.to), hooks, (lines, responder) => {
    const level = lineLevel(scene, lines, responder);
    if (level) hooks.onLevel?.(level);
    return level;
  });
}

export type UnitLevels = readonly (LineLevel | null)[];

/** Puts the levels of all units (in their order) together, in order of frequency. */
export const mergeUnits = (units: readonly UnitLevels[]): LineLevel[] => units.flat().filter((level) => level !== null);

/**
 * The main job: the board's radiated-emission levels on a test site against limit lines.
 *
 * Every spectral line of the drives, loops and stated cable currents between the lowest limit frequency and the upper end
 * of the judged range is solved (net currents), scanned (height, turntable, both polarisations), read like a receiver and
 * held against each limit line that covers it. Throws `input` when the board cannot be modelled, `cancelled` on stop.
 */
export function estimate(board: Board, request: EstimateRequest, hooks: EstimateHooks = {}): EstimateResult {
  const plan = planEstimate(board, request);
  const total = plan.table.length;
  const levels = workUnits(plan).map((unit) => {
    const onProgress = (done: number) => hooks.onProgress?.(unit.from + done, total);
    return solveUnit(plan, unit, { ...hooks, onProgress });
  });
  return finishEstimate(board, request, plan, mergeUnits(levels));
}
