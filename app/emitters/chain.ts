import type { PointM } from '../board/board.ts';
import { inputError } from '../errors.ts';
import type { NetGraph } from '../network/net-graph.ts';

/** One section of an unbranched net, in order from the driver; `from` and `to` are fractions of the whole length. */
export interface ChainLink {
  readonly section: number;
  /** The section's node B is nearer the driver. */
  readonly isReversed: boolean;
  readonly from: number;
  readonly to: number;
  readonly lengthM: number;
}

/** An unbranched net from its driver to its far end. */
export class Chain {
  readonly links: readonly ChainLink[];
  readonly #fractions: ReadonlyMap<number, number>;

  constructor(links: readonly ChainLink[], fractions: ReadonlyMap<number, number>) {
    this.links = links;
    this.#fractions = fractions;
  }

  /** Fraction of the whole length at a place of a link, `atM` from its section's node A. */
  fractionAt(link: ChainLink, atM: number): number {
    const part = link.isReversed ? 1 - atM / link.lengthM : atM / link.lengthM;
    return link.from + part * (link.to - link.from);
  }

  /** Place on a link's section, m from its node A, at a fraction of the whole length. */
  placeOn(link: ChainLink, fraction: number): number {
    const part = (fraction - link.from) / (link.to - link.from);
    return link.lengthM * (link.isReversed ? 1 - part : part);
  }

  fractionOfNode(node: number): number {
    return this.#fractions.get(node) ?? 0;
  }
}

/** Orders an unbranched graph from a node; a branch, loop or via is refused: its return cannot be told apart. */
export function chainFrom(graph: NetGraph, startNode: number, net: string): Chain {
  const at = graph.nodes.map(() => [] as number[]);
  for (const [i, { nodeA, nodeB }] of graph.segments.entries()) {
    at[nodeA]!.push(i);
    at[nodeB]!.push(i);
  }
  const isChain =
    graph.vias.length === 0 &&
    graph.islands === 1 &&
    at.every((sections) => sections.length <= 2) &&
    at[startNode]?.length === 1;
  if (!isChain) {
    throw inputError(
      `net ${net}`,
      'one unbranched trace on one layer from its driver, since its return is a named path',
      'a net with branches, vias, separate parts, or a driver that is not at its end',
    );
  }
  const totalM = graph.segments.reduce((sum, { lengthM }) => sum + lengthM, 0);
  const links: ChainLink[] = [];
  const fractions = new Map<number, number>([[startNode, 0]]);
  let node = startNode;
  let doneM = 0;
  let previous = -1;
  for (;;) {
    const section = at[node]!.find((i) => i !== previous);
    if (section === undefined) break;
    const { nodeA, nodeB, lengthM } = graph.segments[section]!;
    const isReversed = nodeA !== node;
    links.push({ section, isReversed, from: doneM / totalM, to: (doneM + lengthM) / totalM, lengthM });
    doneM += lengthM;
    node = isReversed ? nodeA : nodeB;
    fractions.set(node, doneM / totalM);
    previous = section;
    if (node === startNode) break;
  }
  return new Chain(links, fractions);
}

/** A polyline addressed by fractions of its length. */
export class PolylineM {
  readonly #pointsM: readonly PointM[];
  /** Fraction of the length at each point. */
  readonly #fractions: readonly number[];

  constructor(pointsM: readonly PointM[]) {
    this.#pointsM = pointsM;
    const lengths = [0];
    for (let i = 1; i < pointsM.length; i++) {
      const [x1, y1] = pointsM[i - 1]!;
      const [x2, y2] = pointsM[i]!;
      lengths.push(lengths[i - 1]! + Math.hypot(x2 - x1, y2 - y1));
    }
    const total = lengths.at(-1)!;
    this.#fractions = lengths.map((length) => (total > 0 ? length / total : 0));
  }

  at(fraction: number): PointM {
    let i = 1;
    while (i < this.#pointsM.length - 1 && this.#fractions[i]! < fraction) i++;
    const from = this.#fractions[i - 1]!;
    const to = this.#fractions[i]!;
    const part = to > from ? (fraction - from) / (to - from) : 0;
    const [x1, y1] = this.#pointsM[i - 1]!;
    const [x2, y2] = this.#pointsM[i]!;
    return [x1 + part * (x2 - x1), y1 + part * (y2 - y1)];
  }

  /** Straight pieces between two fractions, cut at the corners in between. */
  piecesBetween(from: number, to: number): [number, number][] {
    const cuts = [from, ...this.#fractions.filter((f) => f > from + 1e-12 && f < to - 1e-12), to];
    return cuts.slice(1).map((end, i) => [cuts[i]!, end]);
  }
}
