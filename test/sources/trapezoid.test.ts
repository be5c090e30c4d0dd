import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { TrapezoidWaveform } from '../../app/board/board.ts';
import { applyDrive, spectrumOf } from '../../app/sources/spectrum.ts';
import { integratedPhasor, largestDifference, magnitudes, resynthesise } from './support.ts';

const trapezoid = (over: Partial<TrapezoidWaveform> = {}): TrapezoidWaveform => ({
  kind: 'trapezoid',
  name: 'clk',
  quantity: 'V',
  frequencyHz: 25e6,
  low: 0,
  high: 3.3,
  dutyRatio: 0.5,
  rise1090S: 1e-9,
  fall1090S: 1e-9,
  ...over,
});

/** The contract's words as a function: 0 % at t = 0, linear to 100 %, 50 % to 50 % lasts duty·T. Its own arithmetic. */
function written(w: TrapezoidWaveform): { value: (timeS: number) => number; breaksS: number[] } {
  const periodS = 1 / w.frequencyHz;
  const riseS = 1.25 * w.rise1090S;
  const fallS = 1.25 * w.fall1090S;
  const fallStartS = 0.5 * riseS + w.dutyRatio * periodS - 0.5 * fallS;
  const swing = w.high - w.low;
  const value = (timeS: number) => {
    if (timeS < riseS) return w.low + (swing * timeS) / riseS;
    if (timeS < fallStartS) return w.high;
    if (timeS < fallStartS + fallS) return w.high - (swing * (timeS - fallStartS)) / fallS;
    return w.low;
  };
  return { value, breaksS: [0, riseS, fallStartS, fallStartS + fallS, periodS] };
}

const randomTrapezoid = fc
  .record({
    frequencyHz: fc.double({ min: 1e5, max: 5e8, noNaN: true }),
    low: fc.double({ min: -5, max: 5, noNaN: true }),
    swing: fc.double({ min: 0.1, max: 12, noNaN: true }),
    dutyRatio: fc.double({ min: 0.02, max: 0.98, noNaN: true }),
    rise: fc.double({ min: 0, max: 0.99, noNaN: true }),
    fall: fc.double({ min: 0, max: 0.99, noNaN: true }),
  })
  .map(({ frequencyHz, low, swing, dutyRatio, rise, fall }) => {
    const shortestS = Math.min(dutyRatio, 1 - dutyRatio) / frequencyHz;
    // Ramps as shares of the shorter plateau's time.
    return trapezoid({
      frequencyHz,
      low,
      high: low + swing,
      dutyRatio,
      rise1090S: 0.8 * rise * shortestS,
      fall1090S: 0.8 * fall * shortestS,
    });
  });

