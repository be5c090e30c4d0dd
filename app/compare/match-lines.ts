import type { Detector, ResultPoint } from '../estimate/result.ts';

/** A line of either run, or of both. */
export interface LinePair {
  readonly frequencyHz: number;
  readonly detector: Detector;
  readonly before: ResultPoint | undefined;
  readonly after: ResultPoint | undefined;
}

/**
 * Relative distance below which two lines are one. A harmonic m·f0, with f0 from a period or in MHz, is right to a few
 * times 2⁻⁵² (2e-16); 1e-9 leaves room for sums and is 1 Hz at 1 GHz, far below a receiver's 120 kHz.
 */
const SAME_FREQUENCY = 1e-9;

/** Pairs the readings of two runs by detector and frequency, in order of detector, then frequency. */
export function matchLines(before: readonly ResultPoint[], after: readonly ResultPoint[]): LinePair[] {
  const detectors = [...new Set([...before, ...after].map(({ detector }) => detector))];
  return detectors.flatMap((detector) => {
    const [one, other] = [ofDetector(before, detector), ofDetector(after, detector)];
    const pairs: LinePair[] = [];
    let [i, j] = [0, 0];
    while (i < one.length || j < other.length) {
      const [left, right] = [one[i], other[j]];
      const order = left && right ? distance(left, right) : left ? -1 : 1;
      const isOne = Math.abs(order) <= SAME_FREQUENCY;
      const first = isOne || order < 0 ? left : undefined;
      const second = isOne || order > 0 ? right : undefined;
      if (first) i++;
      if (second) j++;
      pairs.push({ frequencyHz: (second ?? first)!.frequencyHz, detector, before: first, after: second });
    }
    return pairs;
  });
}

const distance = (one: ResultPoint, other: ResultPoint): number =>
  (one.frequencyHz - other.frequencyHz) / Math.max(one.frequencyHz, other.frequencyHz);

const ofDetector = (points: readonly ResultPoint[], wanted: Detector): ResultPoint[] =>
  points.filter(({ detector }) => detector === wanted).sort((one, other) => one.frequencyHz - other.frequencyHz);
