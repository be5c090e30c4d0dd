import { z } from 'zod';

const levelDbuvPerM = z.number();
const pointM = z.tuple([z.number(), z.number(), z.number()]);

/** One spectral line looked at closely, at the height, angle and polarisation of its maximum unless said otherwise. */
export const lineDetailSchema = z.strictObject({
  frequencyHz: z.number(),
  polarization: z.enum(['horizontal', 'vertical']),
  antennaHeightM: z.number(),
  turntableDeg: z.number(),
  levelDbuvPerM,
  /** Turntable pattern at the maximum's height: both polarisations over the whole turn. */
  azimuth: z.strictObject({
    turntableDeg: z.array(z.number()),
    horizontalDbuvPerM: z.array(z.number()),
    verticalDbuvPerM: z.array(z.number()),
  }),
  /** Height pattern at the maximum's angle: 1 to 4 m. */
  height: z.strictObject({
    antennaHeightM: z.array(z.number()),
    horizontalDbuvPerM: z.array(z.number()),
    verticalDbuvPerM: z.array(z.number()),
  }),
  /** What every straight piece of every net radiates by itself, with what it drives through plane and cables. Strongest first. */
  pieces: z.array(
    z.strictObject({
      net: z.string(),
      /** Copper layer; empty for vias and pins. */
      layer: z.string(),
      fromM: pointM,
      toM: pointM,
      levelDbuvPerM,
      /** Its own current, rms, mean of its ends. */
      currentRmsA: z.number(),
    }),
  ),
  currentMap: z
    .strictObject({
      frequencyHz: z.number(),
      cellM: z.number(),
      cells: z.array(z.strictObject({ atM: z.tuple([z.number(), z.number()]), densityRmsAPerM: z.number() })),
      cables: z.array(z.strictObject({ name: z.string(), pointsM: z.array(pointM), currentRmsA: z.array(z.number()) })),
    })
    .nullable(),
});
export type LineDetail = z.output<typeof lineDetailSchema>;
