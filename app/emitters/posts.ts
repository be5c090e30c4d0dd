import type { PointM } from '../board/board.ts';
import type { EndTerm } from './element-currents.ts';

/** Current that leaves a place at one height (board z): what flows out into traces, or into their return. */
export interface Leaving {
  readonly zM: number;
  /** On a plane; else on a trace, which may lie at the same height. */
  readonly isReturn: boolean;
  readonly term: EndTerm;
}

/** A vertical current between two heights at one place; positive current flows up. */
export interface Post {
  readonly atM: PointM;
  readonly lowM: number;
  readonly highM: number;
  readonly terms: readonly EndTerm[];
}

/** Heights closer than this are one level: a tenth of a micrometre, far below any layer. */
const LEVEL_M = 1e-7;

/**
 * Vertical currents at a place from what leaves it at each height (physics 5.2, 5.4). Kirchhoff's law level by level:
 * the current from level l up to l + 1 is minus all that leaves at l and below. One rule serves pins (trace and plane),
 * via barrels, the return's change of plane and the split between two planes; no charge is left over.
 */
export function postsAt(atM: PointM, leaving: readonly Omit<Leaving, 'isReturn'>[]): Post[] {
  const levels = levelsOf(leaving);
  const posts: Post[] = [];
  let below: readonly EndTerm[] = [];
  for (let l = 0; l + 1 < levels.length; l++) {
    below = mergeTerms([...below, ...levels[l]!.terms.map((term) => ({ ...term, factor: -term.factor }))]);
    if (below.length > 0) posts.push({ atM, lowM: levels[l]!.zM, highM: levels[l + 1]!.zM, terms: below });
  }
  return posts;
}

/** What leaves at each level, lowest first. */
export function levelsOf(leaving: readonly Omit<Leaving, 'isReturn'>[]): { zM: number; terms: EndTerm[] }[] {
  const levels: { zM: number; terms: EndTerm[] }[] = [];
  for (const { zM, term } of [...leaving].sort((one, other) => one.zM - other.zM)) {
    const last = levels.at(-1);
    if (last && zM - last.zM < LEVEL_M) last.terms.push(term);
    else levels.push({ zM, terms: [term] });
  }
  return levels;
}

/** Adds up terms of the same section end and drops what cancels. */
export function mergeTerms(terms: readonly EndTerm[]): EndTerm[] {
  const merged = new Map<number, EndTerm>();
  for (const term of terms) {
    const key = 2 * term.section + (term.isAtB ? 1 : 0);
    merged.set(key, { ...term, factor: term.factor + (merged.get(key)?.factor ?? 0) });
  }
  return [...merged.values()].filter(({ factor }) => Math.abs(factor) > 1e-12);
}
