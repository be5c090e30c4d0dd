import type { EstimatePlan } from './plan.ts';
import { SOLVED_TO_HZ } from './scene.ts';
import { DIRECT_LINES } from './structure-responder.ts';

/** A part of the work that can be done anywhere, in any order: the lines `from` ≤ index < `to` of the plan's table. */
export interface WorkUnit {
  readonly from: number;
  readonly to: number;
}

/** Lines too many to be solved one by one are interpolated within bands: each needs some 15 solutions of its own. */
const MOST_BANDS = 4;
/** Lines that need no solution of planes and cables make this many units at most. */
const MOST_SIMPLE_UNITS = 64;

/**
 * Cuts a plan's lines into units, in order of frequency. The cut depends on the plan alone: interpolation is the same whoever does
 * the work, and so is every number of the result.
 */
export function workUnits({ scene, table }: Pick<EstimatePlan, 'scene' | 'table'>): WorkUnit[] {
  const solved = scene.structure ? table.filter(({ frequencyHz }) => frequencyHz <= SOLVED_TO_HZ).length : 0;
  const rest = table.length - solved;
  return [
    ...cut(0, solved, solved > DIRECT_LINES ? bandCount(solved) : solved),
    ...cut(solved, table.length, Math.min(rest, MOST_SIMPLE_UNITS)),
  ];
}

/** As many as still hold more lines than would be solved one by one. */
const bandCount = (lines: number): number => Math.min(MOST_BANDS, Math.floor(lines / (DIRECT_LINES + 1)));

function cut(from: number, to: number, count: number): WorkUnit[] {
  const at = (part: number) => from + Math.round(((to - from) * part) / count);
  return Array.from({ length: count }, (_, part) => ({ from: at(part), to: at(part + 1) }));
}
