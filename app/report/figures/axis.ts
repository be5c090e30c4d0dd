import { frequencyText } from '../format.ts';

/** Maps a quantity to pixels, linearly or over the logarithm. */
export interface Scale {
  readonly from: number;
  readonly to: number;
  readonly at: (value: number) => number;
}

export function linearScale(from: number, to: number, startPx: number, endPx: number): Scale {
  return { from, to, at: (value) => startPx + ((value - from) / (to - from)) * (endPx - startPx) };
}

export function logScale(from: number, to: number, startPx: number, endPx: number): Scale {
  const span = Math.log(to / from);
  return { from, to, at: (value) => startPx + (Math.log(value / from) / span) * (endPx - startPx) };
}

const LABELLED = [1, 2, 3, 5];

/** Frequencies of grid lines: 1 to 9 of every decade; 1, 2, 3 and 5 carry a label. */
export function frequencyTicks(fromHz: number, toHz: number): { frequencyHz: number; label: string | undefined }[] {
  const ticks = [];
  for (let decade = Math.floor(Math.log10(fromHz) + 1e-9); 10 ** decade <= toHz * 1.000001; decade++) {
    for (let digit = 1; digit <= 9; digit++) {
      const frequencyHz = digit * 10 ** decade;
      if (frequencyHz < fromHz * 0.999999 || frequencyHz > toHz * 1.000001) continue;
      ticks.push({ frequencyHz, label: LABELLED.includes(digit) ? frequencyText(frequencyHz) : undefined });
    }
  }
  return ticks;
}

/** Round steps 1, 2, 5 × 10ⁿ: the smallest that makes at most `most` intervals of the span. */
export function roundStep(span: number, most: number): number {
  const power = 10 ** Math.floor(Math.log10(span / most));
  return [1, 2, 5, 10].map((digit) => digit * power).find((step) => span / step <= most * 1.000001)!;
}

/** Multiples of the step from `from` to `to`. */
export function multiples(from: number, to: number, step: number): number[] {
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => (first + i) * step);
}
