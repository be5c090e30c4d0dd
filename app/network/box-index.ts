/** Corners of a box. */
export interface Box {
  readonly lowX: number;
  readonly lowY: number;
  readonly highX: number;
  readonly highY: number;
}

/** Boxes in a leaf. */
const LEAF_SIZE = 8;

/**
 * Boxes in a tree, so that those near a place are found without looking at all: halved at the median of the longer side,
 * which neither outliers nor crowded corners upset.
 */
export class BoxIndex {
  readonly #boxes: readonly Box[];
  readonly #items: Int32Array;
  /** Bounds of every tree node (low x, low y, high x, high y), root 0, children 2i + 1 and 2i + 2. */
  readonly #bounds: number[] = [];

  constructor(boxes: readonly Box[]) {
    this.#boxes = boxes;
    this.#items = Int32Array.from(boxes, (_, i) => i);
    if (boxes.length > 0) this.#build(0, 0, boxes.length);
  }

  /** Calls `visit` with the number of every box that meets this one (touching counts). */
  meeting(box: Box, visit: (index: number) => void): void {
    if (this.#boxes.length > 0) this.#visit(0, 0, this.#boxes.length, box, visit);
  }

  #build(node: number, from: number, to: number): void {
    let [lowX, lowY, highX, highY] = [Infinity, Infinity, -Infinity, -Infinity];
    for (let i = from; i < to; i++) {
      const box = this.#boxes[this.#items[i]!]!;
      lowX = Math.min(lowX, box.lowX);
      lowY = Math.min(lowY, box.lowY);
      highX = Math.max(highX, box.highX);
      highY = Math.max(highY, box.highY);
    }
    this.#bounds[4 * node] = lowX;
    this.#bounds[4 * node + 1] = lowY;
    this.#bounds[4 * node + 2] = highX;
    this.#bounds[4 * node + 3] = highY;
    if (to - from <= LEAF_SIZE) return;
    const isWide = highX - lowX >= highY - lowY;
    const centre = (i: number) => {
      const box = this.#boxes[i]!;
      return isWide ? box.lowX + box.highX : box.lowY + box.highY;
    };
    this.#items.subarray(from, to).sort((one, other) => centre(one) - centre(other) || one - other);
    const middle = (from + to) >> 1;
    this.#build(2 * node + 1, from, middle);
    this.#build(2 * node + 2, middle, to);
  }

  #visit(node: number, from: number, to: number, box: Box, visit: (index: number) => void): void {
    const bounds = this.#bounds;
    if (bounds[4 * node]! > box.highX || bounds[4 * node + 2]! < box.lowX) return;
    if (bounds[4 * node + 1]! > box.highY || bounds[4 * node + 3]! < box.lowY) return;
    if (to - from > LEAF_SIZE) {
      const middle = (from + to) >> 1;
      this.#visit(2 * node + 1, from, middle, box, visit);
      this.#visit(2 * node + 2, middle, to, box, visit);
      return;
    }
    for (let i = from; i < to; i++) {
      const index = this.#items[i]!;
      const own = this.#boxes[index]!;
      if (own.lowX > box.highX || own.highX < box.lowX || own.lowY > box.highY || own.highY < box.lowY) continue;
      visit(index);
    }
  }
}
