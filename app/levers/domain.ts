import type { Amplitudes } from './kept-field.ts';

/** How one clock domain (or stated cable) excites the units of a line. */
export interface Domain {
  readonly name: string;
  readonly amplitudes: Amplitudes;
  /** Numbers of the sources it has lines on. */
  readonly sources: readonly number[];
}

/** Relative to their size, amplitudes this close are the same. */
const SAME_AMPLITUDE = 1e-10;

/** True when both excite everything alike, to the last digit. */
export const isEqual = (one: readonly Domain[], other: readonly Domain[]): boolean =>
  one.length === other.length &&
  other.every(({ name, amplitudes, sources }, d) => {
    const known = one[d]!;
    return (
      known.name === name &&
      known.amplitudes.every((value, i) => value === amplitudes[i]) &&
      known.sources.length === sources.length &&
      known.sources.every((source, i) => source === sources[i])
    );
  });

/** True when the pattern is the same: every domain is the other's times a factor, of one magnitude for all. */
export function isSameShape(one: readonly Domain[], other: readonly Domain[]): boolean {
  if (one.length !== other.length) return false;
  let first: number | null = null;
  for (const [d, domain] of other.entries()) {
    if (domain.name !== one[d]!.name) return false;
    const factor = commonFactor(one[d]!.amplitudes, domain.amplitudes);
    if (factor === null) return false;
    first ??= factor;
    if (Math.abs(factor - first) > SAME_AMPLITUDE * first) return false;
  }
  return true;
}

/** |s| with b = s·a; null when there is none, or nothing to compare. */
function commonFactor(a: Amplitudes, b: Amplitudes): number | null {
  let size = 0;
  let re = 0;
  let im = 0;
  let sizeOfB = 0;
  for (let i = 0; i < a.length; i += 2) {
    size += a[i]! ** 2 + a[i + 1]! ** 2;
    sizeOfB += b[i]! ** 2 + b[i + 1]! ** 2;
    re += a[i]! * b[i]! + a[i + 1]! * b[i + 1]!;
    im += a[i]! * b[i + 1]! - a[i + 1]! * b[i]!;
  }
  if (size === 0 || sizeOfB === 0) return null;
  re /= size;
  im /= size;
  let residual = 0;
  for (let i = 0; i < a.length; i += 2) {
    residual += (b[i]! - re * a[i]! + im * a[i + 1]!) ** 2 + (b[i + 1]! - re * a[i + 1]! - im * a[i]!) ** 2;
  }
  return residual <= SAME_AMPLITUDE ** 2 * sizeOfB ? Math.hypot(re, im) : null;
}
