import { describe, inputError } from '../errors.ts';
import { degToRad, mhzToHz, nsToS } from '../units/convert.ts';
import type { PiecewiseWaveform, Waveform } from './board.ts';
import type { BoardFile } from './board-file.ts';
import { oneOf } from './near-names.ts';
import { refuseDuplicates } from './references.ts';
import { SAME_TIME, type WaveformFile } from './waveform-file.ts';

/** Columns of a waveform file: seconds (rising), volts or amperes. */
export interface SampleColumns {
  readonly timesS: readonly number[];
  readonly values: readonly number[];
}

/** By the `file` text of the waveform. */
export type SamplesByFile = ReadonlyMap<string, SampleColumns>;

type Of<K extends WaveformFile['kind']> = Extract<WaveformFile, { kind: K }>;

/**
 * Waveforms in SI. A sampled one says no unit in its file: amperes when a loop uses it, else volts.
 * Throws `input` for doubled names, samples that were not read or do not rise in time.
 */
export function convertWaveforms(file: BoardFile, samples: SamplesByFile, notes: string[]): Waveform[] {
  const waveforms = file.waveforms ?? [];
  refuseDuplicates(
    waveforms.map((waveform) => waveform.name),
    (i) => `waveforms[${i}].name`,
  );
  const inLoops = new Set((file.loops ?? []).map((loop) => loop.waveform));
  return waveforms.map((waveform, i) => {
    if (waveform.kind !== 'samples') return convertFormula(waveform);
    return convertSamples(waveform, inLoops.has(waveform.name) ? 'A' : 'V', `waveforms[${i}].file`, samples, notes);
  });
}

function convertFormula(waveform: Exclude<WaveformFile, { kind: 'samples' }>): Waveform {
  switch (waveform.kind) {
    case 'trapezoid':
      return {
        ...commonOf(waveform, waveform.lowV === undefined ? 'A' : 'V'),
        kind: 'trapezoid',
        frequencyHz: mhzToHz(waveform.frequencyMhz),
        ...edgesOf(waveform),
        dutyRatio: waveform.dutyPercent / 100,
      };
    case 'random-data':
      return {
        ...commonOf(waveform, waveform.lowV === undefined ? 'A' : 'V'),
        kind: 'random-data',
        bitRateHz: mhzToHz(waveform.bitRateMbps),
        ...edgesOf(waveform),
        sequenceBits: waveform.sequenceBits,
      };
    case 'piecewise':
      return convertPiecewise(waveform);
    case 'lines':
      return {
        ...commonOf(waveform, waveform.lines[0]!.amplitudeV === undefined ? 'A' : 'V'),
        kind: 'lines',
        lines: waveform.lines.map((line) => ({
          frequencyHz: mhzToHz(line.frequencyMhz),
          amplitude: (line.amplitudeV ?? line.amplitudeA)!,
          phaseRad: degToRad(line.phaseDeg),
        })),
      };
  }
}

const commonOf = ({ name, clockDomain }: WaveformFile, quantity: 'V' | 'A') => ({
  name,
  quantity,
  ...(clockDomain !== undefined && { clockDomain }),
});

const edgesOf = (waveform: Of<'trapezoid'> | Of<'random-data'>) => ({
  low: (waveform.lowV ?? waveform.lowA)!,
  high: (waveform.highV ?? waveform.highA)!,
  rise1090S: nsToS(waveform.riseNs),
  fall1090S: nsToS(waveform.fallNs),
});

function convertPiecewise(waveform: Of<'piecewise'>): PiecewiseWaveform {
  const points = (waveform.pointsNsV ?? waveform.pointsNsA)!;
  return {
    ...commonOf(waveform, waveform.pointsNsV === undefined ? 'A' : 'V'),
    kind: 'piecewise',
    ...onePeriod(
      points.map(([timeNs]) => nsToS(timeNs)),
      points.map(([, value]) => value),
      nsToS(waveform.periodNs),
    ),
  };
}

function convertSamples(
  waveform: Of<'samples'>,
  quantity: 'V' | 'A',
  path: string,
  samples: SamplesByFile,
  notes: string[],
): PiecewiseWaveform {
  const columns = samples.get(waveform.file);
  if (columns === undefined) {
    throw inputError(path, oneOf('a waveform file that was read', waveform.file, [...samples.keys()]), waveform.file);
  }
  const { timesS, values } = columns;
  if (timesS.length < 2 || values.length !== timesS.length) {
    throw inputError(path, 'a file with at least two rows of time and value', `${timesS.length} rows`);
  }
  const fallsAt = timesS.findIndex((timeS, i) => i > 0 && !(timeS > timesS[i - 1]!));
  if (fallsAt > 0) throw inputError(path, 'a file whose times rise', `row ${fallsAt + 1} at ${timesS[fallsAt]} s`);
  const periodS = nsToS(waveform.periodNs);
  const periods = (timesS.at(-1)! - timesS[0]!) / periodS;
  const name = describe(waveform.name);
  if (periods > 1 + SAME_TIME)
    notes.push(`Waveform ${name}: its file holds ${periods.toFixed(2)} periods, the first counts.`);
  if (periods < 0.9) {
    notes.push(
      `Waveform ${name}: its file covers ${(100 * periods).toFixed(0)} % of the period; a straight line closes it.`,
    );
  }
  return { ...commonOf(waveform, quantity), kind: 'samples', ...onePeriod(timesS, values, periodS) };
}

/** Times from 0 (the first point), all below one period: the first point follows the last. */
function onePeriod(timesS: readonly number[], values: readonly number[], periodS: number) {
  const fromStartS = timesS.map((timeS) => timeS - timesS[0]!);
  const end = fromStartS.findIndex((timeS) => timeS >= periodS * (1 - SAME_TIME));
  const count = end < 0 ? fromStartS.length : end;
  return { periodS, timesS: fromStartS.slice(0, count), values: values.slice(0, count) };
}
