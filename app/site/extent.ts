import type { ElementSet } from '../fields/element-set.ts';

/** Ring about the turntable axis that holds sources: largest distance from the axis, lowest and highest place, m. */
export interface Extent {
  readonly axisRadiusM: number;
  readonly lowZM: number;
  readonly highZM: number;
}

/** Extent of points (x, y, z each, m); of none: nothing at height 0. */
export function extentOfPoints(positionsM: Float64Array): Extent {
  if (positionsM.length === 0) return { axisRadiusM: 0, lowZM: 0, highZM: 0 };
  let farthest2 = 0;
  let lowZM = Infinity;
  let highZM = -Infinity;
  for (let i = 0; i < positionsM.length; i += 3) {
    farthest2 = Math.max(farthest2, positionsM[i]! * positionsM[i]! + positionsM[i + 1]! * positionsM[i + 1]!);
    lowZM = Math.min(lowZM, positionsM[i + 2]!);
    highZM = Math.max(highZM, positionsM[i + 2]!);
  }
  return { axisRadiusM: Math.sqrt(farthest2), lowZM, highZM };
}

const known = new WeakMap<ElementSet, Extent>();

/** Extent of several sets of elements. */
export function extentOf(sets: readonly ElementSet[]): Extent {
  const own = sets.filter(({ count }) => count > 0).map(ownExtent);
  if (own.length === 0) return extentOfPoints(new Float64Array(0));
  return {
    axisRadiusM: own.reduce((most, { axisRadiusM }) => Math.max(most, axisRadiusM), 0),
    lowZM: own.reduce((least, { lowZM }) => Math.min(least, lowZM), Infinity),
    highZM: own.reduce((most, { highZM }) => Math.max(most, highZM), -Infinity),
  };
}

function ownExtent(elements: ElementSet): Extent {
  const extent = known.get(elements) ?? extentOfPoints(elements.positionsM);
  known.set(elements, extent);
  return extent;
}
