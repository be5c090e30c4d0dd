import type { Caveat } from '../errors.ts';

export interface CaveatGroup {
  readonly code: string;
  /** Of the first caveat in the group. */
  readonly message: string;
  readonly count: number;
  /** Named places, each once, in order of appearance. */
  readonly where: readonly string[];
  /** Hull of the ranges; 0 for both: every frequency. */
  readonly fromHz: number;
  readonly toHz: number;
}

/** Gathers caveats that share a key, in order of first appearance. */
export function groupCaveats(caveats: readonly Caveat[], keyOf: (caveat: Caveat) => string): CaveatGroup[] {
  const groups = new Map<string, Caveat[]>();
  for (const caveat of caveats) {
    const key = keyOf(caveat);
    const list = groups.get(key);
    if (list) list.push(caveat);
    else groups.set(key, [caveat]);
  }
  return [...groups.values()].map((list) => {
    const first = list[0]!;
    const isEverywhere = list.some(({ fromHz, toHz }) => fromHz === 0 && toHz === 0);
    return {
      code: first.code,
      message: first.message,
      count: list.length,
      where: [...new Set(list.map(({ where }) => where).filter((where) => where !== ''))],
      fromHz: isEverywhere ? 0 : Math.min(...list.map(({ fromHz }) => fromHz)),
      toHz: isEverywhere ? 0 : Math.max(...list.map(({ toHz }) => toHz)),
    };
  });
}

/** One group a kind of caveat: compact. */
export const byCode = (caveat: Caveat): string => caveat.code;

/** One group a message and range: nothing that a caveat says is lost. */
export const byMessage = (caveat: Caveat): string =>
  JSON.stringify([caveat.code, caveat.message, caveat.fromHz, caveat.toHz]);
