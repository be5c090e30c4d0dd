import type { ResultPoint } from '../estimate/result.ts';
import { isNothing } from '../report/format.ts';
import type { Draft } from './changes/draft.ts';
import type { LinePair } from './match-lines.ts';
import { powerOf, type Renames } from './own-levels.ts';
import type { Change, ChangeEffect, ChangeKind, LineChange } from './types.ts';

/** A net, loop or cable, as a key. */
const keyOf = (kind: 'net' | 'loop' | 'cable', name: string): string => `${kind} ${name}`;

const subjectsOf = ({ nets, loops, cables }: Pick<Change, 'nets' | 'loops' | 'cables'>): string[] => [
  ...nets.map((name) => keyOf('net', name)),
  ...loops.map((name) => keyOf('loop', name)),
  ...cables.map((name) => keyOf('cable', name)),
];

interface OwnChange extends Omit<ChangeEffect, 'isAlone'> {
  /** |Δ(P/P_limit)|: how much it moved towards or away from the limit. */
  readonly weight: number;
}

/**
 * For each asked net, loop or cable the line at which its own power, against the limit, changed most:
 * max |10^((L−limit)/10) after − before|. A cable's own power is the sum over all that radiates through it.
 */
function ownChanges(pairs: readonly LinePair[], asked: ReadonlySet<string>, renames: Renames): Map<string, OwnChange> {
  const best = new Map<string, OwnChange>();
  for (const { frequencyHz, detector, before, after } of pairs) {
    const [was, is] = [ownPowers(before, asked, renames), ownPowers(after, asked)];
    for (const key of new Set([...was.keys(), ...is.keys()])) {
      const [one, other] = [was.get(key), is.get(key)];
      const weight = Math.abs(
        (other ?? 0) / powerOf(after?.limitDbuvPerM) - (one ?? 0) / powerOf(before?.limitDbuvPerM) || 0,
      );
      const held = best.get(key);
      if (held && held.weight >= weight) continue;
      const [beforeDbuvPerM, afterDbuvPerM] = [levelOf(one), levelOf(other)];
      if (beforeDbuvPerM === null && afterDbuvPerM === null) continue;
      const isBoth = beforeDbuvPerM !== null && afterDbuvPerM !== null;
      const changeDb = isBoth ? afterDbuvPerM - beforeDbuvPerM : null;
      const name = key.slice(key.indexOf(' ') + 1);
      best.set(key, { frequencyHz, detector, name, beforeDbuvPerM, afterDbuvPerM, changeDb, weight });
    }
  }
  return best;
}

/** null for next to nothing, too: dB from there on would say how well a sum cancels. */
function levelOf(power = 0): number | null {
  const levelDbuvPerM = 10 * Math.log10(power);
  return isNothing(levelDbuvPerM) ? null : levelDbuvPerM;
}

function ownPowers(
  point: ResultPoint | undefined,
  asked: ReadonlySet<string>,
  renames?: Renames,
): ReadonlyMap<string, number> {
  const powers = new Map<string, number>();
  const add = (key: string, levelDbuvPerM: number) => {
    if (asked.has(key)) powers.set(key, (powers.get(key) ?? 0) + powerOf(levelDbuvPerM));
  };
  for (const { kind, name, levelDbuvPerM, viaDbuvPerM } of point?.contributors ?? []) {
    add(keyOf(kind, kind === 'net' ? (renames?.get(name) ?? name) : name), levelDbuvPerM);
    if (kind === 'cable') continue;
    for (const [path, viaDb] of Object.entries(viaDbuvPerM)) add(keyOf('cable', path), viaDb);
  }
  return powers;
}

/** Order of changes that nothing else orders: what makes margins incomparable first, then what is said of the whole board. */
const KINDS: readonly ChangeKind[] = [
  'setup',
  'limit',
  'structure',
  'program',
  'board',
  'stackup',
  'outline',
  'plane',
  'cable',
  'loop',
  'waveform',
  'drive',
  'load',
  'trace',
  'net',
];
const ABOUT_THE_RUN: ReadonlySet<ChangeKind> = new Set(['setup', 'limit', 'structure', 'program']);

