import type { CurrentLoop } from '../board/board.ts';
import type { ElementSet } from '../fields/element-set.ts';
import type { SiteFrame } from '../site/site.ts';
import { elementsAlong } from './straight-elements.ts';

/** A stated loop of current (the switching loop of a converter): the same current all around, closed by itself. */
export interface LoopModel {
  readonly name: string;
  readonly elements: ElementSet;
  readonly perimeterM: number;
}

export function buildLoop(loop: CurrentLoop, frame: SiteFrame, maxHz: number): LoopModel {
  const { elements, lengthM } = elementsAlong(frame, [...loop.pointsM, loop.pointsM[0]!], maxHz);
  return { name: loop.name, elements, perimeterM: lengthM };
}
