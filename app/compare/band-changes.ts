import type { EstimateResult, ResultPoint } from '../estimate/result.ts';
import type { LimitLine } from '../limits/limit-line.ts';
import { type Band, BandFinder, bandsOfLines, byDetectorAndFrequency } from './bands.ts';
import type { BandChange, BandState } from './types.ts';

type Judged = Pick<EstimateResult, 'points' | 'limit'>;

/** Where a run's lines are unknown: ends of fixed bands, Hz. */
const FIXED_EDGES_HZ = [9e3, 30e6, 100e6, 300e6, 1e9, 3e9, 6e9, 18e9, 40e9, 1e12];

/**
 * Worst margins of both runs by band. Bands are the pieces of the limit lines; where the runs' lines differ, the stretches
 * between break points of either; where they are unknown, fixed ones. Bands that neither run judged are left out.
 */
export function bandChanges(
  before: Judged,
  after: Judged,
  linesBefore: readonly LimitLine[] | undefined,
  linesAfter: readonly LimitLine[] | undefined,
): BandChange[] {
  const topHz = Math.max(before.limit.maxHz, after.limit.maxHz);
  const bands = sharedBands(before, after, linesBefore, linesAfter);
  const finder = new BandFinder(bands);
  const [was, is] = [before, after].map(({ points }) => states(points, finder, bands.length)) as [
    BandState[],
    BandState[],
  ];
  const changes = bands.map(({ detector, fromHz, toHz }, i) => {
    const [one, other] = [was[i]!, is[i]!];
    return {
      detector,
      fromHz,
      toHz,
      before: one,
      after: other,
      marginChangeDb: one.worst && other.worst ? other.worst.marginDb - one.worst.marginDb : null,
    };
  });
  return changes.filter((band) => band.fromHz < topHz || band.before.lines + band.after.lines > 0);
}

function sharedBands(
  before: Judged,
  after: Judged,
  linesBefore: readonly LimitLine[] | undefined,
  linesAfter: readonly LimitLine[] | undefined,
): Band[] {
  if (!linesBefore || !linesAfter) {
    const detectors = new Set([...before.points, ...after.points].map(({ detector }) => detector));
    const fixed = [...detectors].flatMap((detector) => stretches(detector, FIXED_EDGES_HZ));
    const finder = new BandFinder(fixed);
    const used = new Set([...before.points, ...after.points].map((point) => finder.indexOf(point)));
    return fixed.filter((_, i) => used.has(i)).sort(byDetectorAndFrequency);
  }
  const [one, other] = [bandsOfLines(linesBefore), bandsOfLines(linesAfter)];
  if (sameBands(one, other)) return other;
  const both = [...one, ...other];
  return [...new Set(both.map(({ detector }) => detector))]
    .flatMap((detector) => {
      const own = both.filter((band) => band.detector === detector);
      const edges = [...new Set(own.flatMap(({ fromHz, toHz }) => [fromHz, toHz]))].sort((a, b) => a - b);
      return stretches(detector, edges).filter((piece) =>
        own.some(({ fromHz, toHz }) => fromHz <= piece.fromHz && toHz >= piece.toHz),
      );
    })
    .sort(byDetectorAndFrequency);
}

const stretches = (detector: Band['detector'], edgesHz: readonly number[]): Band[] =>
  edgesHz.slice(1).map((toHz, i) => ({ detector, fromHz: edgesHz[i]!, toHz }));

const sameBands = (one: readonly Band[], other: readonly Band[]): boolean =>
  one.length === other.length &&
  one.every(
    (band, i) =>
      band.detector === other[i]!.detector &&
      JSON.stringify(band.line!.points) === JSON.stringify(other[i]!.line!.points),
  );

/** `points` worst margin first. */
function states(points: readonly ResultPoint[], finder: BandFinder, count: number): BandState[] {
  const found = Array.from({ length: count }, () => ({ worst: null as BandState['worst'], lines: 0, over: 0 }));
  for (const point of points) {
    const state = found[finder.indexOf(point)];
    if (!state) continue;
    state.worst ??= { frequencyHz: point.frequencyHz, marginDb: point.marginDb };
    state.lines++;
    if (point.marginDb < 0) state.over++;
  }
  return found;
}
