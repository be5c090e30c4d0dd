import type { ResultPoint } from '../estimate/result.ts';
import { isNothing } from '../report/format.ts';
import type { ContributorKind } from './types.ts';

/** A contributor through one of its paths. */
export interface OwnLevel {
  readonly kind: ContributorKind;
  readonly name: string;
  readonly path: string;
  readonly levelDbuvPerM: number;
}

/** New names of nets, by their old ones. */
export type Renames = ReadonlyMap<string, string>;

/** Every contributor by path of one reading, by key, except what is next to nothing; nets under their new names. */
export function ownLevels(point: ResultPoint | undefined, renames?: Renames): Map<string, OwnLevel> {
  const levels = new Map<string, OwnLevel>();
  for (const { kind, name: oldName, viaDbuvPerM } of point?.contributors ?? []) {
    const name = kind === 'net' ? (renames?.get(oldName) ?? oldName) : oldName;
    for (const [path, levelDbuvPerM] of Object.entries(viaDbuvPerM)) {
      if (isNothing(levelDbuvPerM)) continue;
      levels.set(JSON.stringify([kind, name, path]), { kind, name, path, levelDbuvPerM });
    }
  }
  return levels;
}

/** Power in units of (1 µV/m)². */
export const powerOf = (levelDbuvPerM: number | undefined): number =>
  levelDbuvPerM === undefined ? 0 : 10 ** (levelDbuvPerM / 10);
