/**
 * Order in which to eliminate the unknowns of a symmetric pattern: always one with the fewest neighbours left, which then
 * become neighbours of each other. On a tree this makes no fill at all. `pairs` holds index pairs (both orders not needed).
 * Source: D. J. Rose, A graph-theoretic study of the numerical solution of sparse positive definite systems, 1972
 * (minimum degree).
 */
export function eliminationOrder(count: number, pairs: Iterable<readonly [number, number]>): Int32Array {
  const neighbours = Array.from({ length: count }, () => new Set<number>());
  for (const [a, b] of pairs) {
    if (a === b) continue;
    neighbours[a]!.add(b);
    neighbours[b]!.add(a);
  }
  // Buckets by degree; entries may be out of date and are then skipped.
  const buckets: number[][] = [];
  const put = (node: number) => {
    const degree = neighbours[node]!.size;
    while (buckets.length <= degree) buckets.push([]);
    buckets[degree]!.push(node);
  };
  for (let node = count - 1; node >= 0; node--) put(node);
  const order = new Int32Array(count);
  const isDone = new Uint8Array(count);
  let done = 0;
  let degree = 0;
  while (done < count) {
    const node = buckets[degree]?.pop();
    if (node === undefined) {
      degree++;
      continue;
    }
    if (isDone[node] || neighbours[node]!.size !== degree) continue;
    order[done++] = node;
    isDone[node] = 1;
    const left = [...neighbours[node]!];
    for (const a of left) {
      const of = neighbours[a]!;
      of.delete(node);
      for (const b of left) if (b !== a) of.add(b);
    }
    for (const a of left) put(a);
    neighbours[node]!.clear();
    degree = Math.max(0, degree - 1);
  }
  return order;
}