describe('trapezoid spectrum', () => {
  it('equals the numerical Fourier integral of the waveform as the contract words it', () => {
    fc.assert(
      fc.property(randomTrapezoid, fc.integer({ min: 1, max: 400 }), (waveform, order) => {
        const frequencyHz = order * waveform.frequencyHz;
        const { value, breaksS } = written(waveform);
        const [re, im] = integratedPhasor(value, breaksS, frequencyHz);
        const { phasors, frequenciesHz } = spectrumOf(waveform, frequencyHz, frequencyHz);
        expect(frequenciesHz).toHaveLength(1);
        // Gauss rule with 12 panels a cycle: error below 1e-13 of the swing a panel; levels up to 17.
        expect(Math.abs(phasors[0]! - re)).toBeLessThan(1e-10);
        expect(Math.abs(phasors[1]! - im)).toBeLessThan(1e-10);
      }),
      { seed: 1, numRuns: 150 },
    );
  });

  it('with equal ramps has the handbook amplitudes 2A(τ/T) sinc(nτ/T) sinc(n t_r/T) (Paul, from memory)', () => {
    // A = 3.3 V, T = 40 ns, τ = 12 ns, t_r(0–100 %) = 2 ns; numbers worked out by hand from the sines.
    const waveform = trapezoid({ dutyRatio: 0.3, rise1090S: 1.6e-9, fall1090S: 1.6e-9 });
    const got = magnitudes(spectrumOf(waveform, 1, 1e9));
    expect(got).toHaveLength(40);
    for (let n = 1; n <= 40; n++) {
      const a = Math.PI * n * 0.3;
      const b = Math.PI * n * 0.05;
      const expected = 2 * 3.3 * 0.3 * Math.abs(Math.sin(a) / a) * Math.abs(Math.sin(b) / b);
      expect(got[n - 1]).toBeCloseTo(expected, 12);
    }
    // n = 1: 1.98 · 0.858394 · 0.995893 = 1.69263 (sin 54° = 0.809017, sin 9° = 0.156434).
    expect(got[0]).toBeCloseTo(1.69263, 4);
  });

  it('at 50 % duty and equal ramps has no even harmonic, at 49 % it has', () => {
    const even = (dutyRatio: number) =>
      magnitudes(spectrumOf(trapezoid({ dutyRatio }), 50e6, 1e9)).filter((_, i) => i % 2 === 0);
    expect(even(0.5)).toHaveLength(20);
    // 1e-14 of 3.3 V: rounding of the phase only.
    expect(Math.max(...even(0.5))).toBeLessThan(1e-13);
    expect(Math.min(...even(0.49).slice(0, 10))).toBeGreaterThan(1e-3);
  });

  it('keeps below the envelope with breaks at 1/(πτ) and 1/(πt_r), and touches it', () => {
    const waveform = trapezoid({ frequencyHz: 1e6, dutyRatio: 0.013, rise1090S: 0.8e-9, fall1090S: 0.8e-9 });
    const { frequenciesHz, phasors } = spectrumOf(waveform, 0, 6e9);
    const [swing, tauS, rampS] = [3.3, 13e-9, 1e-9];
    const flat = 2 * swing * tauS * 1e6;
    const slopeBreakHz = 1 / (Math.PI * tauS);
    const rampBreakHz = 1 / (Math.PI * rampS);
    const nearest = { flat: 0, first: 0, second: 0 };
    for (const [i, f] of frequenciesHz.entries()) {
      const envelope = flat * Math.min(1, slopeBreakHz / f) * Math.min(1, rampBreakHz / f);
      const ratio = Math.hypot(phasors[2 * i]!, phasors[2 * i + 1]!) / envelope;
      expect(ratio).toBeLessThanOrEqual(1 + 1e-9);
      const part = f < slopeBreakHz ? 'flat' : f < rampBreakHz ? 'first' : 'second';
      nearest[part] = Math.max(nearest[part], ratio);
    }
    // Lines are dense (1 MHz) against the sines' periods (77 MHz, 1 GHz), so each part is touched within 1–2 %.
    expect(nearest.flat).toBeGreaterThan(0.99);
    expect(nearest.first).toBeGreaterThan(0.97);
    expect(nearest.second).toBeGreaterThan(0.98);
  });

  it('holds the power of the waveform (Parseval)', () => {
    // Mean square of a trapezoid about its mean: levels and ramps by hand, ramps contribute A²/3 each over their time.
    const waveform = trapezoid({ dutyRatio: 0.37, rise1090S: 3.2e-9, fall1090S: 4.8e-9, low: -1, high: 2 });
    const [periodS, riseS, fallS] = [40e-9, 4e-9, 6e-9];
    const flatS = 0.37 * periodS - (riseS + fallS) / 2;
    const mean = 0.37 * 3;
    const meanSquare = (9 * (flatS + (riseS + fallS) / 3)) / periodS - mean * mean;
    let power = 0;
    for (const x of magnitudes(spectrumOf(waveform, 0, 25e6 * 4000))) power += (x * x) / 2;
    // Lines fall as 1/n², so what is left beyond n is of order (A/n)²/n: 1e-11.
    expect(Math.abs(power - meanSquare)).toBeLessThan(1e-9);
  });

  it('gives the waveform back in time', () => {
    const waveform = trapezoid({ dutyRatio: 0.3, rise1090S: 1.6e-9, fall1090S: 3.2e-9 });
    const spectrum = spectrumOf(waveform, 0, 25e6 * 5000);
    const mean = 3.3 * 0.3;
    const { value } = written(waveform);
    for (const timeS of [0.5e-9, 1.3e-9, 7e-9, 12e-9, 14.4e-9, 30e-9]) {
      // Away from corners the tail of a 1/n² series is of order A·T/(t_r·n²) = 3e-6.
      expect(Math.abs(resynthesise(spectrum, timeS) + mean - value(timeS))).toBeLessThan(1e-5);
    }
  });

  it('is exact for steps: ramps of no time are the limit of short ones', () => {
    const step = spectrumOf(trapezoid({ rise1090S: 0, fall1090S: 0, dutyRatio: 0.31 }), 0, 1e9);
    // Rectangle: 2A/(πn) |sin(πn·duty)| (Fourier).
    for (const [i, got] of magnitudes(step).entries()) {
      const n = i + 1;
      expect(got).toBeCloseTo(((2 * 3.3) / (Math.PI * n)) * Math.abs(Math.sin(Math.PI * n * 0.31)), 12);
    }
    // A ramp of 1e-30 s has no cancellation to suffer from; 1 as shifts a phase by 2π·1e9·0.6e-18 = 4e-9.
    const tiny = spectrumOf(trapezoid({ rise1090S: 1e-30, fall1090S: 1e-30, dutyRatio: 0.31 }), 0, 1e9);
    expect(largestDifference(step, tiny)).toBeLessThan(1e-14);
    const short = spectrumOf(trapezoid({ rise1090S: 1e-18, fall1090S: 1e-18, dutyRatio: 0.31 }), 0, 1e9);
    expect(largestDifference(step, short)).toBeLessThan(1e-8);
  });

  it('includes both ends of the range, also where a period is not exact in binary', () => {
    const lines = spectrumOf(trapezoid({ frequencyHz: 1e7 }), 30e6, 1e9).frequenciesHz;
    expect([lines.length, lines[0], lines.at(-1)]).toEqual([98, 30e6, 1e9]);
    const thirds = spectrumOf(trapezoid({ frequencyHz: 1e9 / 3 }), 1e9 / 3, 1e9).frequenciesHz;
    expect(thirds).toHaveLength(3);
    expect(spectrumOf(trapezoid(), 26e6, 49e6).frequenciesHz).toHaveLength(0);
    expect(spectrumOf(trapezoid(), 0, 24e6).frequenciesHz).toHaveLength(0);
  });

  it('refuses a range that is none and more lines than can be held', () => {
    expect(() => spectrumOf(trapezoid(), 1e9, 30e6)).toThrow(/frequency range/);
    expect(() => spectrumOf(trapezoid(), Number.NaN, 1e9)).toThrow(/frequency range/);
    expect(() => spectrumOf(trapezoid(), 0, Number.POSITIVE_INFINITY)).toThrow(/frequency range/);
    expect(() => spectrumOf(trapezoid({ frequencyHz: 1 }), 30e6, 1e9)).toThrow(/period short enough/);
    expect(() => spectrumOf(trapezoid({ frequencyHz: 1e-310 }), 30e6, 1e9)).toThrow(/period short enough/);
  });
});

