import type { ResultPoint } from '../estimate/result.ts';
import type { LinePair } from './match-lines.ts';
import { type OwnLevel, ownLevels, powerOf, type Renames } from './own-levels.ts';
import type { ContributorChange, Crossing, LineChange, LineReading } from './types.ts';

/** Smaller changes are none: tables round to this. */
export const UNCHANGED_DB = 0.1;

/** Contributors with a smaller part of a line's change are left out, and those after so many. */
const LEAST_SHARE = 0.01;
const MOST_CONTRIBUTORS = 8;

/** What happened to one line; `causes` come later. */
export function lineChange(pair: LinePair, renames: Renames): Omit<LineChange, 'causes'> {
  const { before, after } = pair;
  const difference = (value: (point: ResultPoint) => number) => (before && after ? value(after) - value(before) : null);
  const levelChangeDb = difference(({ levelDbuvPerM }) => levelDbuvPerM);
  const limitChangeDb = difference(({ limitDbuvPerM }) => limitDbuvPerM);
  const isSmall = (changeDb: number | null) => changeDb !== null && Math.abs(changeDb) < UNCHANGED_DB;
  const isUnchanged = isSmall(levelChangeDb) && isSmall(limitChangeDb);
  return {
    frequencyHz: pair.frequencyHz,
    detector: pair.detector,
    status: !before ? 'new' : !after ? 'gone' : isUnchanged ? 'unchanged' : 'changed',
    before: readingOf(before),
    after: readingOf(after),
    levelChangeDb,
    limitChangeDb,
    marginChangeDb: difference(({ marginDb }) => marginDb),
    crossing: crossingOf(isOver(before), isOver(after)),
    contributors: isUnchanged ? [] : contributorChanges(before, after, renames),
  };
}

const isOver = (point: ResultPoint | undefined): boolean => point !== undefined && point.marginDb < 0;

function crossingOf(wasOver: boolean, isNowOver: boolean): Crossing {
  if (wasOver) return isNowOver ? 'still-over' : 'newly-under';
  return isNowOver ? 'newly-over' : 'under';
}

function readingOf(point: ResultPoint | undefined): LineReading | null {
  if (!point) return null;
  const { levelDbuvPerM, limitDbuvPerM, marginDb, polarization, antennaHeightM, turntableDeg } = point;
  return { levelDbuvPerM, limitDbuvPerM, marginDb, polarization, antennaHeightM, turntableDeg };
}

/**
 * Ranks contributors by |ΔP|, P = 10^(L/10) the power of a contributor's own level through one path: what a receiver
 * would miss or find if it radiated alone. Share = |ΔP| / Σ|ΔP|. Phases between contributors are not in it.
 */
function contributorChanges(
  before: ResultPoint | undefined,
  after: ResultPoint | undefined,
  renames: Renames,
): ContributorChange[] {
  const [was, is] = [ownLevels(before, renames), ownLevels(after)];
  const all = [...new Set([...was.keys(), ...is.keys()])].map((key) => {
    const [one, other] = [was.get(key), is.get(key)];
    const power = Math.abs(powerOf(other?.levelDbuvPerM) - powerOf(one?.levelDbuvPerM));
    return { key, one, other, power };
  });
  const total = all.reduce((sum, { power }) => sum + power, 0);
  if (total === 0) return [];
  return all
    .map((each) => ({ ...each, share: each.power / total }))
    .filter(({ share }) => share >= LEAST_SHARE)
    .sort((one, other) => other.share - one.share || (one.key < other.key ? -1 : 1))
    .slice(0, MOST_CONTRIBUTORS)
    .map(({ one, other, share }) => changeOf(one, other, share));
}

function changeOf(one: OwnLevel | undefined, other: OwnLevel | undefined, share: number): ContributorChange {
  const { kind, name, path } = (other ?? one)!;
  return {
    kind,
    name,
    path,
    beforeDbuvPerM: one?.levelDbuvPerM ?? null,
    afterDbuvPerM: other?.levelDbuvPerM ?? null,
    changeDb: one && other ? other.levelDbuvPerM - one.levelDbuvPerM : null,
    share,
  };
}
