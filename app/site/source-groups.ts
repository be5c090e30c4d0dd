import type { ElementSet, Radiator } from '../fields/element-set.ts';
import { extentOf } from './extent.ts';
import { LineGrid, lineCount, lineOf } from './line-grid.ts';
import { type Box, MomentGrid } from './moment-grid.ts';

/** Points that several domains may share, with the moments (6 floats a point) of each domain that has some there. */
export interface SourceGroup {
  readonly positionsM: Float64Array;
  readonly shares: readonly { readonly domain: number; readonly moments: Float64Array }[];
}

/**
 * The sources of all domains as few points: those in the common box on its Chebyshev grid, others on a straight line on a
 * grid along it, each when that has fewer points than there are elements. `antennaM`: distance of the antenna from the axis.
 */
export function gatherSources(
  domains: readonly (readonly Radiator[])[],
  kPerM: number,
  box: Box | null,
  antennaM: number,
): readonly SourceGroup[] {
  const boxed: Radiator[][] = [];
  const loose: Radiator[][] = [];
  let boxedCount = 0;
  for (const radiators of domains) {
    const inside: Radiator[] = [];
    const outside: Radiator[] = [];
    for (const radiator of radiators) {
      if (box && isInside(radiator, box)) {
        inside.push(radiator);
        boxedCount += radiator.elements.count;
      } else outside.push(radiator);
    }
    boxed.push(inside);
    loose.push(outside);
  }
  const groups: SourceGroup[] = [];
  if (box && boxedCount > 0 && MomentGrid.pointCount(box, kPerM) < boxedCount) {
    const grid = new MomentGrid(box, kPerM);
    groups.push({
      positionsM: grid.positionsM,
      shares: boxed.flatMap((radiators, domain) =>
        radiators.length > 0 ? [{ domain, moments: grid.moments(radiators) }] : [],
      ),
    });
  } else {
    for (const [d, radiators] of boxed.entries()) loose[d]!.push(...radiators);
  }
  return [...groups, ...bySet(loose).map(([elements, own]) => gatherOnLine(elements, own, kPerM, antennaM))];
}

/** Radiators of all domains by the elements they share, one by one. */
export const groupByElements = (domains: readonly (readonly Radiator[])[]): SourceGroup[] =>
  bySet(domains).map(([elements, radiators]) => ungathered(elements, radiators));

type BySet = [elements: ElementSet, radiators: ReadonlyMap<number, readonly Radiator[]>];

/** Radiators by their elements, then by domain. */
function bySet(domains: readonly (readonly Radiator[])[]): BySet[] {
  const sets = new Map<ElementSet, Map<number, Radiator[]>>();
  for (const [domain, radiators] of domains.entries()) {
    for (const radiator of radiators) {
      const own = sets.get(radiator.elements) ?? new Map<number, Radiator[]>();
      sets.set(radiator.elements, own);
      const known = own.get(domain);
      if (known) known.push(radiator);
      else own.set(domain, [radiator]);
    }
  }
  return [...sets];
}

function gatherOnLine(elements: ElementSet, radiators: BySet[1], kPerM: number, antennaM: number): SourceGroup {
  const line = lineOf(elements);
  const gapM = antennaM - extentOf([elements]).axisRadiusM;
  const count = line && gapM > 0 ? lineCount(line, kPerM, gapM) : Infinity;
  if (!line || count >= elements.count) return ungathered(elements, radiators);
  const grid = new LineGrid(line, count);
  return {
    positionsM: grid.positionsM,
    shares: [...radiators].map(([domain, own]) => {
      const moments = new Float64Array(6 * count);
      for (const radiator of own) grid.gather(radiator, moments);
      return { domain, moments };
    }),
  };
}

/** Every element for itself; moments of one domain add up. */
function ungathered(elements: ElementSet, radiators: BySet[1]): SourceGroup {
  return {
    positionsM: elements.positionsM,
    shares: [...radiators].map(([domain, own]) => {
      const moments = new Float64Array(6 * elements.count);
      for (const radiator of own) addMoments(radiator, moments);
      return { domain, moments };
    }),
  };
}

/** Complex vector moments of a radiator's elements: 6 floats each (x, y, z, re then im), A·m. */
function addMoments({ elements, currentsA }: Radiator, moments: Float64Array): void {
  for (let e = 0; e < elements.count; e++) {
    for (let axis = 0; axis < 3; axis++) {
      moments[6 * e + 2 * axis]! += currentsA[2 * e]! * elements.vectorsM[3 * e + axis]!;
      moments[6 * e + 2 * axis + 1]! += currentsA[2 * e + 1]! * elements.vectorsM[3 * e + axis]!;
    }
  }
}

function isInside({ elements }: Radiator, box: Box): boolean {
  const { positionsM } = elements;
  for (let i = 0; i < positionsM.length; i++) {
    const axis = i % 3;
    if (positionsM[i]! < box.lowM[axis]! - 1e-9 || positionsM[i]! > box.highM[axis]! + 1e-9) return false;
  }
  return true;
}
