import type { RandomDataWaveform } from '../board/board.ts';
import { discreteFourierTransform } from './discrete-fourier.ts';
import { maximumLengthBits } from './maximum-length.ts';
import { fullRampS } from './ramps.ts';

/**
 * Adds the ramp sums of one period of random data (as `addRampSums` defines them) for consecutive orders m of
 * bitRate/N, with N = sequenceBits:
 *
 *   (high − low) e^(−jπm f0 t_r) [ R_m sinc(m f0 t_r) − F_m sinc(m f0 t_f) ],   f0 = bitRate/N
 *
 * R and F are the discrete Fourier transforms of the trains of rises and falls (1 where one starts, else 0), t_r and
 * t_f the ramps from 0 to 100 %. All ramps sit on the bit grid, so this is exact, at the cost of one transform of
 * length N instead of N/2 terms a line.
 */
export function addDataSums(sums: Float64Array, waveform: RandomDataWaveform, firstOrder: number): void {
  const { sequenceBits, bitRateHz, low, high } = waveform;
  const { rises, falls } = edgeTransforms(sequenceBits);
  const riseTurns = (fullRampS(waveform.rise1090S) * bitRateHz) / sequenceBits;
  const fallTurns = (fullRampS(waveform.fall1090S) * bitRateHz) / sequenceBits;
  for (let i = 0; i < sums.length / 2; i++) {
    const order = firstOrder + i;
    const bin = 2 * (order % sequenceBits);
    const riseShape = (high - low) * sinc(order * riseTurns);
    const fallShape = (high - low) * sinc(order * fallTurns);
    const re = rises[bin]! * riseShape - falls[bin]! * fallShape;
    const im = rises[bin + 1]! * riseShape - falls[bin + 1]! * fallShape;
    const angleRad = -Math.PI * ((order * riseTurns) % 2);
    const [c, s] = [Math.cos(angleRad), Math.sin(angleRad)];
    sums[2 * i]! += re * c - im * s;
    sums[2 * i + 1]! += re * s + im * c;
  }
}

/** sin(πx)/(πx). */
const sinc = (x: number): number => (x === 0 ? 1 : Math.sin(Math.PI * (x % 2)) / (Math.PI * x));

/** Transforms of both trains from one complex transform of rises + j·falls; (re, im) pairs. */
function edgeTransforms(sequenceBits: number): { rises: Float64Array; falls: Float64Array } {
  const bits = maximumLengthBits(sequenceBits);
  const re = new Float64Array(sequenceBits);
  const im = new Float64Array(sequenceBits);
  for (let k = 0; k < sequenceBits; k++) {
    const previous = bits[(k + sequenceBits - 1) % sequenceBits]!;
    if (bits[k]! > previous) re[k] = 1;
    else if (bits[k]! < previous) im[k] = 1;
  }
  discreteFourierTransform(re, im);
  const rises = new Float64Array(2 * sequenceBits);
  const falls = new Float64Array(2 * sequenceBits);
  for (let m = 0; m < sequenceBits; m++) {
    const mirror = (sequenceBits - m) % sequenceBits;
    rises[2 * m] = (re[m]! + re[mirror]!) / 2;
    rises[2 * m + 1] = (im[m]! - im[mirror]!) / 2;
    falls[2 * m] = (im[m]! + im[mirror]!) / 2;
    falls[2 * m + 1] = (re[mirror]! - re[m]!) / 2;
  }
  return { rises, falls };
}
