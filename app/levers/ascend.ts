/** Value, first and second derivative of a function. */
export type Jet = Float64Array;

/** The place is found to this part of the interval: the value there is right to its square. */
const PLACE_TOLERANCE = 1e-5;
const MOST_STEPS = 40;

/**
 * Climbs from a place between `low` and `high` to the next maximum, or to the end that the function rises to: Newton's steps on
 * the derivative, halving where they leave what is left of the interval. `jetAt` fills value and derivatives, and holds
 * those of the returned place at the end.
 */
export function ascend(
  jetAt: (at: number, out: Jet) => void,
  low: number,
  start: number,
  high: number,
  jet: Jet,
): number {
  const tolerance = PLACE_TOLERANCE * (high - low);
  let from = low;
  let to = high;
  let x = start;
  jetAt(x, jet);
  for (let i = 0; i < MOST_STEPS && jet[1] !== 0; i++) {
    const isRising = jet[1]! > 0;
    if (isRising) from = x;
    else to = x;
    const newton = jet[2]! < 0 ? x - jet[1]! / jet[2]! : isRising ? Infinity : -Infinity;
    const isInside = newton > from && newton < to;
    let next = isInside ? newton : (from + to) / 2;
    // Close to an end that it still rises to: the end itself.
    if (!isInside && to - from < 4 * tolerance) next = isRising ? to : from;
    const step = next - x;
    x = next;
    jetAt(x, jet);
    if (Math.abs(step) < tolerance) break;
  }
  return x;
}
