import type { Cable, Point3M, Waveform } from '../board/board.ts';
import { mToMm } from '../units/convert.ts';
import { fixed, frequencyText, mmText, quantityText, trimmed } from './format.ts';

/** Sources of a board in the trade's words. */

export function waveformText(waveform: Waveform): string {
  const amount = (value: number) => quantityText(value, waveform.quantity);
  switch (waveform.kind) {
    case 'trapezoid':
      return `trapezoid ${frequencyText(waveform.frequencyHz)}, ${amount(waveform.low)} to ${amount(waveform.high)}, duty ${trimmed(100 * waveform.dutyRatio, 2)} %, ${edgesText(waveform)}`;
    case 'random-data':
      return `random data ${quantityText(waveform.bitRateHz, 'bit/s')}, ${amount(waveform.low)} to ${amount(waveform.high)}, ${edgesText(waveform)}, sequence of ${waveform.sequenceBits} bits`;
    case 'piecewise':
    case 'samples': {
      const [low, high] = rangeOf(waveform.values);
      const kind = waveform.kind === 'samples' ? 'sampled' : 'piecewise linear';
      return `${kind}, ${waveform.values.length} points, period ${quantityText(waveform.periodS, 's')}, ${amount(low)} to ${amount(high)}`;
    }
    case 'lines': {
      const [low, high] = rangeOf(waveform.lines.map(({ frequencyHz }) => frequencyHz));
      return `${waveform.lines.length} listed lines, ${frequencyText(low)} to ${frequencyText(high)}`;
    }
  }
}

const edgesText = ({ rise1090S, fall1090S }: { rise1090S: number; fall1090S: number }): string =>
  `rise ${quantityText(rise1090S, 's')}, fall ${quantityText(fall1090S, 's')} (10–90 %)`;

const rangeOf = (values: readonly number[]): [low: number, high: number] =>
  values.reduce<[number, number]>(
    ([low, high], value) => [Math.min(low, value), Math.max(high, value)],
    [Infinity, -Infinity],
  );

/** Length of an open or closed chain of points, m. */
export function chainLengthM(pointsM: readonly Point3M[], isClosed: boolean): number {
  let lengthM = 0;
  for (let i = isClosed ? 0 : 1; i < pointsM.length; i++) {
    const from = pointsM.at(i - 1)!;
    const to = pointsM[i]!;
    lengthM += Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);
  }
  return lengthM;
}

export function farEndText(farEnd: Cable['farEnd']): string {
  if (typeof farEnd === 'object') return `${quantityText(farEnd.resistanceOhm, 'Ω')} to ground`;
  return farEnd === 'open' ? 'open' : 'joined to ground';
}

/** What sits at the connector. */
export function seriesText({ seriesOhm, seriesImpedance }: Cable): string {
  if (!seriesImpedance || seriesImpedance.length === 0) return quantityText(seriesOhm, 'Ω');
  const [low, high] = rangeOf(seriesImpedance.map(({ frequencyHz }) => frequencyHz));
  return `table of ${seriesImpedance.length}, ${frequencyText(low)} to ${frequencyText(high)}`;
}

export function commonModeText({ commonModeRms }: Cable): string {
  if (!commonModeRms) return 'not stated';
  const amount = (row: { frequencyHz: number; currentRmsA: number }) =>
    `${quantityText(row.currentRmsA, 'A')} at ${frequencyText(row.frequencyHz)}`;
  const first = commonModeRms[0]!;
  const last = commonModeRms.at(-1)!;
  return commonModeRms.length === 1 ? `${amount(first)} rms` : `${amount(first)} to ${amount(last)}, rms`;
}

/** A loop's size: "9 × 6 × 0 mm box, 30 mm around". */
export function loopText(pointsM: readonly Point3M[]): string {
  const sides = [0, 1, 2].map((axis) => {
    const [low, high] = rangeOf(pointsM.map((point) => point[axis]!));
    return trimmed(mToMm(high - low), 2);
  });
  return `${sides.join(' × ')} mm, ${mmText(chainLengthM(pointsM, true), 1)} around`;
}

export const cableLengthText = (pointsM: readonly Point3M[]): string => `${fixed(chainLengthM(pointsM, false), 2)} m`;
