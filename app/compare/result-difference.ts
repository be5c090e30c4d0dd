import type { EstimateResult, ResultPoint } from '../estimate/result.ts';
import { canonicalJson } from '../project/exact-json.ts';

/** How a result computed again differs from a stored one. */
export interface ResultDifference {
  /** Every number and text is the same, but for the program's version. */
  readonly isIdentical: boolean;
  readonly pointCount: number;
  /** Largest change of a level; null when no reading is in both. */
  readonly largestDb: number | null;
  readonly largestAtHz: number | null;
  /** Readings (frequency and detector) of one side only. */
  readonly onlyStored: number;
  readonly onlyNew: number;
  /** Other parts of the result that are not equal: "caveats", "limit" … */
  readonly otherKeys: readonly string[];
}

/** Compares what the same inputs gave at two times. Levels by frequency and detector; everything else for equality. */
export function compareResults(stored: EstimateResult, fresh: EstimateResult): ResultDifference {
  const storedPoints = byReading(stored.points);
  const freshPoints = byReading(fresh.points);
  let largestDb: number | null = null;
  let largestAtHz: number | null = null;
  for (const [key, point] of storedPoints) {
    const other = freshPoints.get(key);
    if (other === undefined) continue;
    const changeDb = Math.abs(other.levelDbuvPerM - point.levelDbuvPerM);
    if (largestDb !== null && changeDb <= largestDb) continue;
    largestDb = changeDb;
    largestAtHz = point.frequencyHz;
  }
  const keys = new Set([...Object.keys(stored), ...Object.keys(fresh)]) as Set<keyof EstimateResult>;
  const different = [...keys].filter((key) => key !== 'program' && !isSame(stored[key], fresh[key]));
  return {
    isIdentical: different.length === 0,
    pointCount: fresh.points.length,
    largestDb,
    largestAtHz,
    onlyStored: countMissing(storedPoints, freshPoints),
    onlyNew: countMissing(freshPoints, storedPoints),
    otherKeys: different.filter((key) => key !== 'points'),
  };
}

const byReading = (points: readonly ResultPoint[]): Map<string, ResultPoint> =>
  new Map(points.map((point) => [`${point.frequencyHz} ${point.detector}`, point]));

const countMissing = (of: ReadonlyMap<string, unknown>, other: ReadonlyMap<string, unknown>): number =>
  [...of.keys()].filter((key) => !other.has(key)).length;

/** Numbers bit for bit; the order of keys does not count. */
const isSame = (a: unknown, b: unknown): boolean =>
  a === b || (a !== undefined && b !== undefined && canonicalJson(a) === canonicalJson(b));
