import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PiecewiseWaveform } from '../../app/board/board.ts';
import { spectrumOf } from '../../app/sources/spectrum.ts';
import { waveformFunction } from '../../app/sources/waveform-value.ts';
import { integratedPhasor, largestDifference, magnitudes } from './support.ts';

const piecewise = (
  periodS: number,
  points: readonly (readonly [number, number])[],
  over: Partial<PiecewiseWaveform> = {},
): PiecewiseWaveform => ({
  kind: 'piecewise',
  name: 'pw',
  quantity: 'V',
  periodS,
  timesS: points.map(([timeS]) => timeS),
  values: points.map(([, value]) => value),
  ...over,
});

describe('piecewise spectrum', () => {
  it('saw-tooth: amplitude A/(πm), a step of −A at the end of the ramp (Fourier)', () => {
    // v = A t/T: X_m = j A/(πm).
    const { phasors } = spectrumOf(
      piecewise(1e-6, [
        [0, 0],
        [1e-6, 7],
      ]),
      0,
      100e6,
    );
    for (let m = 1; m <= 100; m++) {
      expect(phasors[2 * m - 2]).toBeCloseTo(0, 12);
      expect(phasors[2 * m - 1]).toBeCloseTo(7 / (Math.PI * m), 12);
    }
  });

  it('triangle: 4A/(π²m²) at odd lines, none at even ones (Fourier)', () => {
    const got = magnitudes(
      spectrumOf(
        piecewise(1e-6, [
          [0, -1],
          [0.5e-6, 1],
        ]),
        0,
        40e6,
      ),
    );
    for (const [i, x] of got.entries()) {
      const m = i + 1;
      expect(x).toBeCloseTo(m % 2 === 0 ? 0 : 8 / (Math.PI * m) ** 2, 12);
    }
  });

  it('a trapezoid written as points has the trapezoid’s lines', () => {
    // 25 MHz, duty 0.3, 0–100 % ramps 2 ns and 4 ns: fall from 11 to 15 ns.
    const points = piecewise(40e-9, [
      [0, 0],
      [2e-9, 3.3],
      [11e-9, 3.3],
      [15e-9, 0],
    ]);
    const trapezoid = {
      kind: 'trapezoid',
      name: 'clk',
      quantity: 'V',
      frequencyHz: 25e6,
      low: 0,
      high: 3.3,
      dutyRatio: 0.3,
      rise1090S: 1.6e-9,
      fall1090S: 3.2e-9,
    } as const;
    const [a, b] = [spectrumOf(points, 30e6, 1e9), spectrumOf(trapezoid, 30e6, 1e9)];
    expect(a.frequenciesHz).toHaveLength(39);
    expect(largestDifference(a, b)).toBeLessThan(1e-12);
  });

  it('counts time from the first point', () => {
    const points = [
      [0, 1],
      [3e-9, 4],
      [9e-9, -2],
    ] as const;
    const late = points.map(([timeS, value]) => [timeS - 300e-9, value] as const);
    // Rounding of −300 ns + 3 ns shifts the phase by 2π·1e9·1e-23 only.
    expect(
      largestDifference(spectrumOf(piecewise(20e-9, points), 0, 1e9), spectrumOf(piecewise(20e-9, late), 0, 1e9)),
    ).toBeLessThan(1e-12);
    expect(waveformFunction(piecewise(20e-9, late))(1.5e-9)).toBeCloseTo(2.5, 6);
  });

  const randomPoints = fc
    .array(fc.tuple(fc.double({ min: 0, max: 0.999, noNaN: true }), fc.double({ min: -10, max: 10, noNaN: true })), {
      minLength: 3,
      maxLength: 12,
    })
    .map((points) => points.sort((a, b) => a[0] - b[0]).map(([share, value]) => [share * 50e-9, value] as const));

  it('equals the numerical Fourier integral of random points', () => {
    fc.assert(
      fc.property(randomPoints, fc.integer({ min: 1, max: 60 }), (points, order) => {
        const waveform = piecewise(50e-9, points);
        const firstS = points[0]![0];
        const inOwnTime = [
          ...points.map(([timeS, v]) => [timeS - firstS, v] as const),
          [50e-9, points[0]![1]] as const,
        ];
        // Straight interpolation, written out here.
        const value = (timeS: number) => {
          const i = inOwnTime.findIndex(([t]) => t > timeS);
          const [[t0, v0], [t1, v1]] = [inOwnTime[i - 1]!, inOwnTime[i]!];
          return v0 + ((v1 - v0) * (timeS - t0)) / (t1 - t0);
        };
        const [re, im] = integratedPhasor(
          value,
          inOwnTime.map(([timeS]) => timeS),
          order * 20e6,
        );
        const { phasors } = spectrumOf(waveform, order * 20e6, order * 20e6);
        expect(Math.hypot(phasors[0]! - re, phasors[1]! - im)).toBeLessThan(1e-9);
      }),
      { seed: 3, numRuns: 100 },
    );
  });

  it('does not change when points are added on its lines', () => {
    fc.assert(
      fc.property(randomPoints, (points) => {
        const finer = points.flatMap(([timeS, value], i) => {
          const next = points[i + 1];
          return next
            ? [[timeS, value] as const, [(timeS + next[0]) / 2, (value + next[1]) / 2] as const]
            : [[timeS, value] as const];
        });
        const [a, b] = [spectrumOf(piecewise(50e-9, points), 0, 2e9), spectrumOf(piecewise(50e-9, finer), 0, 2e9)];
        expect(largestDifference(a, b)).toBeLessThan(1e-11);
      }),
      { seed: 4, numRuns: 50 },
    );
  });

  it('two points at one time are a step', () => {
    // Pulse of 2 from 0 to 10 ns in 40 ns: 2·2/(πm)·|sin(πm/4)|.
    const pulse = piecewise(40e-9, [
      [0, 0],
      [0, 2],
      [10e-9, 2],
      [10e-9, 0],
    ]);
    for (const [i, x] of magnitudes(spectrumOf(pulse, 0, 1e9)).entries()) {
      const m = i + 1;
      expect(x).toBeCloseTo((4 / (Math.PI * m)) * Math.abs(Math.sin((Math.PI * m) / 4)), 12);
    }
  });

  it('many samples over many lines keep their digits (recurrence)', () => {
    // A sampled cosine joined by straight lines: line 1 is sinc²(1/N) of it, the next ones sit at N ± 1 (1/m² law).
    const count = 1000;
    const points = Array.from({ length: count }, (_, i) => [i * 1e-9, Math.cos((2 * Math.PI * i) / count)] as const);
    const got = magnitudes(spectrumOf(piecewise(count * 1e-9, points, { kind: 'samples' }), 0, 3e9));
    const sinc2 = (x: number) => (Math.sin(Math.PI * x) / (Math.PI * x)) ** 2;
    for (const [i, x] of got.entries()) {
      const m = i + 1;
      const isImage = m % count === 1 || m % count === count - 1;
      expect(Math.abs(x - (isImage ? sinc2(m / count) : 0))).toBeLessThan(1e-11);
    }
  });
});
