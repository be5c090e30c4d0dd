import type { ScreenPoint } from './view.ts';

/** Where the pointer is in the picture. Outside React: it changes with every movement, and only the footer shows it. */
export class PlaceUnderPointer {
  #at: ScreenPoint | null = null;
  readonly #listeners = new Set<() => void>();

  readonly listen = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  readonly at = (): ScreenPoint | null => this.#at;

  readonly set = (at: ScreenPoint | null): void => {
    this.#at = at;
    for (const listener of this.#listeners) listener();
  };
}
