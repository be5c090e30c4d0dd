/** Disjoint sets of numbers 0, 1, 2 …; the smallest member stands for its set. */
export class UnionFind {
  readonly #parent: number[] = [];

  /** Adds a number as a set of its own; returns it. */
  add(): number {
    this.#parent.push(this.#parent.length);
    return this.#parent.length - 1;
  }

  find(member: number): number {
    const parent = this.#parent;
    let root = member;
    while (parent[root] !== root) {
      parent[root] = parent[parent[root]!]!;
      root = parent[root]!;
    }
    return root;
  }

  join(one: number, other: number): void {
    const a = this.find(one);
    const b = this.find(other);
    this.#parent[Math.max(a, b)] = Math.min(a, b);
  }
}
