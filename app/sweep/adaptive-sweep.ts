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
  readonly fromHz: number;
  readonly toHz: number;
  /** Error of the sketch that is allowed, relative to its largest component at that frequency's neighbours. */
  readonly tolerance: number;
  /** No more solutions than this; reached: `isConverged` is false. */
  readonly mostSolutions: number;
}

export interface Sweep<T> {
  readonly solvedHz: readonly number[];
  readonly isConverged: boolean;
  blendAt(frequencyHz: number): Blend<T>;
}

const FIRST_COUNT = 9;
/** The fit is made this much tighter than the sweep's tolerance. */
const FIT_SHARE = 0.1;

/**
 * Solves where needed and interpolates by a rational function with a checked error: intervals are halved until the
 * solution at an interval's middle agrees with what the fit through all others says there.
 *
 * Every sketch component is scaled by its own slowly varying size, so that small responses count as much as large ones.
 */
export function adaptiveSweep<T>(solveAt: (frequencyHz: number) => Solved<T>, options: SweepOptions): Sweep<T> {
  const { fromHz, toHz, tolerance, mostSolutions } = options;
  const samples = new Map<number, Solved<T>>();
  const add = (hz: number): Solved<T> => {
    const solved = solveAt(hz);
    samples.set(hz, solved);
    return solved;
  };
  const first = Array.from({ length: FIRST_COUNT }, (_, i) => fromHz * (toHz / fromHz) ** (i / (FIRST_COUNT - 1)));
  for (const hz of first) add(hz);
  let open = first.slice(1).map((hz, i): [number, number] => [first[i]!, hz]);
  let state = fitAll(samples, tolerance * FIT_SHARE);
  while (open.length > 0 && samples.size < mostSolutions) {
    const checked = open.slice(0, mostSolutions - samples.size).map(([low, high]) => {
      const hz = (low + high) / 2;
      const predicted = evaluateAt(state.fit, state.xs, state.scaled, hz);
      const actual = scaledBy(add(hz).sketch, state.scales);
      const isMet = distance(predicted, actual) <= tolerance * Math.max(largest(actual), largest(predicted));
      return { low, high, hz, isMet };
    });
    open = checked.flatMap(({ low, high, hz, isMet }): [number, number][] =>
      isMet
        ? []
        : [
            [low, hz],
            [hz, high],
          ],
    );
    state = fitAll(samples, tolerance * FIT_SHARE);
  }
  const { xs, fit, contents } = state;
  return {
    solvedHz: xs,
    isConverged: open.length === 0,
    blendAt: (frequencyHz) => ({
      contents: fit.support.map((i) => contents[i]!),
      factors: supportFactors(fit, xs, frequencyHz),
    }),
  };
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
  for (let i = 0; i < scales.length; i++) scales[i] = scales[i]! > 0 ? 1 / scales[i]! : 0;
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
