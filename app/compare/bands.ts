import { AppError } from '../errors.ts';
import type { Detector, EstimateResult, ResultPoint } from '../estimate/result.ts';
import { chooseLimits } from '../limits/choose.ts';
import { parseLimitFile } from '../limits/limit-file.ts';
import { type LimitCurve, type LimitLine, limitOfLine } from '../limits/limit-line.ts';
import { limitRequestOf, type RunSettings } from '../project/run-settings.ts';
import type { BandMargin } from './types.ts';

/** A stretch of the spectrum as one detector reads it, by a piece of a limit line. */
export interface Band {
  readonly detector: Detector;
  readonly fromHz: number;
  readonly toHz: number;
  /** The piece of the limit line; absent for bands that no line gives. */
  readonly line?: LimitCurve;
}

/** A limit file may hold a measured curve: a line of more pieces than this is one band. */
const MOST_PIECES = 40;
const DETECTORS: readonly Detector[] = ['quasi-peak', 'average', 'peak'];

export const byDetectorAndFrequency = (one: Band, other: Band): number =>
  DETECTORS.indexOf(one.detector) - DETECTORS.indexOf(other.detector) ||
  one.fromHz - other.fromHz ||
  one.toHz - other.toHz;

/**
 * The bands of limit lines: one for each piece of each line between two of its break points, by detector, then frequency.
 * Of two lines over the same piece the tighter one (at the geometric middle) stays.
 */
export function bandsOfLines(lines: readonly LimitCurve[]): Band[] {
  const bands = new Map<string, Band>();
  for (const line of lines) {
    const edges = [...new Set(line.points.map(([frequencyHz]) => frequencyHz))];
    const ends = edges.length - 1 > MOST_PIECES ? [edges[0]!, edges.at(-1)!] : edges;
    for (const [i, toHz] of ends.slice(1).entries()) {
      const band: Band = { detector: line.detector, fromHz: ends[i]!, toHz, line };
      const key = `${band.detector} ${band.fromHz} ${toHz}`;
      const held = bands.get(key);
      const middleHz = Math.sqrt(band.fromHz * toHz);
      if (!held || limitIn(band, middleHz) < limitIn(held, middleHz)) bands.set(key, band);
    }
  }
  return [...bands.values()].sort(byDetectorAndFrequency);
}

/** The band's limit at a frequency; +∞ where the line says nothing. */
function limitIn({ line }: Band, frequencyHz: number): number {
  return (line && limitOfLine(line, frequencyHz)) ?? Infinity;
}

/** A harmonic m·f0 is rounded, a band edge is not (the same tolerance as the limit lines use). */
const SAME_FREQUENCY = 1e-9;

const covers = ({ fromHz, toHz }: Band, frequencyHz: number): boolean =>
  frequencyHz >= fromHz * (1 - SAME_FREQUENCY) && frequencyHz <= toHz * (1 + SAME_FREQUENCY);

/** Level of a line's own piece at one of its ends, dBµV/m: at a step that of this side. */
function endLevel({ line, fromHz, toHz }: Band, end: 'from' | 'to'): number {
  const points = line!.points;
  return end === 'from'
    ? points.findLast(([frequencyHz]) => frequencyHz === fromHz)![1]
    : points.find(([frequencyHz]) => frequencyHz === toHz)![1];
}

/** The piece's limit at a frequency it covers, straight in dB over log f; a band of many pieces asks its line. */
function pieceLimit(band: Band, frequencyHz: number): number {
  if (!band.line) return 0;
  const { points } = band.line;
  const inside = points.some(([hz]) => hz > band.fromHz && hz < band.toHz);
  if (inside) return limitIn(band, frequencyHz);
  const [fromDb, toDb] = [endLevel(band, 'from'), endLevel(band, 'to')];
  const share = Math.log(frequencyHz / band.fromHz) / Math.log(band.toHz / band.fromHz);
  return fromDb + (toDb - fromDb) * Math.min(1, Math.max(0, share));
}

/** Sorts readings into bands: at an edge the tighter limit holds, as in the judgement; ties go to the lower band. */
export class BandFinder {
  readonly #byDetector = new Map<Detector, readonly number[]>();
  readonly #bands: readonly Band[];

  constructor(bands: readonly Band[]) {
    this.#bands = bands;
    for (const detector of DETECTORS) {
      this.#byDetector.set(
        detector,
        bands.flatMap((band, i) => (band.detector === detector ? [i] : [])),
      );
    }
  }

  /** Index of the band, −1 where none covers the reading. */
  indexOf({ detector, frequencyHz }: Pick<ResultPoint, 'detector' | 'frequencyHz'>): number {
    let found = -1;
    let leastDb = Infinity;
    for (const i of this.#byDetector.get(detector)!) {
      const band = this.#bands[i]!;
      if (!covers(band, frequencyHz)) continue;
      const limitDb = pieceLimit(band, frequencyHz);
      if (found >= 0 && limitDb >= leastDb) continue;
      found = i;
      leastDb = limitDb;
    }
    return found;
  }
}

/** The limit lines a run was judged by, from its settings; undefined for a standard this version does not know. */
export function limitLinesOf(settings: RunSettings): readonly LimitLine[] | undefined {
  try {
    const catalogue = settings.limitFile === undefined ? undefined : parseLimitFile(settings.limitFile);
    return chooseLimits(limitRequestOf(settings), catalogue).lines;
  } catch (error) {
    // A run of another version may name a standard that has gone: its readings still stand, only its bands are unknown.
    if (error instanceof AppError && error.code === 'input') return undefined;
    throw error;
  }
}

/**
 * Worst margin of each band; `points` worst margin first. Bands above `maxHz` were not judged and are left out; a line
 * right at `maxHz` may belong to the band that starts there.
 */
export function bandMargins(
  lines: readonly LimitCurve[],
  { points, limit }: Pick<EstimateResult, 'points' | 'limit'>,
): BandMargin[] {
  const bands = bandsOfLines(lines);
  const finder = new BandFinder(bands);
  const worst = new Map<number, BandMargin['worst']>();
  for (const point of points) {
    const index = finder.indexOf(point);
    if (index >= 0 && !worst.has(index)) {
      worst.set(index, { frequencyHz: point.frequencyHz, marginDb: point.marginDb });
    }
  }
  const margins = bands.map((band, i) => ({
    detector: band.detector,
    fromHz: band.fromHz,
    toHz: band.toHz,
    fromDbuvPerM: endLevel(band, 'from'),
    toDbuvPerM: endLevel(band, 'to'),
    worst: worst.get(i) ?? null,
  }));
  return margins.filter(({ fromHz, worst: held }) => fromHz < limit.maxHz || held !== null);
}
