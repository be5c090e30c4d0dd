import { describe, expect, it } from 'vitest';
import type { Waveform } from '../../app/board/board.ts';
import { checkWaveform } from '../../app/sources/check-waveform.ts';
import { clockDomainOf, fundamentalHz } from '../../app/sources/clock.ts';
import { spectrumOf } from '../../app/sources/spectrum.ts';
import { waveformFunction, waveformValueAt } from '../../app/sources/waveform-value.ts';

const clk = {
  kind: 'trapezoid',
  name: 'clk',
  quantity: 'V',
  frequencyHz: 25e6,
  low: 0.2,
  high: 3.2,
  dutyRatio: 0.25,
  rise1090S: 1.6e-9,
  fall1090S: 3.2e-9,
} as const satisfies Waveform;
const bus = {
  kind: 'random-data',
  name: 'bus',
  quantity: 'V',
  bitRateHz: 200e6,
  low: 0,
  high: 1,
  rise1090S: 1e-9,
  fall1090S: 1e-9,
  sequenceBits: 15,
} as const satisfies Waveform;
const points = {
  kind: 'piecewise',
  name: 'pw',
  quantity: 'A',
  periodS: 2e-6,
  timesS: [0, 5e-9, 900e-9, 905e-9],
  values: [0, 12, 12, 0],
} as const satisfies Waveform;
const raw = {
  kind: 'lines',
  name: 'raw',
  quantity: 'V',
  lines: [
    { frequencyHz: 150e6, amplitude: 0.5, phaseRad: Math.PI / 2 },
    { frequencyHz: 50e6, amplitude: 2, phaseRad: 0 },
    { frequencyHz: 150e6, amplitude: 0.5, phaseRad: 0 },
  ],
} as const satisfies Waveform;

describe('list of lines', () => {
  it('gives its lines in order of frequency, equal ones added, ends included', () => {
    const { frequenciesHz, phasors } = spectrumOf(raw, 50e6, 150e6);
    expect([...frequenciesHz]).toEqual([50e6, 150e6]);
    expect(phasors[0]).toBe(2);
    expect(phasors[1]).toBe(0);
    expect(phasors[2]).toBeCloseTo(0.5, 12);
    expect(phasors[3]).toBeCloseTo(0.5, 12);
    expect(spectrumOf(raw, 51e6, 149e6).frequenciesHz).toHaveLength(0);
  });

  it('is amplitude·cos(2πft + phase) in time', () => {
    // 5 ns: 50 MHz is a quarter turn, 150 MHz three quarters (cos(3π/2 + π/2) = 1, cos(3π/2) = 0).
    expect(waveformValueAt(raw, 5e-9)).toBeCloseTo(0.5, 9);
    expect(waveformValueAt(raw, 0)).toBeCloseTo(2.5, 9);
  });
});

describe('waveform in time', () => {
  it('trapezoid by hand: 0–100 % ramps 2 and 4 ns, 50 % crossings at 1 and 11 ns', () => {
    const value = waveformFunction(clk);
    for (const [timeNs, expected] of [
      [0, 0.2],
      [0.5, 0.95],
      [1, 1.7],
      [2, 3.2],
      [8.5, 3.2],
      [11, 1.7],
      [12, 0.95],
      [13, 0.2],
      [39, 0.2],
      [41, 1.7],
      [-29, 1.7],
    ] as const) {
      expect(value(timeNs * 1e-9)).toBeCloseTo(expected, 9);
    }
  });

  it('piecewise closes to its first point; at a step the value after it', () => {
    const value = waveformFunction(points);
    expect(value(2.5e-9)).toBeCloseTo(6, 9);
    expect(value(1.5e-6)).toBe(0);
    expect(value(2.0025e-6)).toBeCloseTo(6, 6);
    const step = waveformFunction({ ...points, periodS: 4, timesS: [0, 0, 1, 1], values: [0, 2, 2, 0] });
    expect([step(0), step(0.999), step(1), step(3.9), step(4)]).toEqual([2, 2, 0, 0, 2]);
    const closing = waveformFunction({ ...points, periodS: 4, timesS: [0, 1], values: [0, 3] });
    expect(closing(2)).toBeCloseTo(2, 12);
  });
});

