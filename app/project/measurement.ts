import { z } from 'zod';

/** Field strengths read off an instrument, to be set beside the estimates of a revision. */
export const measurementInputSchema = z.strictObject({
  name: z.string().min(1).max(200),
  /** Revision of the board that was measured; empty when it is not known. */
  revision: z.string().max(1000),
  /** Where the numbers come from: laboratory, report, file. */
  source: z.string().max(2000),
  points: z
    .array(
      z.strictObject({
        frequencyHz: z.number().positive(),
        levelDbuvPerM: z.number(),
        detector: z.enum(['quasi-peak', 'average', 'peak']),
        polarization: z.enum(['horizontal', 'vertical']).optional(),
      }),
    )
    .min(1)
    .max(1_000_000),
});

/** `id` counts from 1 in a project and is never given twice. */
export const measurementSchema = measurementInputSchema.extend({ id: z.number().int().positive() });

export type MeasurementInput = z.output<typeof measurementInputSchema>;
export type Measurement = z.output<typeof measurementSchema>;
