/**
 * Order in which the nodes of a net are eliminated (star–mesh transformation), with every edge that appears on the way:
 * worked out once per net, used at every frequency. Nodes with the fewest neighbours go first, so a tree costs O(N).
 */
export interface EliminationPlan {
  readonly edgeCount: number;
  readonly steps: readonly EliminationStep[];
}

export interface EliminationStep {
  readonly node: number;
  readonly neighbours: readonly number[];
  /** Edge to each neighbour. */
  readonly edges: readonly number[];
  /** Edge between neighbours i < j, in the order (0,1), (0,2) … (1,2) …. */
  readonly meshEdges: readonly number[];
}

/** `edges` are node pairs (parallel ones allowed: they share a plan edge); `kept` nodes are never eliminated. */
export function eliminationPlan(
  nodeCount: number,
  pairs: readonly (readonly [number, number])[],
  kept: ReadonlySet<number>,
): { plan: EliminationPlan; edgeOfPair: Int32Array } {
  const neighbours: Map<number, number>[] = Array.from({ length: nodeCount }, () => new Map());
  let edgeCount = 0;
  const edgeBetween = (a: number, b: number): number => {
    const known = neighbours[a]!.get(b);
    if (known !== undefined) return known;
    neighbours[a]!.set(b, edgeCount);
    neighbours[b]!.set(a, edgeCount);
    return edgeCount++;
  };
  const edgeOfPair = Int32Array.from(pairs, ([a, b]) => (a === b ? -1 : edgeBetween(a, b)));

  const steps: EliminationStep[] = [];
  const isGone = new Uint8Array(nodeCount);
  const byDegree: Set<number>[] = [];
  const put = (node: number) => {
    const degree = neighbours[node]!.size;
    while (byDegree.length <= degree) byDegree.push(new Set());
    byDegree[degree]!.add(node);
  };
  for (let node = 0; node < nodeCount; node++) if (!kept.has(node)) put(node);
  for (let left = nodeCount - kept.size; left > 0; left--) {
    const node = byDegree.find((set) => set.size > 0)!.values().next().value!;
    byDegree[neighbours[node]!.size]!.delete(node);
    isGone[node] = 1;
    const around = [...neighbours[node]!.keys()].sort((one, other) => one - other);
    const edges = around.map((other) => neighbours[node]!.get(other)!);
    for (const other of around) if (!kept.has(other)) byDegree[neighbours[other]!.size]!.delete(other);
    for (const other of around) neighbours[other]!.delete(node);
    const meshEdges: number[] = [];
    for (let i = 0; i < around.length; i++) {
      for (let j = i + 1; j < around.length; j++) meshEdges.push(edgeBetween(around[i]!, around[j]!));
    }
    for (const other of around) if (!kept.has(other)) put(other);
    steps.push({ node, neighbours: around, edges, meshEdges });
  }
  return { plan: { edgeCount, steps }, edgeOfPair };
}