describe('clock', () => {
  it('frequency for the upper-frequency rule', () => {
    expect(fundamentalHz(clk)).toBe(25e6);
    expect(fundamentalHz(bus)).toBe(200e6);
    expect(fundamentalHz(points)).toBeCloseTo(500e3, 6);
    expect(fundamentalHz(raw)).toBe(150e6);
  });

  it('domain: named, else the waveform; random data one a drive', () => {
    expect(clockDomainOf(clk, 'a')).toBe('clk');
    expect(clockDomainOf({ ...clk, clockDomain: 'main' }, 'a')).toBe('main');
    expect(clockDomainOf(bus, 'D0/U1.1')).not.toBe(clockDomainOf(bus, 'D1/U1.2'));
    expect(clockDomainOf(bus, 'D0/U1.1')).not.toBe('bus');
    expect(clockDomainOf({ ...bus, clockDomain: 'ddr' }, 'a')).toBe(clockDomainOf({ ...bus, clockDomain: 'ddr' }, 'b'));
  });
});

describe('consistency', () => {
  it('accepts what can exist, up to ramps that just meet', () => {
    for (const waveform of [clk, bus, points, raw]) checkWaveform(waveform, 'w');
    // Triangle: 10 MHz, 50 %, both ramps 50 ns from 0 to 100 % = 40 ns from 10 to 90 %.
    checkWaveform({ ...clk, frequencyHz: 10e6, dutyRatio: 0.5, rise1090S: 40e-9, fall1090S: 40e-9 }, 'w');
    checkWaveform({ ...clk, rise1090S: 0, fall1090S: 0 }, 'w');
    // One bit is 5 ns: ramps of 5 ns = 4 ns from 10 to 90 %.
    checkWaveform({ ...bus, rise1090S: 4e-9, fall1090S: 4e-9 }, 'w');
    checkWaveform({ ...points, timesS: [0, 0, 1e-9, 2e-6] }, 'w');
  });

  const refused: [string, Waveform, RegExp][] = [
    [
      'ramps longer than the high time',
      { ...clk, rise1090S: 8.1e-9, fall1090S: 8e-9 },
      /^waveforms\[3\]\.riseNs.*10 ns/,
    ],
    ['ramps longer than the low time', { ...clk, dutyRatio: 0.75, rise1090S: 8.1e-9, fall1090S: 8e-9 }, /riseNs/],
    ['ramps longer than a bit', { ...bus, rise1090S: 4.1e-9, fall1090S: 4e-9 }, /riseNs.*one bit/],
    ['a negative ramp', { ...clk, fall1090S: -1e-9 }, /fallNs/],
    ['a duty of 100 %', { ...clk, dutyRatio: 1 }, /dutyPercent/],
    ['high below low', { ...clk, high: 0.1 }, /highV.*lowV/],
    ['a frequency of zero', { ...clk, frequencyHz: 0 }, /frequencyMhz/],
    ['a frequency that is no number', { ...clk, frequencyHz: Number.POSITIVE_INFINITY }, /frequencyMhz/],
    ['another sequence length', { ...bus, sequenceBits: 100 }, /sequenceBits/],
    ['a sequence too long', { ...bus, sequenceBits: 65535 }, /sequenceBits/],
    ['points out of order', { ...points, timesS: [0, 5e-9, 4e-9, 905e-9] }, /pointsNsA, time of point 3/],
    ['points past the period', { ...points, periodS: 900e-9 }, /periodNs/],
    ['samples past the period', { ...points, kind: 'samples', periodS: 900e-9 }, /periodNs/],
    ['a value that is no number', { ...points, values: [0, Number.NaN, 12, 0] }, /value of point 2/],
    ['one point', { ...points, timesS: [0], values: [1] }, /at least 2 points/],
    ['a line at 0 Hz', { ...raw, lines: [{ frequencyHz: 0, amplitude: 1, phaseRad: 0 }] }, /lines\[0\]\.frequencyMhz/],
    [
      'a line of no amplitude',
      { ...raw, lines: [{ frequencyHz: 1, amplitude: Number.NaN, phaseRad: 0 }] },
      /amplitudeV/,
    ],
  ];
  it.each(refused)('refuses %s', (_, waveform, message) => {
    expect(() => checkWaveform(waveform, 'waveforms[3]')).toThrow(message);
  });
});
