import type { Detector } from '../estimate/result.ts';

/** 'seen': the number was read in the source; 'from memory': recalled, to be compared with the bought standard. */
export type LimitStatus = 'seen' | 'from memory' | 'user file';

/** One limit line: one class, distance and detector of one standard. */
export interface LimitLine {
  readonly standard: string;
  readonly aliases: readonly string[];
  /** NO_CLASS where the standard has no classes. */
  readonly class: string;
  /** Other names of the class, for example "A" for its usual variant. */
  readonly classAliases?: readonly string[];
  readonly distanceM: number;
  readonly detector: Detector;
  readonly edition: string;
  readonly source: string;
  readonly sourceStatus: LimitStatus;
  /** Rising frequencies, Hz, and levels, dBµV/m; straight in dB over log frequency; a step is two points at one frequency. */
  readonly points: readonly (readonly [frequencyHz: number, limitDbuvPerM: number])[];
  /** Where the standard measures against it: over a ground plane, or in a room without reflections. */
  readonly siteKind: 'ground-plane' | 'free-space';
  /** The line begins strictly above its first frequency (FCC: quasi-peak counts at 1000 MHz exactly). */
  readonly startsAboveFirst?: boolean;
  /** The standard's own step between 3 m and 10 m, dB, where it is not 20·log10(10/3). */
  readonly threeToTenMetresDb?: number;
}

/** The course of a limit line alone. */
export type LimitCurve = Pick<LimitLine, 'detector' | 'points' | 'startsAboveFirst'>;

export const NO_CLASS = 'none';

/** Relative distance below which two frequencies are one: a harmonic m·f0 is rounded, a band edge is not. */
const SAME_FREQUENCY = 1e-9;

/**
 * The limit at a frequency, dBµV/m; undefined outside the line. At a step the lower of both values holds (FCC 15.109(c)
 * and 15.209(b) in words; CISPR as laboratories practise it). Ends belong to the line unless `startsAboveFirst`.
 */
export function limitOfLine({ points, startsAboveFirst }: LimitCurve, frequencyHz: number): number | undefined {
  const above = (edgeHz: number) => frequencyHz > edgeHz * (1 + SAME_FREQUENCY);
  const below = (edgeHz: number) => frequencyHz < edgeHz * (1 - SAME_FREQUENCY);
  if (startsAboveFirst === true && !above(points[0]![0])) return undefined;
  let lowest: number | undefined;
  for (let i = 1; i < points.length; i++) {
    const [[fromHz, fromDb], [toHz, toDb]] = [points[i - 1]!, points[i]!];
    if (below(fromHz) || above(toHz)) continue;
    const levelDb = between(fromHz, fromDb, toHz, toDb, frequencyHz);
    if (lowest === undefined || levelDb < lowest) lowest = levelDb;
  }
  return lowest;
}

/** Both ends of a step, or of a flat part, come out exactly. */
function between(fromHz: number, fromDb: number, toHz: number, toDb: number, frequencyHz: number): number {
  if (fromDb === toDb) return fromDb;
  if (fromHz === toHz) return Math.min(fromDb, toDb);
  const share = Math.log(frequencyHz / fromHz) / Math.log(toHz / fromHz);
  return fromDb + (toDb - fromDb) * Math.min(1, Math.max(0, share));
}

/** First and last frequency of a line, Hz. */
export const rangeOf = ({ points }: LimitLine): readonly [fromHz: number, toHz: number] => [
  points[0]![0],
  points.at(-1)![0],
];

/** Names compare without case, spaces and punctuation: "EN55032" is "EN 55032", "fcc part 15" is "FCC Part 15". */
export const plainName = (name: string): string => name.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');

/** Is `name` the standard of this line, or one of its aliases? */
export const isStandard = (line: LimitLine, name: string): boolean =>
  [line.standard, ...line.aliases].some((known) => plainName(known) === plainName(name));
