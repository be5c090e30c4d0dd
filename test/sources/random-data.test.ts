import { describe, expect, it } from 'vitest';
import type { RandomDataWaveform } from '../../app/board/board.ts';
import { discreteFourierTransform } from '../../app/sources/discrete-fourier.ts';
import { maximumLengthBits } from '../../app/sources/maximum-length.ts';
import { addRampSums } from '../../app/sources/ramp-lines.ts';
import { rampsOf } from '../../app/sources/ramps.ts';
import { spectrumOf } from '../../app/sources/spectrum.ts';
import { waveformFunction } from '../../app/sources/waveform-value.ts';
import { integratedPhasor, magnitudes } from './support.ts';

const data = (over: Partial<RandomDataWaveform> = {}): RandomDataWaveform => ({
  kind: 'random-data',
  name: 'bus',
  quantity: 'V',
  bitRateHz: 100e6,
  low: 0,
  high: 1.8,
  rise1090S: 0.5e-9,
  fall1090S: 0.5e-9,
  sequenceBits: 127,
  ...over,
});

const ALL_LENGTHS = Array.from({ length: 14 }, (_, i) => 2 ** (i + 2) - 1);

describe('maximum-length sequence', () => {
  it.each(ALL_LENGTHS)('%i bits: visits every register state but zero', (length) => {
    // A sequence is of maximum length when its n-bit windows are all different (Golomb, Shift Register Sequences).
    const bits = maximumLengthBits(length);
    const stages = Math.log2(length + 1);
    const windows = new Set<number>();
    for (let k = 0; k < length; k++) {
      let window = 0;
      for (let i = 0; i < stages; i++) window = (window << 1) | bits[(k + i) % length]!;
      windows.add(window);
    }
    expect(windows.size).toBe(length);
    expect(windows.has(0)).toBe(false);
    expect(bits.reduce((sum, bit) => sum + bit, 0)).toBe((length + 1) / 2);
    // Begins with n ones and ends in a zero, so t = 0 is the start of a rise.
    expect([...bits.slice(0, stages)]).toEqual(Array.from({ length: stages }, () => 1));
    expect(bits[length - 1]).toBe(0);
  });

  it('511, 2047 and 32767 bits obey the recurrences of ITU-T O.150 clauses 5.1 to 5.3', () => {
    // Stages 5 + 9, 9 + 11, 14 + 15 fed back: b(t) = b(t − 5) + b(t − 9) mod 2, and so on.
    for (const [length, a, b] of [
      [511, 5, 9],
      [2047, 9, 11],
      [32767, 14, 15],
    ] as const) {
      const bits = maximumLengthBits(length);
      const breaks = bits.findIndex((bit, t) => t >= b && bit !== (bits[t - a]! ^ bits[t - b]!));
      expect(breaks).toBe(-1);
    }
    // First bits after the nine ones by hand: b(9) = b(4) + b(0) = 0 … b(13) = b(8) + b(4) = 0, b(14) = b(9) + b(5) = 1.
    expect([...maximumLengthBits(511).slice(0, 16)]).toEqual([1, 1, 1, 1, 1, 1, 1, 1, 1, 0, 0, 0, 0, 0, 1, 1]);
  });

  it.each([0, 1, 2, 100, 128, 65535])('refuses %i bits', (length) => {
    expect(() => maximumLengthBits(length)).toThrow(/2\^n − 1/);
  });
});

describe('discrete Fourier transform', () => {
  it.each([2, 3, 7, 12, 31, 100])('of length %i equals the sum that defines it', (n) => {
    const re = Float64Array.from({ length: n }, (_, k) => Math.sin(1 + 3.7 * k));
    const im = Float64Array.from({ length: n }, (_, k) => Math.cos(2 + 1.9 * k));
    const [gotRe, gotIm] = [re.slice(), im.slice()];
    discreteFourierTransform(gotRe, gotIm);
    for (let m = 0; m < n; m++) {
      let [sumRe, sumIm] = [0, 0];
      for (let k = 0; k < n; k++) {
        const angleRad = (-2 * Math.PI * m * k) / n;
        sumRe += re[k]! * Math.cos(angleRad) - im[k]! * Math.sin(angleRad);
        sumIm += re[k]! * Math.sin(angleRad) + im[k]! * Math.cos(angleRad);
      }
      expect(gotRe[m]).toBeCloseTo(sumRe, 11);
      expect(gotIm[m]).toBeCloseTo(sumIm, 11);
    }
  });
});

