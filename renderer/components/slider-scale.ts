/** How a slider's way is divided: evenly in the value, or in its logarithm (from above 0). */
export interface SliderRange {
  readonly min: number;
  readonly max: number;
  readonly scale: 'linear' | 'logarithmic';
}

/** Steps of the whole way: one press of an arrow key is one of them. */
export const SLIDER_STEPS = 100;

/** Values that a slider gives are rounded to this many digits of its step: "1.6 ns", not "1.5848932 ns". */
const STEP_DIGITS = 2;

/** Where a value stands, 0 … `SLIDER_STEPS`; values beyond an end stand at it. */
export function positionOf(value: number, { min, max, scale }: SliderRange): number {
  const inside = Math.min(Math.max(value, min), max);
  const part = scale === 'linear' ? (inside - min) / (max - min) : Math.log(inside / min) / Math.log(max / min);
  return SLIDER_STEPS * part;
}

/** The value at a position, rounded to what a step of the slider can tell apart; the ends exactly. */
export function valueAt(position: number, { min, max, scale }: SliderRange): number {
  const part = Math.min(Math.max(position / SLIDER_STEPS, 0), 1);
  if (part === 0) return min;
  if (part === 1) return max;
  if (scale === 'linear') {
    const grain = 10 ** Math.floor(Math.log10((max - min) / SLIDER_STEPS));
    // Through the decimal text: 3.3e-11, not a product that is off by a rounding.
    return Number((Math.round((min + (max - min) * part) / grain) * grain).toPrecision(12));
  }
  return Number((min * (max / min) ** part).toPrecision(STEP_DIGITS + 1));
}
