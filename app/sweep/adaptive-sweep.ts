import { distance, evaluateAt, fitRational, largest, type RationalFit, supportFactors } from './aaa.ts';

/** What is solved at one frequency: anything, with a short complex vector that stands for it in the fit. */
export interface Solved<T> {
  readonly content: T;
  /** Complex pairs; the same length at every frequency. */
  readonly sketch: Float64Array;
}

/** Contents at the support frequencies with the factor of each (complex pairs) for one wanted frequency. */
export interface Blend<T> {
  readonly contents: readonly T[];
  readonly factors: Float64Array;
}

export interface SweepOptions {
  /** Frequencies to be served, ascending, at least one: solutions are taken at some of them. */
  readonly frequenciesHz: readonly number[];
  /** Error of the sketch that is allowed, relative to its largest component there. */
  readonly tolerance: number;
  /** No more solutions than this; reached before the fit is good: `isConverged` is false. */
  readonly mostSolutions: number;
}

export interface Sweep<T> {
  readonly solvedHz: readonly number[];
  readonly isConverged: boolean;
  blendAt(frequencyHz: number): Blend<T>;
}

const FIRST_COUNT = 7;
/** Solutions in a row that must agree with what the fit said before. */
const CHECKS = 3;
/** Every so many solutions the widest gap gets one, however sure the fit is. */
const GAP_EVERY = 3;
/** Two fits are compared at this many frequencies at most. */
const MOST_COMPARED = 200;
/** The fit is made this much tighter than the sweep's tolerance. */
const FIT_SHARE = 0.2;
/** Components weaker than this, relative to the strongest (mean sizes), are rounding. */
const NEGLIGIBLE = 1e-4;

/**
 * Solves where needed and interpolates by a rational function with a checked error: the next solution is taken where the last two
 * fits differ most, in turn with the middle of the widest gap, until three in a row were foretold and the fits agree
 * everywhere. Served frequencies few enough are all solved.
 *
 * Every sketch component is scaled by its mean size, so that small responses count as much as large ones.
 */
export function adaptiveSweep<T>(solveAt: (frequencyHz: number) => Solved<T>, options: SweepOptions): Sweep<T> {
  const { frequenciesHz, tolerance } = options;
  const most = Math.min(options.mostSolutions, frequenciesHz.length);
  const samples = new Map<number, Solved<T>>();
  for (const hz of spread(frequenciesHz, Math.min(FIRST_COUNT, most))) samples.set(hz, solveAt(hz));
  const compared = spread(frequenciesHz, MOST_COMPARED);
  let state = fitAll(samples, tolerance * FIT_SHARE);
  let before: FitState<T> | null = null;
  let foretold = 0;
  let isConverged = false;
  while (samples.size < most) {
    const doubt = before ? greatestDoubt(state, before, compared) : null;
    if (doubt && doubt.error <= tolerance && foretold >= CHECKS) {
      isConverged = true;
      break;
    }
    const isGapsTurn = samples.size % GAP_EVERY === 0 || !doubt || doubt.error <= tolerance;
    const hz = isGapsTurn ? middleOfWidestGap(frequenciesHz, state.xs) : doubt.hz;
    const solved = solveAt(hz);
    foretold = errorOf(predictionAt(state, hz), scaledBy(solved.sketch, state.scales)) <= tolerance ? foretold + 1 : 0;
    samples.set(hz, solved);
    before = state;
    state = fitAll(samples, tolerance * FIT_SHARE);
  }
  const { xs, fit, contents } = state;
  const isExact = samples.size === frequenciesHz.length;
  return {
    solvedHz: xs,
    isConverged: isConverged || isExact,
    blendAt: (frequencyHz) => {
      const own = samples.get(frequencyHz);
      if (own) return { contents: [own.content], factors: Float64Array.of(1, 0) };
      return { contents: fit.support.map((i) => contents[i]!), factors: supportFactors(fit, xs, frequencyHz) };
    },
  };
}

