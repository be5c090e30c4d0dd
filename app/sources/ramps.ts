import type { PiecewiseWaveform, RandomDataWaveform, TrapezoidWaveform } from '../board/board.ts';
import { maximumLengthBits } from './maximum-length.ts';

/** One linear change of level, centred at `midS`; a step when `durationS` is 0. */
export interface Ramp {
  readonly delta: number;
  readonly midS: number;
  readonly durationS: number;
}

/** One period of a waveform made of ramps and flat parts: every kind but a list of lines. */
export interface RampTrain {
  readonly periodS: number;
  /** Level just before the first ramp. */
  readonly startValue: number;
  /** In order of time, none overlapping; the changes of level add up to zero over the period. */
  readonly ramps: readonly Ramp[];
}

/** A linear ramp spends 0.8 of its time between its 10 % and 90 % levels (definition). */
const RAMP_SHARE_1090 = 0.8;

/** Duration from 0 to 100 % of a linear ramp given by its 10–90 % time, s. */
export const fullRampS = (ramp1090S: number): number => ramp1090S / RAMP_SHARE_1090;

/** The ramps of one period. The waveform must be physically consistent (`checkWaveform`). */
export function rampsOf(waveform: TrapezoidWaveform | RandomDataWaveform | PiecewiseWaveform): RampTrain {
  switch (waveform.kind) {
    case 'trapezoid':
      return trapezoidRamps(waveform);
    case 'random-data':
      return dataRamps(waveform);
    default:
      return piecewiseRamps(waveform);
  }
}

/** t = 0 is the start of the rise; from 50 % crossing to 50 % crossing the pulse lasts dutyRatio of the period. */
function trapezoidRamps({ frequencyHz, low, high, dutyRatio, rise1090S, fall1090S }: TrapezoidWaveform): RampTrain {
  const periodS = 1 / frequencyHz;
  const riseS = fullRampS(rise1090S);
  return {
    periodS,
    startValue: low,
    ramps: [
      { delta: high - low, midS: riseS / 2, durationS: riseS },
      { delta: low - high, midS: riseS / 2 + dutyRatio * periodS, durationS: fullRampS(fall1090S) },
    ],
  };
}

/**
 * t = 0 is the start of the rise into bit 0 (the sequence begins with a one and ends in a zero). The 50 % crossings of
 * rises and falls lie on one grid, whole bit times apart, so unequal ramps do not change the width of a bit.
 */
function dataRamps({ bitRateHz, low, high, rise1090S, fall1090S, sequenceBits }: RandomDataWaveform): RampTrain {
  const bits = maximumLengthBits(sequenceBits);
  const riseS = fullRampS(rise1090S);
  const fallS = fullRampS(fall1090S);
  const ramps: Ramp[] = [];
  for (let k = 0; k < sequenceBits; k++) {
    const change = bits[k]! - bits[(k + sequenceBits - 1) % sequenceBits]!;
    if (change === 0) continue;
    ramps.push({
      delta: change * (high - low),
      midS: riseS / 2 + k / bitRateHz,
      durationS: change > 0 ? riseS : fallS,
    });
  }
  return { periodS: sequenceBits / bitRateHz, startValue: low, ramps };
}

/** t = 0 is the first point; the last point is joined to the first one of the next period. Equal times are a step. */
function piecewiseRamps({ periodS, timesS, values }: PiecewiseWaveform): RampTrain {
  const ramps: Ramp[] = [];
  const count = timesS.length;
  const firstS = timesS[0]!;
  for (let i = 0; i < count; i++) {
    const isLast = i === count - 1;
    const delta = (isLast ? values[0]! : values[i + 1]!) - values[i]!;
    if (delta === 0) continue;
    const fromS = timesS[i]! - firstS;
    const toS = isLast ? Math.max(periodS, fromS) : timesS[i + 1]! - firstS;
    ramps.push({ delta, midS: (fromS + toS) / 2, durationS: toS - fromS });
  }
  return { periodS, startValue: values[0]!, ramps };
}
