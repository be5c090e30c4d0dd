import type { Contributor, ResultPoint } from '../estimate/result.ts';

export interface Path {
  readonly name: string;
  readonly levelDbuvPerM: number;
}

/** Where a contributor's current radiates from, strongest first; ties by name. */
export function pathsOf(contributor: Contributor): Path[] {
  return Object.entries(contributor.viaDbuvPerM)
    .map(([name, levelDbuvPerM]) => ({ name, levelDbuvPerM }))
    .sort((one, other) => other.levelDbuvPerM - one.levelDbuvPerM || (one.name < other.name ? -1 : 1));
}

/** The strongest contributor and its strongest path; absent when the point has none. */
export function mainContributor(point: ResultPoint): { contributor: Contributor; path: Path | undefined } | undefined {
  const contributor = point.contributors[0];
  return contributor && { contributor, path: pathsOf(contributor)[0] };
}

/** A path as the reader knows it: "its own trace and return" for the pair, "the plane", else the cable by name. */
export function pathText(pathName: string): string {
  if (pathName === 'pair') return 'trace pair';
  return pathName === 'plane' ? 'plane' : pathName;
}
