import type { PointM } from '../board/board.ts';
import type { GraphNode } from './net-graph.ts';

/** Points found one by one, then merged into nodes. */
export class NodeMerger {
  readonly #points: { atM: PointM; layerIndex: number; isOnPiece: boolean }[] = [];
  readonly #parent: number[] = [];

  /** `isOnPiece`: the point lies inside a straight piece, so a node it is part of must lie there. */
  add(atM: PointM, layerIndex: number, isOnPiece: boolean): number {
    this.#points.push({ atM, layerIndex, isOnPiece });
    this.#parent.push(this.#points.length - 1);
    return this.#points.length - 1;
  }

  join(one: number, other: number): void {
    this.#parent[this.#find(one)] = this.#find(other);
  }

  #find(point: number): number {
    let root = point;
    while (this.#parent[root] !== root) {
      this.#parent[root] = this.#parent[this.#parent[root]!]!;
      root = this.#parent[root]!;
    }
    return root;
  }

  /** Nodes in order of their first point; each at its first point inside a piece, else at its first point. */
  finish(): { nodes: GraphNode[]; nodeOf: (point: number) => number } {
    const nodeOfRoot = new Map<number, number>();
    const nodes: GraphNode[] = [];
    const isOnPiece: boolean[] = [];
    for (const [i, point] of this.#points.entries()) {
      const root = this.#find(i);
      const known = nodeOfRoot.get(root);
      if (known === undefined) {
        nodeOfRoot.set(root, nodes.length);
        nodes.push({ atM: point.atM, layerIndex: point.layerIndex });
        isOnPiece.push(point.isOnPiece);
      } else if (point.isOnPiece && !isOnPiece[known]) {
        nodes[known] = { atM: point.atM, layerIndex: point.layerIndex };
        isOnPiece[known] = true;
      }
    }
    return { nodes, nodeOf: (point) => nodeOfRoot.get(this.#find(point))! };
  }
}
