import { z } from 'zod';
import { waveformSchema } from './waveform-file.ts';

/**
 * The board file (`*.board.json`) and the sources file, exactly as on disk: millimetres, megahertz, nanoseconds,
 * volts. Unknown keys are refused by name. Conversion to SI happens once, in `to-board.ts`.
 */

/** Coordinates stay within 100 m of the origin: more is a file in another unit. */
const finite = z.number();
const coordinateMm = z.number().min(-1e5).max(1e5);
const positive = z.number().positive();
const notNegative = z.number().nonnegative();
const pointMm = z.tuple([coordinateMm, coordinateMm]);
const point3Mm = z.tuple([coordinateMm, coordinateMm, coordinateMm]);
const name = z.string().min(1).max(1000);

const polygonMm = z.array(pointMm).min(3);

const copperLayer = z.strictObject({ name, kind: z.literal('copper'), thicknessMm: notNegative });
const dielectricLayer = z.strictObject({
  name,
  kind: z.literal('dielectric'),
  thicknessMm: notNegative,
  epsilonR: z.number().min(1),
  lossTangent: notNegative.optional(),
  /** True when the importer had to guess the permittivity: said in every result. */
  guessed: z.boolean().optional(),
});

const trace = z.strictObject({ layer: name, widthMm: positive, pointsMm: z.array(pointMm).min(2) });
const via = z.strictObject({ atMm: pointMm, fromLayer: name, toLayer: name, drillMm: positive });
const pin = z.strictObject({ name, atMm: pointMm, layer: name });

const net = z.strictObject({
  name,
  traces: z.array(trace).optional(),
  vias: z.array(via).optional(),
  pins: z.array(pin).optional(),
  z0Ohm: positive.optional(),
  epsilonEff: z.number().min(1).optional(),
  returnPath: z.strictObject({ layer: name, pointsMm: z.array(pointMm).min(2) }).optional(),
});

const plane = z.strictObject({
  layer: name,
  net: name,
  pointsMm: polygonMm.optional(),
  cutoutsMm: z.array(polygonMm).optional(),
});

const drive = z.strictObject({
  net: name,
  pin: name.optional(),
  waveform: name,
  sourceOhm: notNegative.default(0),
  seriesOhm: notNegative.default(0),
  delayNs: finite.default(0),
  inverted: z.boolean().default(false),
});

const load = z.strictObject({
  net: name,
  pin: name.optional(),
  resistanceOhm: notNegative.optional(),
  capacitancePf: notNegative.optional(),
});

const loop = z.strictObject({
  name,
  pointsMm: z.array(point3Mm).min(3),
  waveform: name,
  delayNs: finite.default(0),
  inverted: z.boolean().default(false),
});

const cable = z.strictObject({
  /** Results list where a current radiates from: "pair" (trace and return), "plane", "loop", or a cable by its name. */
  name: name.refine((text) => !['pair', 'plane', 'loop'].includes(text), {
    error: 'another name than "pair", "plane" and "loop" (results use them)',
  }),
  pointsMm: z.array(point3Mm).min(2),
  radiusMm: positive.default(1),
  farEnd: z
    .union([z.literal('open'), z.literal('ground'), z.strictObject({ resistanceOhm: notNegative })], {
      error: '"open", "ground" or { "resistanceOhm": a number of at least 0 }',
    })
    .default('open'),
  seriesOhm: notNegative.optional(),
  /** Impedance at the connector: [MHz, R ohm, X ohm] rows, rising in frequency. */
  seriesImpedance: z
    .array(z.tuple([positive, notNegative, finite]))
    .min(1)
    .optional(),
  /** Stated common-mode current: [MHz, µA rms] rows; then the cable is not solved for. */
  commonModeUa: z
    .array(z.tuple([positive, notNegative]))
    .min(1)
    .optional(),
});

const structure = z.strictObject({
  planes: z.enum(['solved', 'pair-only']).optional(),
  cellMm: positive.optional(),
});

const sourcesShape = {
  waveforms: z.array(waveformSchema).optional(),
  drives: z.array(drive).optional(),
  loads: z.array(load).optional(),
  loops: z.array(loop).optional(),
  cables: z.array(cable).optional(),
};

export const boardFileSchema = z.strictObject({
  format: z.literal('quietboard-board'),
  version: z.literal(1),
  name: z.string(),
  revision: z.string().default(''),
  notes: z.string().optional(),
  outline: z
    .array(z.strictObject({ pointsMm: polygonMm }))
    .min(1)
    .optional(),
  stackup: z.array(z.discriminatedUnion('kind', [copperLayer, dielectricLayer])).min(1),
  planes: z.array(plane).optional(),
  nets: z.array(net),
  ...sourcesShape,
  structure: structure.optional(),
});

export const sourcesFileSchema = z.strictObject({
  format: z.literal('quietboard-sources'),
  version: z.literal(1),
  notes: z.string().optional(),
  ...sourcesShape,
});

/** Board file after parsing (defaults filled in). */
export type BoardFile = z.output<typeof boardFileSchema>;
/** Board file as a writer may give it (defaults may be absent). */
export type BoardFileInput = z.input<typeof boardFileSchema>;
export type SourcesFile = z.output<typeof sourcesFileSchema>;
