import { z } from 'zod';
import { parseWith } from '../schema/parse-with.ts';

/** The field job: given current elements, given points; SI, phasors are peak values, e^(+jωt). */

/** Beyond these the sums over- or underflow; no job of this kind needs them. */
const FARTHEST_M = 1e5;
const MOST_A = 1e9;
const LOWEST_HZ = 1;
const HIGHEST_HZ = 1e12;

const coordinateM = z.number().min(-FARTHEST_M).max(FARTHEST_M);
const point = z.tuple([coordinateM, coordinateM, coordinateM]);
const partA = z.number().min(-MOST_A).max(MOST_A);
/** Real and imaginary part. */
const complex = z.tuple([partA, partA]);

const element = z.strictObject({
  fromM: point,
  toM: point,
  /** Current at `fromM`, A, from `fromM` to `toM`. */
  currentA: complex,
  /** Current at `toM`, linear between; absent: the same as `currentA`. */
  currentEndA: complex.optional(),
});

const isSamePoint = (a: readonly number[], b: readonly number[]) => a.every((value, axis) => value === b[axis]);

export const fieldJobSchema = z
  .strictObject({
    format: z.literal('quietboard-field'),
    version: z.literal(1),
    frequenciesHz: z.array(z.number().min(LOWEST_HZ).max(HIGHEST_HZ)).min(1).max(100_000),
    /** `perfect`: reflection at z = 0, everything at z ≥ 0. */
    ground: z.enum(['perfect', 'none']),
    elements: z.array(element).min(1).max(1_000_000),
    observersM: z.array(point).min(1).max(1_000_000),
  })
  .superRefine((job, context) => {
    const complain = (path: (string | number)[], message: string) =>
      context.addIssue({ code: 'custom', path, message });
    const requireAbove = (place: readonly number[], path: (string | number)[]) => {
      if (job.ground === 'perfect' && place[2]! < 0) complain([...path, 2], 'at least 0, above the perfect ground');
    };
    for (const [i, { fromM, toM }] of job.elements.entries()) {
      if (isSamePoint(fromM, toM)) complain(['elements', i, 'toM'], 'another point than fromM');
      requireAbove(fromM, ['elements', i, 'fromM']);
      requireAbove(toM, ['elements', i, 'toM']);
    }
    for (const [i, observer] of job.observersM.entries()) requireAbove(observer, ['observersM', i]);
  });

export type FieldJob = z.output<typeof fieldJobSchema>;

/** A field job's JSON, checked. Throws `input`: path in the file, what must be, what came. */
export const parseFieldJob = (json: unknown): FieldJob => parseWith(fieldJobSchema, json);

type Complex = readonly [re: number, im: number];
/** x, y, z components. */
type ComplexVector = readonly [Complex, Complex, Complex];

export interface FieldResult {
  readonly format: 'quietboard-field-result';
  readonly version: 1;
  readonly fields: readonly {
    readonly frequencyHz: number;
    /** In the order of the job's `observersM`. */
    readonly observers: readonly { readonly electricVPerM: ComplexVector; readonly magneticAPerM: ComplexVector }[];
  }[];
}
