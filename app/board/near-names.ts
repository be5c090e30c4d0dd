import { describe } from '../errors.ts';

/** Names told in a message. */
const MAX_TOLD = 5;
/** Names longer than this are compared by their beginning: the distance costs length². */
const COMPARED_LENGTH = 64;

/** `a net (nearest: "CLK_A", "CLK_B")`, or the names there are when none is near. */
export function oneOf(what: string, wanted: string, names: readonly string[]): string {
  if (names.length === 0) return `${what} (there is none)`;
  const near = nearestNames(wanted, names);
  if (near.length > 0) return `${what} (nearest: ${near.map(describe).join(', ')})`;
  const told = names.slice(0, MAX_TOLD).map(describe).join(', ');
  return `${what} (known: ${told}${names.length > MAX_TOLD ? `, … ${names.length} in all` : ''})`;
}

/**
 * Names a user may have meant, best first: same but for case, then one containing the other, then few edits apart
 * (at most half of the wanted name's length, at least 1). `*` counts as nothing typed.
 */
function nearestNames(wanted: string, names: readonly string[]): string[] {
  const target = folded(wanted.replaceAll('*', ''));
  if (target === '') return [];
  const mostEdits = Math.max(1, Math.floor(target.length / 2));
  const scored: { name: string; score: number }[] = [];
  for (const name of names) {
    const candidate = folded(name);
    const score = scoreOf(target, candidate, mostEdits);
    if (score <= mostEdits) scored.push({ name, score });
  }
  scored.sort((a, b) => a.score - b.score);
  return scored.slice(0, MAX_TOLD).map(({ name }) => name);
}

const folded = (text: string): string => text.toLowerCase().slice(0, COMPARED_LENGTH);

function scoreOf(target: string, candidate: string, mostEdits: number): number {
  if (candidate === target) return 0;
  const isPart =
    target.length >= 2 && candidate.length >= 2 && (candidate.includes(target) || target.includes(candidate));
  if (isPart) return 0.5;
  if (Math.abs(candidate.length - target.length) > mostEdits) return Infinity;
  return editDistance(target, candidate);
}

/** Edits from one text to the other: put in, left out, replaced, two neighbours swapped (optimal string alignment). */
function editDistance(a: string, b: string): number {
  let beforePrevious: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const replaced = previous[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      const isSwapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      const swapped = isSwapped ? beforePrevious[j - 2]! + 1 : Infinity;
      row.push(Math.min(replaced, previous[j]! + 1, row[j - 1]! + 1, swapped));
    }
    beforePrevious = previous;
    previous = row;
  }
  return previous[b.length]!;
}