describe('drive', () => {
  it('delays in time: the phasor turns by −2πf·delay', () => {
    fc.assert(
      fc.property(
        randomTrapezoid,
        fc.integer({ min: 1, max: 60 }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        (waveform, order, periods) => {
          const periodS = 1 / waveform.frequencyHz;
          const delayS = periods * periodS;
          const frequencyHz = order * waveform.frequencyHz;
          const line = spectrumOf(waveform, frequencyHz, frequencyHz);
          const late = applyDrive(line, { delayS, isInverted: false });
          // Integral of the shifted waveform: breaks move with it, over one period from the delay on.
          const { value, breaksS } = written(waveform);
          const [re, im] = integratedPhasor(
            (timeS) => value(timeS - delayS),
            breaksS.map((timeS) => timeS + delayS),
            frequencyHz,
          );
          expect(Math.abs(late.phasors[0]! - re)).toBeLessThan(1e-9);
          expect(Math.abs(late.phasors[1]! - im)).toBeLessThan(1e-9);
        },
      ),
      { seed: 2, numRuns: 60 },
    );
  });

  it('inverted is low + high − v(t)', () => {
    const waveform = trapezoid({ dutyRatio: 0.3, low: 0.4, rise1090S: 1.6e-9, fall1090S: 2.4e-9 });
    const { value, breaksS } = written(waveform);
    for (const frequencyHz of [25e6, 50e6, 375e6]) {
      const line = applyDrive(spectrumOf(waveform, frequencyHz, frequencyHz), { delayS: 0, isInverted: true });
      const [re, im] = integratedPhasor((timeS) => 0.4 + 3.3 - value(timeS), breaksS, frequencyHz);
      expect(line.phasors[0]).toBeCloseTo(re, 10);
      expect(line.phasors[1]).toBeCloseTo(im, 10);
    }
  });

  it('half a period late and inverted is the same square wave at odd lines and opposite at even ones', () => {
    const spectrum = spectrumOf(trapezoid({ dutyRatio: 0.4 }), 25e6, 1e9);
    const moved = applyDrive(spectrum, { delayS: 20e-9, isInverted: true });
    for (let i = 0; i < 40; i++) {
      const sign = i % 2 === 0 ? 1 : -1;
      expect(moved.phasors[2 * i]).toBeCloseTo(sign * spectrum.phasors[2 * i]!, 12);
      expect(moved.phasors[2 * i + 1]).toBeCloseTo(sign * spectrum.phasors[2 * i + 1]!, 12);
    }
  });
});
