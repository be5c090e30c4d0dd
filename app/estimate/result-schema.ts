import { z } from 'zod';

/** Schema of the result file; a test keeps it equal to the types of `result.ts`. */

const number = z.number();
const text = z.string();

const contributor = z.strictObject({
  kind: z.enum(['net', 'loop', 'cable']),
  name: text,
  levelDbuvPerM: number,
  viaDbuvPerM: z.record(text, number),
});

const point = z.strictObject({
  frequencyHz: number,
  detector: z.enum(['quasi-peak', 'average', 'peak']),
  levelDbuvPerM: number,
  limitDbuvPerM: number,
  marginDb: number,
  polarization: z.enum(['horizontal', 'vertical']),
  antennaHeightM: number,
  turntableDeg: number,
  horizontalDbuvPerM: number,
  verticalDbuvPerM: number,
  upperBoundDbuvPerM: number,
  contributors: z.array(contributor),
});

const caveat = z.strictObject({ code: text, message: text, where: text, fromHz: number, toHz: number });
const finding = z.strictObject({
  code: text,
  net: text,
  message: text,
  atM: z.tuple([number, number]),
  layer: text,
});

const currentMap = z.strictObject({
  frequencyHz: number,
  cellM: number,
  cells: z.array(z.strictObject({ atM: z.tuple([number, number]), densityRmsAPerM: number })),
  cables: z.array(
    z.strictObject({
      name: text,
      pointsM: z.array(z.tuple([number, number, number])),
      currentRmsA: z.array(number),
    }),
  ),
});

const site = z.strictObject({
  kind: z.enum(['ground-plane', 'free-space']),
  distanceM: number,
  measuredFrom: z.enum(['boundary', 'center']),
  orientation: z.enum(['flat', 'upright']),
  tableHeightM: number,
  boundaryRadiusM: number,
});

const limit = z.strictObject({
  standard: text,
  class: text,
  distanceM: number,
  requiredMarginDb: number,
  edition: text,
  source: text,
  sourceStatus: text,
  maxHz: number,
  maxRule: text,
  conversion: text.optional(),
  labUncertaintyDb: number,
});

export const resultSchema = z.strictObject({
  format: z.literal('quietboard-result'),
  version: z.literal(1),
  board: z.strictObject({ name: text, revision: text, sha256: text }),
  program: z.strictObject({ version: text }),
  site,
  limit,
  structure: z.enum(['solved', 'pair-only']),
  points: z.array(point),
  worst: z.strictObject({ frequencyHz: number, marginDb: number }).nullable(),
  verdict: z.enum(['meets', 'exceeds', 'falls-short', 'within-uncertainty']),
  caveats: z.array(caveat),
  findings: z.array(finding),
  currentMaps: z.array(currentMap).optional(),
  notes: z.array(text),
  cautions: z.array(text),
});
