import type { LinesWaveform, Waveform } from '../board/board.ts';
import { describe, inputError } from '../errors.ts';
import { addDataSums } from './data-lines.ts';
import { addRampSums } from './ramp-lines.ts';
import { rampsOf } from './ramps.ts';

/** Line spectrum of a periodic source, rising in frequency; every line is Re(X e^(j2πft)). */
export interface LineSpectrum {
  readonly frequenciesHz: Float64Array;
  /** Peak phasors X in the waveform's unit (V or A), re then im per line: amplitude·cos(2πft + phase), X = amplitude·e^(j·phase). */
  readonly phasors: Float64Array;
}

/** A line this close (relative) to the range's end is in it: m·f0 is rounded, the range's end usually is not. */
const RANGE_TOLERANCE = 1e-9;
/** 24 bytes a line: about 100 MB. */
const MAX_LINES = 4_000_000;
/** Ramps times lines: about half a minute. */
const MAX_TERMS = 5_000_000_000;

/**
 * Exact Fourier lines of a waveform from `fromHz` to `toHz`, both ends included (to one part in 10⁹).
 *
 *   X_m = (1/(jπm)) Σ_k Δ_k e^(−j2πm f0 t_k) sinc(m f0 d_k),   line m at m·f0
 *
 * over the ramps of a period (height Δ, centre t, duration d; a step has d = 0): a trapezoid has two, f0 its frequency;
 * random data repeats every N = sequenceBits bits, f0 = bitRate/N; points joined by straight lines, f0 = 1/period. Lines
 * whose sum cancels stay in the list (near 1e-16 of the swing). A list of lines gives its own lines; equal frequencies
 * add. The mean value (0 Hz) radiates nothing and is not given.
 * Source: derivative of the waveform as a train of rectangles; for the trapezoid with equal ramps it is
 * 2A(τ/T) sinc(nτ/T) sinc(n t_r/T), C. R. Paul, Introduction to Electromagnetic Compatibility, chapter on signal spectra
 * (from memory).
 * Throws `input` for a range that is no range, or when the lines are too many to hold or to compute (a long period).
 */
export function spectrumOf(waveform: Waveform, fromHz: number, toHz: number): LineSpectrum {
  if (!(fromHz >= 0 && fromHz <= toHz && toHz < Infinity)) {
    throw inputError(
      'frequency range',
      'from a frequency of at least 0 Hz to one not below it',
      `${fromHz}–${toHz} Hz`,
    );
  }
  if (waveform.kind === 'lines') return listedLines(waveform, fromHz, toHz);
  const { perPeriod, rateHz } = repetition(waveform);
  const spacingHz = rateHz / perPeriod;
  const firstOrder = Math.max(1, Math.ceil((fromHz / spacingHz) * (1 - RANGE_TOLERANCE)));
  const lastOrder = Math.floor((toHz / spacingHz) * (1 + RANGE_TOLERANCE));
  const count = Math.max(0, lastOrder - firstOrder + 1);
  if (!(count <= MAX_LINES)) throw tooMuch(waveform, `at most ${MAX_LINES} lines in the range`, count);

  const sums = new Float64Array(2 * count);
  if (waveform.kind === 'random-data') {
    addDataSums(sums, waveform, firstOrder);
  } else {
    const { ramps } = rampsOf(waveform);
    if (ramps.length * count > MAX_TERMS) {
      throw tooMuch(waveform, `points times lines in the range at most ${MAX_TERMS}`, ramps.length * count);
    }
    addRampSums(sums, ramps, spacingHz, firstOrder);
  }

  const frequenciesHz = new Float64Array(count);
  const phasors = new Float64Array(2 * count);
  for (let i = 0; i < count; i++) {
    const order = firstOrder + i;
    frequenciesHz[i] = (order * rateHz) / perPeriod;
    // Division by jπm.
    phasors[2 * i] = sums[2 * i + 1]! / (Math.PI * order);
    phasors[2 * i + 1] = -sums[2 * i]! / (Math.PI * order);
  }
  return { frequenciesHz, phasors };
}

/**
 * The spectrum at the pin of one drive: v(t − delay) turns line X into X e^(−j2πf·delay); inverted means
 * low + high − v(t), the sign of every line.
 */
export function applyDrive(
  spectrum: LineSpectrum,
  { delayS, isInverted }: { readonly delayS: number; readonly isInverted: boolean },
): LineSpectrum {
  const phasors = new Float64Array(spectrum.phasors.length);
  const sign = isInverted ? -1 : 1;
  for (const [i, frequencyHz] of spectrum.frequenciesHz.entries()) {
    const angleRad = -2 * Math.PI * ((frequencyHz * delayS) % 1);
    const [c, s] = [sign * Math.cos(angleRad), sign * Math.sin(angleRad)];
    const [re, im] = [spectrum.phasors[2 * i]!, spectrum.phasors[2 * i + 1]!];
    phasors[2 * i] = re * c - im * s;
    phasors[2 * i + 1] = re * s + im * c;
  }
  return { frequenciesHz: spectrum.frequenciesHz, phasors };
}

/** Lines lie at m·rate/perPeriod. Kept as two numbers: m·(rate/N) would round once more than m·rate/N. */
function repetition(waveform: Exclude<Waveform, LinesWaveform>): { perPeriod: number; rateHz: number } {
  switch (waveform.kind) {
    case 'trapezoid':
      return { perPeriod: 1, rateHz: waveform.frequencyHz };
    case 'random-data':
      return { perPeriod: waveform.sequenceBits, rateHz: waveform.bitRateHz };
    default:
      return { perPeriod: waveform.periodS, rateHz: 1 };
  }
}

function listedLines({ lines }: LinesWaveform, fromHz: number, toHz: number): LineSpectrum {
  const sums = new Map<number, { re: number; im: number }>();
  for (const { frequencyHz, amplitude, phaseRad } of lines) {
    if (frequencyHz < fromHz * (1 - RANGE_TOLERANCE) || frequencyHz > toHz * (1 + RANGE_TOLERANCE)) continue;
    const sum = sums.get(frequencyHz) ?? { re: 0, im: 0 };
    sum.re += amplitude * Math.cos(phaseRad);
    sum.im += amplitude * Math.sin(phaseRad);
    sums.set(frequencyHz, sum);
  }
  const frequenciesHz = Float64Array.from(sums.keys()).sort();
  const phasors = new Float64Array(2 * frequenciesHz.length);
  for (const [i, frequencyHz] of frequenciesHz.entries()) {
    const { re, im } = sums.get(frequencyHz)!;
    phasors[2 * i] = re;
    phasors[2 * i + 1] = im;
  }
  return { frequenciesHz, phasors };
}

const tooMuch = (waveform: Waveform, must: string, received: number) =>
  inputError(`waveform ${describe(waveform.name)}`, `of a period short enough for ${must}`, received);
