import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandwidthHz, combineInBandwidth } from '../../app/receiver/combine.ts';

describe('bandwidth (CISPR 16-1-1, as printed in receiver manuals)', () => {
  it.each([
    [9e3, 200],
    [149e3, 200],
    [151e3, 9e3],
    [29.99e6, 9e3],
    [30e6, 120e3],
    [300e6, 120e3],
    [1e9, 120e3],
    [1e9 * (1 + 1e-12), 120e3],
    [1.001e9, 1e6],
    [40e9, 1e6],
  ])('at %f Hz: %f Hz', (frequencyHz, expectedHz) => {
    expect(bandwidthHz(frequencyHz)).toBe(expectedHz);
  });

  it('ends at 9 kHz', () => {
    expect(() => bandwidthHz(8.9e3)).toThrow(/9 kHz/);
    expect(() => bandwidthHz(Number.NaN)).toThrow(/9 kHz/);
  });
});

const line = (frequencyHz: number, fieldRmsVPerM: number) => ({ frequencyHz, fieldRmsVPerM });

describe('lines in the bandwidth', () => {
  it('one alone reads the same on all detectors', () => {
    const lines = [line(99e6, 5e-6), line(100e6, 3.3e-5), line(101e6, 7e-6)];
    expect(combineInBandwidth(lines, 100e6)).toEqual({ averageRms: 3.3e-5, peakRms: 3.3e-5, count: 1 });
  });

  it('two equal ones read 3 dB more on average and 6 dB more on peak', () => {
    const { averageRms, peakRms, count } = combineInBandwidth([line(100e6, 1e-5), line(100.05e6, 1e-5)], 100e6);
    expect(count).toBe(2);
    expect(20 * Math.log10(averageRms / 1e-5)).toBeCloseTo(3.0103, 4);
    expect(20 * Math.log10(peakRms / 1e-5)).toBeCloseTo(6.0206, 4);
  });

  it('reaches half the bandwidth to either side: 60 kHz below 1 GHz, 500 kHz above', () => {
    const at = (centreHz: number, offsetHz: number) =>
      combineInBandwidth([line(centreHz + offsetHz, 1)], centreHz).count;
    expect([-60e3, 60e3, -61e3, 61e3].map((offsetHz) => at(500e6, offsetHz))).toEqual([1, 1, 0, 0]);
    expect([-500e3, 500e3, -501e3, 501e3].map((offsetHz) => at(2e9, offsetHz))).toEqual([1, 1, 0, 0]);
    expect(combineInBandwidth([], 100e6)).toEqual({ averageRms: 0, peakRms: 0, count: 0 });
  });

  it('bounds the envelope of lines that beat: its mean and its peak by brute force', () => {
    // The envelope |Σ E e^(j(2πΔf t + φ))| sampled over its common period of 1 ms (offsets are whole kHz).
    const randomLine = fc.record({
      offsetKhz: fc.integer({ min: -60, max: 60 }),
      fieldVPerM: fc.double({ min: 0.01, max: 1, noNaN: true }),
      phaseRad: fc.double({ min: 0, max: 6.28, noNaN: true }),
    });
    const distinct = fc.uniqueArray(randomLine, { minLength: 2, maxLength: 6, selector: (l) => l.offsetKhz });
    fc.assert(
      fc.property(distinct, (lines) => {
        let [mean, square, peak] = [0, 0, 0];
        const samples = 1000;
        for (let i = 0; i < samples; i++) {
          let [re, im] = [0, 0];
          for (const { offsetKhz, fieldVPerM, phaseRad } of lines) {
            const angleRad = (2 * Math.PI * offsetKhz * i) / samples + phaseRad;
            re += fieldVPerM * Math.cos(angleRad);
            im += fieldVPerM * Math.sin(angleRad);
          }
          const envelope = Math.hypot(re, im);
          mean += envelope / samples;
          square += (envelope * envelope) / samples;
          peak = Math.max(peak, envelope);
        }
        const received = lines.map(({ offsetKhz, fieldVPerM }) => line(100e6 + offsetKhz * 1e3, fieldVPerM));
        const { averageRms, peakRms } = combineInBandwidth(received, 100e6);
        // Rms of the envelope is the power sum exactly (1000 samples resolve every beat); the rest are inequalities.
        expect(Math.abs(averageRms - Math.sqrt(square))).toBeLessThan(1e-9);
        expect(mean).toBeLessThanOrEqual(averageRms + 1e-9);
        expect(peak).toBeLessThanOrEqual(peakRms + 1e-9);
      }),
      { seed: 5, numRuns: 50 },
    );
  });
});
