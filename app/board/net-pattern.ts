/**
 * Names a pattern stands for, in the order of `names`; `*` is any run of characters (also none), every other character
 * is itself. A name that equals the pattern (it may hold a `*` of its own) is the only match.
 * Linear in name and pattern by greedy matching: no regular expression, so no pattern can make it slow.
 */
export function matchNames(pattern: string, names: readonly string[]): string[] {
  if (names.includes(pattern)) return [pattern];
  if (!pattern.includes('*')) return [];
  return names.filter((name) => matches(pattern, name));
}

function matches(pattern: string, name: string): boolean {
  const pieces = pattern.split('*');
  const head = pieces[0]!;
  const tail = pieces.at(-1)!;
  if (name.length < head.length + tail.length || !name.startsWith(head) || !name.endsWith(tail)) return false;
  const end = name.length - tail.length;
  let at = head.length;
  for (const piece of pieces.slice(1, -1)) {
    const found = name.indexOf(piece, at);
    if (found < 0 || found + piece.length > end) return false;
    at = found + piece.length;
  }
  return true;
}
