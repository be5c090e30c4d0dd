import type { CurrentLoop } from '../board/board.ts';
import type { ElementSet } from '../fields/element-set.ts';
import type { SiteFrame } from '../site/site.ts';
import { LoopCoupling } from '../structure/couplings.ts';
import type { StructureModel } from '../structure/structure-model.ts';
import { elementsAlong } from './straight-elements.ts';

/** A stated loop of current (the switching loop of a converter): the same current all around, closed by itself. */
export interface LoopModel {
  readonly name: string;
  readonly elements: ElementSet;
  readonly perimeterM: number;
  /** How the loop drives planes and cables; null when they are not solved. */
  readonly coupling: LoopCoupling | null;
}

export function buildLoop(
  loop: CurrentLoop,
  frame: SiteFrame,
  maxHz: number,
  structure: StructureModel | null,
): LoopModel {
  const { elements, lengthM } = elementsAlong(frame, [...loop.pointsM, loop.pointsM[0]!], maxHz);
  const coupling = structure ? new LoopCoupling(structure, loop) : null;
  return { name: loop.name, elements, perimeterM: lengthM, coupling };
}
