/** Numbers before the current one that it may repeat. */
const WINDOW = 12;

/** How many guesses there are. */
export const GUESSES = WINDOW + 2;

/** What a number may repeat: the one before in its column, the difference of the last two, one of the last. */
export class NumberGuesses {
  readonly #last: number[] = [];
  readonly #window = new Float64Array(WINDOW);
  #seen = 0;

  /** Guesses count from 0; those not there yet are NaN, which no number of JSON is. */
  at(guess: number, column: number): number {
    if (guess === 0) return this.#last[column] ?? Number.NaN;
    if (guess === 1) return this.#back(1) - this.#back(2);
    return this.#back(guess - 1);
  }

  #back(steps: number): number {
    return steps > this.#seen ? Number.NaN : this.#window[(this.#seen - steps) % WINDOW]!;
  }

  add(number: number, column: number): void {
    this.#window[this.#seen++ % WINDOW] = number;
    this.#last[column] = number;
  }
}
