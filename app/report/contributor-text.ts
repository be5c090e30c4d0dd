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

/** Does the path only repeat what the contributor is: a loop that radiates from the loop, a cable from the cable? */
export const isItself = ({ kind, name }: Contributor, path: Path): boolean => path.name === name || path.name === kind;

/** What kind a contributor is, said before its name in a sentence. */
export const KIND_PHRASE: Readonly<Record<Contributor['kind'], string>> = {
  net: 'net ',
  loop: 'current loop ',
  cable: 'the stated current of ',
};

/** The same, said after its name in a list of mostly nets. */
export const KIND_REMARK: Readonly<Record<Contributor['kind'], string>> = {
  net: '',
  loop: 'current loop',
  cable: 'stated current',
};

/** A path in the reader's words: the trace with its return, the plane, else the cable by name. */
export function pathText(pathName: string): string {
  if (pathName === 'pair') return 'trace pair';
  return pathName === 'plane' ? 'plane' : pathName;
}
