import { inputError } from '../errors.ts';

/** A line at the receiver's input: its field as rms of a sine, V/m. */
export interface ReceivedLine {
  readonly frequencyHz: number;
  readonly fieldRmsVPerM: number;
}

/** Readings in V/m rms of a sine that reads the same: receivers are calibrated so on every detector. */
export interface BandwidthReading {
  /** Square root of the sum of squares. */
  readonly averageRms: number;
  /** Linear sum. */
  readonly peakRms: number;
  /** Lines inside the bandwidth. */
  readonly count: number;
}

/** Upper end of each band, Hz, and its 6 dB bandwidth, Hz (at a shared edge the lower band's). */
const BANDS = [
  [150e3, 200],
  [30e6, 9e3],
  [1e9, 120e3],
] as const;
const LOWEST_HZ = 9e3;
const BANDWIDTH_ABOVE_1_GHZ_HZ = 1e6;
/** A harmonic m·f0 is rounded, a band edge is not. */
const SAME_FREQUENCY = 1e-9;

/**
 * Measuring bandwidth at a frequency, Hz: 200 Hz in band A (9–150 kHz), 9 kHz in B (to 30 MHz), 120 kHz in C and D (30 MHz to
 * 1 GHz, both included), 1 MHz above. 6 dB bandwidths, above 1 GHz the impulse bandwidth.
 * Throws `input` below 9 kHz. Source: CISPR 16-1-1, as printed in receiver manuals.
 */
export function bandwidthHz(frequencyHz: number): number {
  if (!(frequencyHz >= LOWEST_HZ)) throw inputError('frequencyHz', 'at least 9 kHz, where band A begins', frequencyHz);
  // 30 MHz itself belongs to the radiated range, so to the band above it; 1 GHz is still measured with 120 kHz.
  if (Math.abs(frequencyHz - 30e6) <= 30e6 * SAME_FREQUENCY) return BANDS[2][1];
  const band = BANDS.find(([upToHz]) => frequencyHz <= upToHz * (1 + SAME_FREQUENCY));
  return band?.[1] ?? BANDWIDTH_ABOVE_1_GHZ_HZ;
}

/**
 * What a receiver tuned to `centreHz` makes of the lines within half its bandwidth on either side (each passes in full).
 *
 *   average: √Σ E²      peak and quasi-peak: Σ E
 *
 * One line alone reads the same on every detector. Of several, the sums are bounds: the average of an envelope never
 * exceeds its rms value (lines more than 10 Hz apart, so that the meter of 100 ms does not follow the beat), its peak never
 * the linear sum, and quasi-peak lies between; a result built on several lines says so (caveat `several-lines-in-bandwidth`). Empty
 * bandwidth: zeros.
 */
export function combineInBandwidth(lines: readonly ReceivedLine[], centreHz: number): BandwidthReading {
  const halfHz = bandwidthHz(centreHz) / 2;
  let power = 0;
  let peakRms = 0;
  let count = 0;
  for (const { frequencyHz, fieldRmsVPerM } of lines) {
    if (Math.abs(frequencyHz - centreHz) > halfHz) continue;
    power += fieldRmsVPerM * fieldRmsVPerM;
    peakRms += Math.abs(fieldRmsVPerM);
    count++;
  }
  // One line: exactly its own value, on every detector.
  return { averageRms: count === 1 ? peakRms : Math.sqrt(power), peakRms, count };
}
