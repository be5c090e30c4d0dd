import { z } from 'zod';
import { inputError } from '../errors.ts';
import { parseWith } from '../schema/parse-with.ts';
import { mhzToHz } from '../units/convert.ts';
import { type LimitLine, NO_CLASS, plainName } from './limit-line.ts';

const name = z.string().min(1).max(200);

const limitFileSchema = z.strictObject({
  format: z.literal('quietboard-limits'),
  version: z.literal(1),
  notes: z.string().optional(),
  lines: z
    .array(
      z.strictObject({
        standard: name,
        aliases: z.array(name).max(50).default([]),
        class: name.default(NO_CLASS),
        distanceM: z.number().positive(),
        detector: z.enum(['quasi-peak', 'average', 'peak']),
        siteKind: z.enum(['ground-plane', 'free-space']).default('ground-plane'),
        edition: z.string().max(200).default(''),
        source: z.string().max(1000).default('limit file'),
        pointsMhzDbuvPerM: z
          .array(z.tuple([z.number().positive(), z.number()]))
          .min(2)
          .max(10_000),
      }),
    )
    .min(1)
    .max(1000),
});

/**
 * A user's own limit lines from a file's JSON:
 *
 *   { "format": "quietboard-limits", "version": 1,
 *     "lines": [{ "standard": "House rule", "aliases": ["HR"], "class": "B", "distanceM": 3, "detector": "quasi-peak",
 *                 "siteKind": "ground-plane", "edition": "2", "source": "internal document",
 *                 "pointsMhzDbuvPerM": [[30, 34], [230, 34], [230, 41], [1000, 41]] }] }
 *
 * Points rise in frequency and are joined by straight lines in dB over log frequency; a step is two points at one
 * frequency, where the lower value holds. Optional: aliases, class (absent: the standard has none), siteKind
 * ("ground-plane"), edition, source. Unknown keys are refused by name. Throws `input` with the place in the file.
 */
export function parseLimitFile(json: unknown): LimitLine[] {
  return parseWith(limitFileSchema, json).lines.map(({ pointsMhzDbuvPerM, ...line }, index) => {
    const path = `lines[${index}]`;
    if (plainName(line.standard) === '') {
      throw inputError(`${path}.standard`, 'a name with at least one letter or digit', line.standard);
    }
    checkRising(pointsMhzDbuvPerM, `${path}.pointsMhzDbuvPerM`);
    const points = pointsMhzDbuvPerM.map(([mhz, limitDbuvPerM]) => [mhzToHz(mhz), limitDbuvPerM] as const);
    return { ...line, sourceStatus: 'user file', points };
  });
}

function checkRising(points: readonly (readonly [frequencyMhz: number, number])[], path: string): void {
  for (let i = 1; i < points.length; i++) {
    const [mhz, previousMhz] = [points[i]![0], points[i - 1]![0]];
    if (mhz < previousMhz)
      throw inputError(`${path}[${i}][0]`, `at least the ${previousMhz} MHz of the point before`, mhz);
    if (i > 1 && mhz === points[i - 2]![0]) {
      throw inputError(`${path}[${i}][0]`, 'above the frequency of the two points before (a step has two)', mhz);
    }
  }
  if (points[0]![0] === points.at(-1)![0]) throw inputError(path, 'over more than one frequency', points[0]![0]);
}