/** Changes with what they did, strongest first, and the way from a line to them. */
export function weighChanges(
  drafts: readonly Draft[],
  pairs: readonly LinePair[],
  renames: Renames,
): { changes: Change[]; causesOf: (line: Omit<LineChange, 'causes'>) => number[] } {
  const asked = new Set(drafts.flatMap(subjectsOf));
  const own = asked.size === 0 ? new Map<string, OwnChange>() : ownChanges(pairs, asked, renames);
  // A change of the whole board can have done all of what any line or contributor did.
  const most = [...[...own.values()].map(({ weight }) => weight), ...pairs.map(totalWeight)].reduce(
    (held, weight) => Math.max(held, weight),
    0,
  );
  const weighed = drafts.map((each) => {
    const strongest = subjectsOf(each).flatMap((key) => (own.has(key) ? [{ key, ...own.get(key)! }] : []));
    const found = strongest.reduce<(typeof strongest)[number] | undefined>(
      (held, next) => (held === undefined || next.weight > held.weight ? next : held),
      undefined,
    );
    return { each, found, weight: each.isWide && !found ? most : (found?.weight ?? 0) };
  });
  const isAlone = lonelyFinder(weighed);
  weighed.sort(
    (one, other) =>
      Number(ABOUT_THE_RUN.has(other.each.kind)) - Number(ABOUT_THE_RUN.has(one.each.kind)) ||
      other.weight - one.weight ||
      KINDS.indexOf(one.each.kind) - KINDS.indexOf(other.each.kind) ||
      (one.each.text < other.each.text ? -1 : 1),
  );
  const changes = weighed.map(({ each, found }): Change => {
    const { kind, nets, loops, cables, text } = each;
    return { kind, nets, loops, cables, text, effect: found ? effectOf(found, isAlone(found.key)) : null };
  });
  return { changes, causesOf: causeFinder(weighed.map(({ each }) => each)) };
}

/** Is the level of a net, loop or cable changed by one change only? A cable's level follows from all that drives it. */
function lonelyFinder(
  weighed: readonly { each: Draft; found: { key: string } | undefined }[],
): (key: string) => boolean {
  const wide = weighed.filter(({ each }) => each.isWide).length;
  const all = weighed.filter(({ each, found }) => each.isWide || found).length;
  const narrow = new Map<string, number>();
  for (const { each } of weighed) {
    if (each.isWide) continue;
    for (const key of subjectsOf(each)) narrow.set(key, (narrow.get(key) ?? 0) + 1);
  }
  return (key) => (key.startsWith('cable ') ? all : wide + (narrow.get(key) ?? 0)) === 1;
}

function effectOf(found: OwnChange, isAlone: boolean): ChangeEffect {
  const { frequencyHz, detector, name, beforeDbuvPerM, afterDbuvPerM, changeDb } = found;
  return { frequencyHz, detector, name, beforeDbuvPerM, afterDbuvPerM, changeDb, isAlone };
}

function totalWeight({ before, after }: LinePair): number {
  const excess = (point: ResultPoint | undefined) => (point ? powerOf(-point.marginDb) : 0);
  return Math.abs(excess(after) - excess(before));
}

/** Which changes act on what made a line change: those of its listed contributors and paths, and those of everything. */
function causeFinder(drafts: readonly Draft[]): (line: Omit<LineChange, 'causes'>) => number[] {
  const bySubject = new Map<string, number[]>();
  const wide: number[] = [];
  for (const [index, each] of drafts.entries()) {
    if (each.isWide || each.kind === 'limit') wide.push(index);
    for (const key of subjectsOf(each)) bySubject.set(key, [...(bySubject.get(key) ?? []), index]);
  }
  return ({ status, contributors, limitChangeDb }) => {
    if (status === 'unchanged') return [];
    const isLimit = (index: number) => drafts[index]!.kind === 'limit';
    const found = new Set(wide.filter((index) => !isLimit(index) || limitChangeDb !== 0));
    for (const { kind, name, path } of contributors) {
      for (const key of [keyOf(kind, name), keyOf('cable', path)]) {
        for (const index of bySubject.get(key) ?? []) found.add(index);
      }
    }
    return [...found].sort((one, other) => one - other);
  };
}