/** About `count` of the frequencies, the ends among them, about equally spaced in ratio. */
function spread(frequenciesHz: readonly number[], count: number): number[] {
  if (frequenciesHz.length <= count) return [...frequenciesHz];
  const first = frequenciesHz[0]!;
  const ratio = frequenciesHz.at(-1)! / first;
  const chosen = new Set<number>();
  let at = 0;
  for (let i = 0; i < count; i++) {
    const wanted = first * ratio ** (i / (count - 1));
    while (at < frequenciesHz.length - 1 && frequenciesHz[at]! < wanted * (1 - 1e-12)) at++;
    chosen.add(frequenciesHz[at]!);
  }
  return [...chosen];
}

/** The frequency not yet solved that is nearest to the middle of the widest gap (in ratio) that still holds one. */
function middleOfWidestGap(frequenciesHz: readonly number[], solvedHz: readonly number[]): number {
  let widest = 0;
  let best = frequenciesHz[0]!;
  let at = 0;
  for (let gap = 1; gap < solvedHz.length; gap++) {
    const low = solvedHz[gap - 1]!;
    const high = solvedHz[gap]!;
    const inside: number[] = [];
    for (; at < frequenciesHz.length && frequenciesHz[at]! <= high; at++) {
      if (frequenciesHz[at]! > low && frequenciesHz[at]! < high) inside.push(frequenciesHz[at]!);
    }
    if (inside.length === 0 || high / low <= widest) continue;
    widest = high / low;
    const middle = (low + high) / 2;
    best = inside.reduce((near, hz) => (Math.abs(hz - middle) < Math.abs(near - middle) ? hz : near));
  }
  return best;
}

interface FitState<T> {
  readonly xs: readonly number[];
  readonly scaled: readonly Float64Array[];
  readonly scales: Float64Array;
  readonly contents: readonly T[];
  readonly fit: RationalFit;
}

function fitAll<T>(samples: ReadonlyMap<number, Solved<T>>, tolerance: number): FitState<T> {
  const xs = [...samples.keys()].sort((a, b) => a - b);
  const sketches = xs.map((hz) => samples.get(hz)!.sketch);
  const scales = new Float64Array(sketches[0]!.length / 2);
  for (const sketch of sketches) {
    for (let i = 0; i < scales.length; i++)
      scales[i]! += Math.hypot(sketch[2 * i]!, sketch[2 * i + 1]!) / sketches.length;
  }
  const least = NEGLIGIBLE * scales.reduce((most, scale) => Math.max(most, scale), 0);
  for (let i = 0; i < scales.length; i++) scales[i] = scales[i]! > least ? 1 / scales[i]! : 0;
  const scaled = sketches.map((sketch) => scaledBy(sketch, scales));
  return {
    xs,
    scaled,
    scales,
    contents: xs.map((hz) => samples.get(hz)!.content),
    fit: fitRational(xs, scaled, tolerance),
  };
}

const scaledBy = (sketch: Float64Array, scales: Float64Array): Float64Array =>
  sketch.map((value, i) => value * scales[i >> 1]!);

const predictionAt = <T>({ fit, xs, scaled }: FitState<T>, hz: number): Float64Array => evaluateAt(fit, xs, scaled, hz);

/** Largest difference of two scaled sketches, relative to the largest component of either. */
function errorOf(one: Float64Array, other: Float64Array): number {
  const size = Math.max(largest(one), largest(other));
  return size > 0 ? distance(one, other) / size : 0;
}

/** Where two fits differ most, of the frequencies not solved; null when all are. */
function greatestDoubt<T>(
  state: FitState<T>,
  before: FitState<T>,
  frequenciesHz: readonly number[],
): { readonly hz: number; readonly error: number } | null {
  const toScale = before.scales.map((scale, i) => (scale > 0 ? state.scales[i]! / scale : 0));
  const solvedHz = new Set(state.xs);
  let found: { hz: number; error: number } | null = null;
  for (const hz of frequenciesHz) {
    if (solvedHz.has(hz)) continue;
    const error = errorOf(predictionAt(state, hz), scaledBy(predictionAt(before, hz), toScale));
    if (!found || error > found.error) found = { hz, error };
  }
  return found;
}
