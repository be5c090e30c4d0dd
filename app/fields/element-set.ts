/** Current elements in site axes whose places do not change with frequency; only their currents do. */
export interface ElementSet {
  readonly count: number;
  /** x, y, z of each element's middle, m. */
  readonly positionsM: Float64Array;
  /** Direction times length (quadrature weight included), m: the element's moment is its current times this. */
  readonly vectorsM: Float64Array;
}

/** Elements with their currents (peak phasors, re then im, A) at one frequency. */
export interface Radiator {
  readonly elements: ElementSet;
  readonly currentsA: Float64Array;
}

/** Collects elements one by one. */
export class ElementCollector {
  readonly #positionsM: number[] = [];
  readonly #vectorsM: number[] = [];

  /** Adds an element and returns its index. */
  add(positionM: readonly [number, number, number], vectorM: readonly [number, number, number]): number {
    this.#positionsM.push(...positionM);
    this.#vectorsM.push(...vectorM);
    return this.#positionsM.length / 3 - 1;
  }

  finish(): ElementSet {
    return {
      count: this.#positionsM.length / 3,
      positionsM: Float64Array.from(this.#positionsM),
      vectorsM: Float64Array.from(this.#vectorsM),
    };
  }
}
