import { z } from 'zod';

/** Schema of a trend's JSON, and of what is kept with a run for it; a test keeps them equal to the types of `types.ts`. */

const number = z.number();
const text = z.string();
const detector = z.enum(['quasi-peak', 'average', 'peak']);
const worst = z.strictObject({ frequencyHz: number, marginDb: number }).nullable();

const stepShape = {
  changeDb: number.nullable(),
  direction: z.enum(['first', 'better', 'worse', 'unchanged', 'unknown']),
  text,
};

const setup = z.strictObject({
  standard: text,
  class: text,
  distanceM: number,
  measuredFrom: z.enum(['boundary', 'center']),
  site: z.enum(['ground-plane', 'free-space']),
  orientation: z.enum(['flat', 'upright']),
  structure: z.enum(['solved', 'pair-only']),
});

const bandMargin = z.strictObject({
  detector,
  fromHz: number,
  toHz: number,
  fromDbuvPerM: number,
  toDbuvPerM: number,
  worst,
});

/** What a database keeps with a run so that a trend needs no results. */
export const trendPartSchema = z.strictObject({ setup, bands: z.array(bandMargin) });

const point = z.strictObject({
  ...stepShape,
  revision: text,
  run: z.int(),
  startedAt: text,
  runCount: z.int().positive(),
  programVersion: text,
  isOtherProgram: z.boolean(),
  worst,
  requiredMarginDb: number,
  verdict: z.enum(['meets', 'exceeds', 'falls-short', 'within-uncertainty']),
});

export const trendSchema = z.strictObject({
  format: z.literal('quietboard-trend'),
  version: z.literal(1),
  groups: z.array(
    z.strictObject({
      board: text,
      setup,
      limit: text,
      requiredMarginDb: number,
      points: z.array(point),
      bands: z.array(
        z.strictObject({
          detector,
          fromHz: number,
          toHz: number,
          steps: z.array(z.strictObject({ ...stepShape, worst })),
        }),
      ),
      headline: text,
    }),
  ),
});
