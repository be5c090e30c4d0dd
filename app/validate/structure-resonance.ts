import type { StructureMaximum } from './structure-cases.ts';

/** A peak of the stronger component over frequency. */
export interface Resonance {
  readonly frequencyHz: number;
  /** Peak phasor. */
  readonly fieldVPerM: number;
}

const strongest = ({ horizontalVPerM, verticalVPerM }: StructureMaximum): number =>
  Math.max(horizontalVPerM, verticalVPerM);

/**
 * Peak of a resonance from values at ascending frequencies: near it 1/|E|² is a parabola in frequency (a single pole), laid
 * through the largest value and its neighbours. NaN when the largest value lies at an end.
 */
export function resonanceOf(rows: readonly StructureMaximum[]): Resonance {
  const top = rows.reduce((best, row, i) => (strongest(row) > strongest(rows[best]!) ? i : best), 0);
  if (top === 0 || top === rows.length - 1) return { frequencyHz: Number.NaN, fieldVPerM: Number.NaN };
  const [a, b, c] = rows.slice(top - 1, top + 2) as [StructureMaximum, StructureMaximum, StructureMaximum];
  const y = (row: StructureMaximum): number => strongest(row) ** -2;
  const left = (y(b) - y(a)) / (b.frequencyHz - a.frequencyHz);
  const right = (y(c) - y(b)) / (c.frequencyHz - b.frequencyHz);
  const curvature = (right - left) / (c.frequencyHz - a.frequencyHz);
  // y = y_a + left (f − f_a) + curvature (f − f_a)(f − f_b); y' = 0
  const frequencyHz = (a.frequencyHz + b.frequencyHz - left / curvature) / 2;
  const least =
    y(a) +
    left * (frequencyHz - a.frequencyHz) +
    curvature * (frequencyHz - a.frequencyHz) * (frequencyHz - b.frequencyHz);
  return { frequencyHz, fieldVPerM: least ** -0.5 };
}
