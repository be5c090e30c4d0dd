import type { PiecewiseWaveform, RandomDataWaveform, TrapezoidWaveform, Waveform } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { sToNs } from '../units/convert.ts';
import { registerStages } from './maximum-length.ts';
import { fullRampS } from './ramps.ts';

/** Share of the period below which two moments count as one: decimal times are not exact in binary. */
const SAME_TIME = 1e-9;

/**
 * Throws `input` unless the waveform can exist: ramps that fit into the high and the low time, a sequence of maximum
 * length, points in order within one period. `path` is the waveform's place in its file, for the message.
 */
export function checkWaveform(waveform: Waveform, path: string): void {
  switch (waveform.kind) {
    case 'trapezoid': {
      const { frequencyHz, dutyRatio } = waveform;
      requireFinite(`${path}.frequencyMhz`, 'above 0', frequencyHz > 0, frequencyHz);
      requireFinite(`${path}.dutyPercent`, 'above 0 and below 100', dutyRatio > 0 && dutyRatio < 1, dutyRatio * 100);
      checkEdges(waveform, Math.min(dutyRatio, 1 - dutyRatio) / frequencyHz, path);
      break;
    }
    case 'random-data': {
      const { bitRateHz, sequenceBits } = waveform;
      requireFinite(`${path}.bitRateMbps`, 'above 0', bitRateHz > 0, bitRateHz);
      if (registerStages(sequenceBits) === undefined) {
        throw inputError(`${path}.sequenceBits`, '2^n − 1 with n from 2 to 15 (3, 7, 15, … 32767)', sequenceBits);
      }
      checkEdges(waveform, 1 / bitRateHz, path);
      break;
    }
    case 'lines':
      for (const [i, { frequencyHz, amplitude, phaseRad }] of waveform.lines.entries()) {
        requireFinite(`${path}.lines[${i}].frequencyMhz`, 'above 0', frequencyHz > 0, frequencyHz);
        requireFinite(`${path}.lines[${i}].amplitude${waveform.quantity}`, 'a number', true, amplitude);
        requireFinite(`${path}.lines[${i}].phaseDeg`, 'a number', true, phaseRad);
      }
      break;
    default:
      checkPoints(waveform, path);
  }
}

/**
 * Both ramps reach half their time into the plateau between two 50 % crossings, so (rise + fall)/2, from 0 to 100 %,
 * must not exceed the shorter of high and low time (for data: one bit).
 */
function checkEdges(waveform: TrapezoidWaveform | RandomDataWaveform, shortestS: number, path: string): void {
  const { low, high, rise1090S, fall1090S, quantity } = waveform;
  requireFinite(`${path}.low${quantity}`, 'a number', true, low);
  requireFinite(`${path}.high${quantity}`, `at least low${quantity} (${low})`, high >= low, high);
  requireFinite(`${path}.riseNs`, 'at least 0', rise1090S >= 0, sToNs(rise1090S));
  requireFinite(`${path}.fallNs`, 'at least 0', fall1090S >= 0, sToNs(fall1090S));
  const rampsS = fullRampS(rise1090S) + fullRampS(fall1090S);
  if (rampsS / 2 <= shortestS * (1 + SAME_TIME)) return;
  const plateau = waveform.kind === 'random-data' ? 'one bit' : 'the shorter of high and low time at 50 %';
  throw inputError(
    `${path}.riseNs`,
    `such that (riseNs + fallNs)/1.6 fits into ${plateau} (${sToNs(shortestS)} ns)`,
    sToNs(rampsS / 2),
  );
}

function checkPoints({ kind, periodS, timesS, values, quantity }: PiecewiseWaveform, path: string): void {
  const points = kind === 'samples' ? `${path}.file` : `${path}.pointsNs${quantity}`;
  requireFinite(`${path}.periodNs`, 'above 0', periodS > 0, sToNs(periodS));
  if (timesS.length < 2 || timesS.length !== values.length) {
    throw inputError(points, 'at least 2 points of time and value', `${timesS.length} times, ${values.length} values`);
  }
  for (const [i, timeS] of timesS.entries()) {
    const isInOrder = i === 0 || timeS >= timesS[i - 1]!;
    requireFinite(`${points}, time of point ${i + 1}`, 'not before the point ahead of it', isInOrder, timeS);
    requireFinite(`${points}, value of point ${i + 1}`, 'a number', true, values[i]!);
  }
  const spanS = timesS.at(-1)! - timesS[0]!;
  if (spanS > periodS * (1 + SAME_TIME)) {
    throw inputError(
      `${path}.periodNs`,
      `at least the time from first to last point (${sToNs(spanS)} ns)`,
      sToNs(periodS),
    );
  }
}

function requireFinite(path: string, must: string, holds: boolean, received: number): void {
  if (!holds || !Number.isFinite(received))
    throw inputError(path, must, Number.isFinite(received) ? received : String(received));
}
