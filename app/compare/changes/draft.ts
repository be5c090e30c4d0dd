import type { Change, ChangeKind } from '../types.ts';

/** A change before anybody looked what it did to the levels. */
export interface Draft extends Omit<Change, 'effect'> {
  /** It may change the level of every net, loop and cable. */
  readonly isWide: boolean;
  /** Margins before and after it are not comparable. */
  readonly isBreaking?: true;
}

interface Subject {
  readonly nets?: readonly string[];
  readonly loops?: readonly string[];
  readonly cables?: readonly string[];
}

export const draft = (kind: ChangeKind, text: string, { nets = [], loops = [], cables = [] }: Subject = {}): Draft => ({
  kind,
  nets,
  loops,
  cables,
  text,
  isWide: false,
});

export const wideDraft = (kind: ChangeKind, text: string, subject?: Subject): Draft => ({
  ...draft(kind, text, subject),
  isWide: true,
});

/** Pairs two lists by key: items of one key in their order, those without a partner with `undefined`. */
export function pairUp<T>(
  before: readonly T[] | undefined,
  after: readonly T[] | undefined,
  keyOf: (item: T) => string,
): { one: T | undefined; other: T | undefined }[] {
  const waiting = new Map<string, T[]>();
  for (const item of before ?? []) {
    const key = keyOf(item);
    const list = waiting.get(key);
    if (list) list.push(item);
    else waiting.set(key, [item]);
  }
  const pairs: { one: T | undefined; other: T | undefined }[] = (after ?? []).map((other) => ({
    one: waiting.get(keyOf(other))?.shift(),
    other,
  }));
  for (const list of waiting.values()) for (const one of list) pairs.push({ one, other: undefined });
  return pairs;
}

/** Same plain data? Keys in any order; an absent key is the same as an undefined one. */
export function sameData(one: unknown, other: unknown): boolean {
  if (Object.is(one, other)) return true;
  if (typeof one !== 'object' || typeof other !== 'object' || one === null || other === null) return false;
  if (Array.isArray(one) || Array.isArray(other)) {
    if (!Array.isArray(one) || !Array.isArray(other) || one.length !== other.length) return false;
    return one.every((item, i) => sameData(item, other[i]));
  }
  const [left, right] = [one as Record<string, unknown>, other as Record<string, unknown>];
  const keys = new Set([...Object.keys(left), ...Object.keys(right)]);
  return [...keys].every((key) => sameData(left[key], right[key]));
}
