import type { Net } from '../../app/board/board.ts';

/** Names in the order people count: D2 before D10. */
const collator = new Intl.Collator('en', { numeric: true, sensitivity: 'base' });

/** Nets whose name has all words of the query in it, in the order of their names; an exact name comes first. */
export function searchNets(nets: readonly Net[], query: string): readonly Net[] {
  const words = query.toLowerCase().split(/\s+/).filter(Boolean);
  const exact = query.trim().toLowerCase();
  return nets
    .filter(({ name }) => words.every((word) => name.toLowerCase().includes(word)))
    .sort(
      (one, other) =>
        Number(other.name.toLowerCase() === exact) - Number(one.name.toLowerCase() === exact) ||
        collator.compare(one.name, other.name),
    );
}

/** The name after (or before) the present one, round and round; from elsewhere the first (or last). */
export function cycled(names: readonly string[], present: string | null, by: 1 | -1): string | undefined {
  const at = present === null ? -1 : names.indexOf(present);
  if (at < 0) return by === 1 ? names[0] : names.at(-1);
  return names[(at + by + names.length) % names.length];
}
