/** A complex number where speed does not matter; hot loops keep re and im in typed arrays. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}
