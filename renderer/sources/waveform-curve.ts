import type { Waveform } from '../../app/board/board.ts';
import { fundamentalHz } from '../../app/sources/clock.ts';
import { spectrumOf } from '../../app/sources/spectrum.ts';
import { waveformFunction } from '../../app/sources/waveform-value.ts';
import { rmsToMicroDb } from '../../app/units/convert.ts';

export interface Curve {
  readonly x: number;
  readonly y: number;
}

const TIME_POINTS = 600;
/** Bits of random data, periods of everything else. */
const SHOWN_PERIODS = 2;
const SHOWN_BITS = 16;
const HIGHEST_HZ = 1e9;
const MOST_LINES = 4000;
/** Lines further below the strongest do not matter: rounding leaves such ones at the zeros of a spectrum. */
const DEEPEST_DB = 120;

/** The waveform over two periods (sixteen bits), s and V or A. */
export function timeCurve(waveform: Waveform): Curve[] {
  const base = fundamentalHz(waveform);
  if (!(base > 0)) return [];
  const spanS = (waveform.kind === 'random-data' ? SHOWN_BITS : SHOWN_PERIODS) / base;
  const at = waveformFunction(waveform);
  return Array.from({ length: TIME_POINTS + 1 }, (_, i) => {
    const timeS = (i / TIME_POINTS) * spanS;
    return { x: timeS, y: at(timeS) };
  });
}

/** Its lines up to 1 GHz: Hz and dB above 1 µV (1 µA), rms. */
export function lineCurve(waveform: Waveform): Curve[] {
  const base = fundamentalHz(waveform);
  if (!(base > 0)) return [];
  const { frequenciesHz, phasors } = spectrumOf(waveform, base * 0.5, Math.max(HIGHEST_HZ, 10 * base));
  const lines: Curve[] = [];
  for (let i = 0; i < Math.min(frequenciesHz.length, MOST_LINES); i++) {
    const peak = Math.hypot(phasors[2 * i]!, phasors[2 * i + 1]!);
    if (peak > 0) lines.push({ x: frequenciesHz[i]!, y: rmsToMicroDb(peak / Math.SQRT2) });
  }
  const strongest = lines.reduce((level, { y }) => Math.max(level, y), -Infinity);
  return lines.filter(({ y }) => y >= strongest - DEEPEST_DB);
}