describe('random data spectrum', () => {
  it('equal ramps: |X| = A·√(N + 1)/N · sinc(f T_bit) sinc(f t_r) (two-level autocorrelation of the sequence)', () => {
    // The 0/1 sequence has |DFT| = √(N + 1)/2 at every line but 0 (its ±1 form has autocorrelation −1: Golomb).
    for (const sequenceBits of [3, 127, 511]) {
      const { frequenciesHz, phasors } = spectrumOf(data({ sequenceBits }), 1, 2e9);
      for (const [i, f] of frequenciesHz.entries()) {
        const a = (Math.PI * f) / 100e6;
        const b = Math.PI * f * 0.625e-9;
        const shape = Math.abs((Math.sin(a) / a) * (Math.sin(b) / b));
        const expected = (1.8 * Math.sqrt(sequenceBits + 1) * shape) / sequenceBits;
        expect(Math.hypot(phasors[2 * i]!, phasors[2 * i + 1]!)).toBeCloseTo(expected, 11);
      }
    }
  });

  it('unequal ramps leave lines at multiples of the bit rate, equal ones none', () => {
    const atBitRates = (fall1090S: number) =>
      [1, 2, 3].map((n) => magnitudes(spectrumOf(data({ fall1090S }), n * 100e6, n * 100e6))[0]!);
    for (const x of atBitRates(0.5e-9)) expect(x).toBeLessThan(1e-13);
    // All 32 rises and 32 falls add in phase: (A/(πm))·32·|sinc(f t_r) − sinc(f t_f)|, m = 127 n.
    for (const [i, x] of atBitRates(1.2e-9).entries()) {
      const n = i + 1;
      const sinc = (y: number) => Math.sin(Math.PI * y) / (Math.PI * y);
      const expected = ((1.8 * 32) / (Math.PI * 127 * n)) * Math.abs(sinc(n * 0.0625) - sinc(n * 0.15));
      expect(x).toBeCloseTo(expected, 12);
    }
  });

  it('equals the sum over all ramps one by one', () => {
    const waveform = data({ sequenceBits: 63, rise1090S: 0.3e-9, fall1090S: 2.1e-9, low: -0.7 });
    const { frequenciesHz, phasors } = spectrumOf(waveform, 30e6, 3e9);
    const sums = new Float64Array(phasors.length);
    addRampSums(sums, rampsOf(waveform).ramps, 100e6 / 63, Math.round((frequenciesHz[0]! * 63) / 100e6));
    for (const [i, f] of frequenciesHz.entries()) {
      const order = (f * 63) / 100e6;
      expect(phasors[2 * i]).toBeCloseTo(sums[2 * i + 1]! / (Math.PI * order), 11);
      expect(phasors[2 * i + 1]).toBeCloseTo(-sums[2 * i]! / (Math.PI * order), 11);
    }
  });

  it('equals the numerical Fourier integral of the bits drawn by hand', () => {
    // 7 bits, x³ + x² + 1, starting with three ones: b(t) = b(t − 2) + b(t − 3) gives 1 1 1 0 0 1 0. 10 ns a bit, ramps 4 and 6 ns
    // (0–100 %), crossings on the grid at 2 ns + k·10 ns: rises start at 0 and 50 ns, falls start at 29 and 59 ns.
    const waveform = data({ sequenceBits: 7, rise1090S: 3.2e-9, fall1090S: 4.8e-9, high: 1 });
    const corners = [
      [0, 0],
      [4, 1],
      [29, 1],
      [35, 0],
      [50, 0],
      [54, 1],
      [59, 1],
      [65, 0],
      [70, 0],
    ] as const;
    const value = (timeS: number) => {
      const t = timeS * 1e9;
      const i = corners.findIndex(([at]) => at > t);
      const [[t0, v0], [t1, v1]] = [corners[i - 1]!, corners[i]!];
      return v0 + ((v1 - v0) * (t - t0)) / (t1 - t0);
    };
    const drawn = waveformFunction(waveform);
    for (let t = 0.25; t < 70; t += 0.5) expect(drawn(t * 1e-9)).toBeCloseTo(value(t * 1e-9), 9);
    for (const m of [1, 2, 3, 7, 14, 20]) {
      const [re, im] = integratedPhasor(
        value,
        corners.map(([t]) => t * 1e-9),
        (m * 100e6) / 7,
      );
      const { phasors } = spectrumOf(waveform, (m * 100e6) / 7, (m * 100e6) / 7);
      expect(phasors[0]).toBeCloseTo(re, 9);
      expect(phasors[1]).toBeCloseTo(im, 9);
    }
  });

  it('32767 bits to 1 GHz takes seconds, not minutes', () => {
    const startedAtMs = performance.now();
    const { frequenciesHz } = spectrumOf(data({ sequenceBits: 32767, fall1090S: 0.7e-9 }), 30e6, 1e9);
    // 30 MHz is order 9830.1 and 1 GHz order 327670 of 100 MHz/32767.
    expect(frequenciesHz).toHaveLength(327670 - 9831 + 1);
    expect(performance.now() - startedAtMs).toBeLessThan(10_000);
  });
});
