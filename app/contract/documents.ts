import { z } from 'zod';
import { boardFileSchema, sourcesFileSchema } from '../board/board-file.ts';

/** Shapes that several procedures share. */

/** The board's document without what switches on it: large, changes seldom, known to both sides by its hash. */
export const boardBaseSchema = z.strictObject({
  layout: boardFileSchema.omit({ waveforms: true, drives: true, loads: true, loops: true, cables: true }),
  /** Waveform files by the `file` text of the waveform. */
  samples: z.record(z.string(), z.strictObject({ timesS: z.array(z.number()), values: z.array(z.number()) })),
  /** Of the board's or layout's bytes as they were opened, hexadecimal. */
  sourceSha256: z.string().max(64),
  openingNotes: z.array(z.string()),
});
export type BoardBase = z.output<typeof boardBaseSchema>;

export const sourcesPartSchema = sourcesFileSchema.pick({
  waveforms: true,
  drives: true,
  loads: true,
  loops: true,
  cables: true,
});

/** A whole board document: its base by id, and what switches on it. */
export const documentRefSchema = z.strictObject({ baseId: z.string().length(64), sources: sourcesPartSchema });
export type DocumentRef = z.output<typeof documentRefSchema>;

export const importSummarySchema = z.strictObject({
  format: z.literal('quietboard-import'),
  source: z.strictObject({ format: z.string(), revision: z.string(), units: z.string() }),
  copperLayers: z.number(),
  nets: z.number(),
  netsWithTraces: z.number(),
  segments: z.number(),
  arcs: z.number(),
  vias: z.number(),
  components: z.number(),
  boardMm: z.tuple([z.number(), z.number()]),
  traceLengthMm: z.number(),
  netLengths: z.array(z.strictObject({ name: z.string(), lengthMm: z.number() })),
  findings: z.array(z.strictObject({ code: z.string(), message: z.string(), count: z.number() })),
});

const worst = z.strictObject({ frequencyHz: z.number(), marginDb: z.number() }).nullable();

export const runSummarySchema = z.strictObject({
  run: z.number().int(),
  startedAt: z.string(),
  board: z.string(),
  revision: z.string(),
  layoutSha256: z.string(),
  sourcesSha256: z.string(),
  standard: z.string(),
  class: z.string(),
  distanceM: z.number(),
  requiredMarginDb: z.number(),
  structure: z.enum(['solved', 'pair-only']),
  worst,
  verdict: z.enum(['meets', 'exceeds', 'falls-short', 'within-uncertainty']),
  programVersion: z.string(),
  note: z.string(),
});

export const projectSchema = z.strictObject({
  /** Names the open project in later calls. */
  projectId: z.string(),
  name: z.string(),
  /** Absolute path on this machine. */
  file: z.string(),
  isReadOnly: z.boolean(),
  runCount: z.number().int(),
});

export const checkSchema = z.strictObject({
  id: z.string(),
  source: z.string(),
  sourceStatus: z.enum(['seen', 'from memory', 'derived', 'common practice', 'reference solver']),
  quantity: z.string(),
  unit: z.string(),
  expected: z.number(),
  computed: z.number(),
  difference: z.number(),
  tolerance: z.number(),
  status: z.enum(['pass', 'fail', 'info']),
});
