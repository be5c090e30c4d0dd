import type { Detector } from '../../estimate/result.ts';

/** A limit line as drawn and listed: straight between its points over the logarithm of frequency; a step has two points. */
export interface ReportLimitLine {
  readonly detector: Detector;
  readonly points: readonly (readonly [frequencyHz: number, limitDbuvPerM: number])[];
  readonly label: string;
  /** The line begins strictly above its first frequency. */
  readonly startsAboveFirst?: boolean;
}

/** The part of a line between two frequencies, cut ends interpolated over log f. Empty when it lies outside. */
export function clipLine(points: ReportLimitLine['points'], fromHz: number, toHz: number): [number, number][] {
  const clipped: [number, number][] = [];
  for (let i = 0; i + 1 < points.length; i++) {
    const [startHz, startDb] = points[i]!;
    const [endHz, endDb] = points[i + 1]!;
    if (endHz < fromHz || startHz > toHz || (startHz === toHz && endHz > toHz && clipped.length > 0)) continue;
    const slope = endHz > startHz ? (endDb - startDb) / Math.log(endHz / startHz) : 0;
    const limitAt = (frequencyHz: number) => startDb + slope * Math.log(frequencyHz / startHz);
    const piece: [number, number][] = [
      startHz < fromHz ? [fromHz, limitAt(fromHz)] : [startHz, startDb],
      endHz > toHz ? [toHz, limitAt(toHz)] : [endHz, endDb],
    ];
    for (const point of piece) {
      const last = clipped.at(-1);
      if (last?.[0] !== point[0] || last[1] !== point[1]) clipped.push(point);
    }
  }
  // A line that only touches an end of the range is not part of it.
  return clipped.length < 2 ? [] : clipped;
}
