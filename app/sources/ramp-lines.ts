import type { Ramp } from './ramps.ts';

/** Orders between two fresh evaluations of sine and cosine: rounding of the recurrence stays near 1e-14. */
const RESEED_ORDERS = 64;

/**
 * Adds Σ Δ_k e^(−j2πm f0 t_k) sinc(m f0 d_k) over ramps of height Δ, centre t and duration d, for the orders
 * m = firstOrder, firstOrder + 1, …, one (re, im) pair each, to `sums`; sinc(x) = sin(πx)/(πx).
 *
 * It is j2πm f0 times the Fourier coefficient of the waveform's derivative pulses, the stable form of the
 * second-derivative impulses: no difference of large numbers for short ramps, and a step (d = 0) is exact.
 */
export function addRampSums(
  sums: Float64Array,
  ramps: readonly Ramp[],
  fundamentalHz: number,
  firstOrder: number,
): void {
  const count = sums.length / 2;
  for (const { delta, midS, durationS } of ramps) {
    const midTurns = midS * fundamentalHz;
    const durationTurns = durationS * fundamentalHz;
    const stepCos = Math.cos(2 * Math.PI * midTurns);
    const stepSin = Math.sin(2 * Math.PI * midTurns);
    const halfCos = Math.cos(Math.PI * durationTurns);
    const halfSin = Math.sin(Math.PI * durationTurns);
    for (let start = 0; start < count; start += RESEED_ORDERS) {
      const order = firstOrder + start;
      // Whole turns are taken out first: the sine of a large angle would lose digits.
      let c = Math.cos(2 * Math.PI * ((order * midTurns) % 1));
      let s = Math.sin(2 * Math.PI * ((order * midTurns) % 1));
      let hc = Math.cos(Math.PI * ((order * durationTurns) % 2));
      let hs = Math.sin(Math.PI * ((order * durationTurns) % 2));
      const end = Math.min(start + RESEED_ORDERS, count);
      for (let i = start; i < end; i++) {
        const height = durationTurns === 0 ? delta : (delta * hs) / (Math.PI * (firstOrder + i) * durationTurns);
        sums[2 * i]! += height * c;
        sums[2 * i + 1]! -= height * s;
        [c, s] = [c * stepCos - s * stepSin, s * stepCos + c * stepSin];
        [hc, hs] = [hc * halfCos - hs * halfSin, hs * halfCos + hc * halfSin];
      }
    }
  }
}
