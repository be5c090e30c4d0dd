import type { LinesWaveform, Waveform } from '../board/board.ts';
import { rampsOf } from './ramps.ts';

/**
 * The waveform as a function of time, s → V or A, periodic for all t (a list of lines: the sum of its cosines, without
 * a mean). At a step the value after it. Build it once for many moments.
 */
export function waveformFunction(waveform: Waveform): (timeS: number) => number {
  if (waveform.kind === 'lines') return (timeS) => sumOfLines(waveform, timeS);
  const { periodS, startValue, ramps } = rampsOf(waveform);
  const startsS = Float64Array.from(ramps, ({ midS, durationS }) => midS - durationS / 2);
  const before = new Float64Array(ramps.length);
  for (let i = 0, level = startValue; i < ramps.length; i++) {
    before[i] = level;
    level += ramps[i]!.delta;
  }
  return (timeS) => {
    const insideS = timeS - periodS * Math.floor(timeS / periodS);
    const i = lastAtOrBefore(startsS, insideS);
    if (i < 0) return startValue;
    const { delta, durationS } = ramps[i]!;
    const share = durationS === 0 ? 1 : Math.min(1, (insideS - startsS[i]!) / durationS);
    return before[i]! + delta * share;
  };
}

/** v(t) or i(t) at one moment. */
export const waveformValueAt = (waveform: Waveform, timeS: number): number => waveformFunction(waveform)(timeS);

const sumOfLines = ({ lines }: LinesWaveform, timeS: number): number =>
  lines.reduce(
    (sum, { frequencyHz, amplitude, phaseRad }) =>
      sum + amplitude * Math.cos(2 * Math.PI * ((frequencyHz * timeS) % 1) + phaseRad),
    0,
  );

/** Index of the last entry of a rising list that is ≤ value; −1 when none is. */
function lastAtOrBefore(rising: Float64Array, value: number): number {
  let low = 0;
  let high = rising.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (rising[middle]! <= value) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}
