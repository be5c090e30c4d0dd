import type { RandomDataWaveform, TrapezoidWaveform } from '../board/board.ts';
import { spectrumOf } from '../sources/spectrum.ts';
import { amplitudeToDb } from '../units/convert.ts';
import { type Check, check } from './check.ts';

/** 1 V, 10 MHz, ramps from 0 to 100 % of 5 ns (4 ns from 10 to 90 %): t_r/T = 1/20. */
const CLOCK: TrapezoidWaveform = {
  kind: 'trapezoid',
  name: 'validation clock',
  quantity: 'V',
  frequencyHz: 10e6,
  low: 0,
  high: 1,
  dutyRatio: 0.25,
  rise1090S: 4e-9,
  fall1090S: 4e-9,
};
const SQUARE: TrapezoidWaveform = { ...CLOCK, dutyRatio: 0.5, rise1090S: 0, fall1090S: 0 };
const DATA: RandomDataWaveform = {
  kind: 'random-data',
  name: 'validation data',
  quantity: 'V',
  bitRateHz: 127e6,
  low: 0,
  high: 1,
  rise1090S: 0,
  fall1090S: 0,
  sequenceBits: 127,
};

/** Peak amplitude of one line, V. */
function amplitudeV(waveform: TrapezoidWaveform | RandomDataWaveform, frequencyHz: number): number {
  const { phasors } = spectrumOf(waveform, frequencyHz, frequencyHz);
  return Math.hypot(phasors[0]!, phasors[1]!);
}

interface Row {
  readonly id: string;
  readonly source: string;
  readonly sourceStatus: Check['sourceStatus'];
  readonly quantity: string;
  readonly waveform: TrapezoidWaveform | RandomDataWaveform;
  readonly frequencyHz: number;
  readonly expectedDbv: number;
}

const HANDBOOK = 'C. R. Paul, Introduction to Electromagnetic Compatibility: 2A(τ/T)|sinc(nτ/T)||sinc(n t_r/T)|';

/**
 * Expected levels are worked out by hand from the source's expression, dBV of the peak amplitude:
 * n = 1: 0.5 · 0.900316 · 0.995893; n = 2 (top of the −20 dB/decade part): 0.5 · 0.636620 · 0.983632;
 * n = 10 (both sines 1, so the envelope with both breaks): 2/(10π) · 2/π; square: 2/π and 2/(3π);
 * data: √128/127 · sinc(64/127).
 */
const ROWS: readonly Row[] = [
  {
    id: 'trapezoid-n1',
    source: HANDBOOK,
    sourceStatus: 'from memory',
    quantity: 'harmonic 1, duty 25 %, t_r/T = 1/20',
    waveform: CLOCK,
    frequencyHz: 10e6,
    expectedDbv: -6.9684,
  },
  {
    id: 'trapezoid-n2',
    source: HANDBOOK,
    sourceStatus: 'from memory',
    quantity: 'harmonic 2, duty 25 %, t_r/T = 1/20',
    waveform: CLOCK,
    frequencyHz: 20e6,
    expectedDbv: -10.0863,
  },
  {
    id: 'trapezoid-envelope-second-break',
    source: 'Spectra of digital clock signals (magazine article): −40 dB/decade past 1/(πt_r)',
    sourceStatus: 'seen',
    quantity: 'harmonic 10 on the envelope past both breaks',
    waveform: CLOCK,
    frequencyHz: 100e6,
    expectedDbv: -27.8448,
  },
  {
    id: 'square-n1',
    source: 'Fourier series of a square wave: 2A/π',
    sourceStatus: 'derived',
    quantity: 'harmonic 1, steps',
    waveform: SQUARE,
    frequencyHz: 10e6,
    expectedDbv: -3.9224,
  },
  {
    id: 'square-n3',
    source: 'Fourier series of a square wave: 2A/(3π)',
    sourceStatus: 'derived',
    quantity: 'harmonic 3, steps',
    waveform: SQUARE,
    frequencyHz: 30e6,
    expectedDbv: -13.4648,
  },
  {
    id: 'data-127-line-64',
    source: 'Two-level autocorrelation of a maximum-length sequence: A√(N+1)/N |sinc(f T_bit)|',
    sourceStatus: 'derived',
    quantity: 'line 64 of 127-bit data',
    waveform: DATA,
    frequencyHz: 64e6,
    expectedDbv: -24.9952,
  },
];

/** Source spectra against handbook expressions; even harmonics of a square wave against zero. */
export function sourceChecks(): Check[] {
  const levels = ROWS.map(({ id, source, sourceStatus, quantity, waveform, frequencyHz, expectedDbv }) =>
    check({
      id: `source-${id}`,
      source,
      sourceStatus,
      quantity,
      unit: 'dBV',
      expected: expectedDbv,
      computed: amplitudeToDb(amplitudeV(waveform, frequencyHz)),
      // Rounding of the expected value to four decimals.
      tolerance: 0.0005,
    }),
  );
  const even = check({
    id: 'source-square-even',
    source: 'Spectra of digital clock signals (magazine article): even harmonics vanish at exactly 50 %',
    sourceStatus: 'seen',
    quantity: 'harmonic 8, duty 50 %, 1 V',
    unit: 'V',
    expected: 0,
    computed: amplitudeV({ ...CLOCK, dutyRatio: 0.5 }, 80e6),
    tolerance: 1e-12,
  });
  return [...levels, even];
}
