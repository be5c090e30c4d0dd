import { z } from 'zod';
import { boardFileSchema, sourcesFileSchema } from '../board/board-file.ts';
import { resultSchema } from '../estimate/result-schema.ts';
import { measurementSchema } from './measurement.ts';
import { runSettingsSchema } from './run-settings.ts';

/**
 * A whole project as one JSON: every document once, by its SHA-256, and the runs that name them. Documents are checked
 * against these schemas and taken as they come: a schema's output would leave out a key "__proto__".
 */

const sha256 = z.string().regex(/^[0-9a-f]{64}$/, { error: '64 hexadecimal digits' });
const time = z.string().min(1).max(100);
const count = z.number().int().nonnegative();
const number = z.number().int().positive();
const document = <D extends z.ZodType>(schema: D) => z.strictObject({ sha256, document: schema });

/** The sources beside the board's copper, with the waveform files they name. */
const sourcesDocumentSchema = z.strictObject({
  sources: sourcesFileSchema.pick({ waveforms: true, drives: true, loads: true, loops: true, cables: true }),
  samples: z.array(z.strictObject({ file: z.string().min(1).max(4096), sha256 })),
});
/** What opening the board's files said. */
const openingDocumentSchema = z.strictObject({ sourceSha256: z.string().max(64), openingNotes: z.array(z.string()) });
const layoutSchema = boardFileSchema.omit({ waveforms: true, drives: true, loads: true, loops: true, cables: true });
const samplesSchema = z.strictObject({ timesS: z.array(z.number()), values: z.array(z.number()) });

const partHashes = { layout: sha256, sources: sha256, opening: sha256, settings: sha256 };

/** One entry of each list of the file, by where it stands. */
export const exportItemSchemas = {
  'documents.layout': document(layoutSchema),
  'documents.sources': document(sourcesDocumentSchema),
  'documents.samples': document(samplesSchema),
  'documents.opening': document(openingDocumentSchema),
  'documents.settings': document(runSettingsSchema),
  'documents.result': document(resultSchema),
  runs: z.strictObject({
    run: number,
    startedAt: time,
    durationS: z.number().nonnegative(),
    note: z.string().max(10_000),
    ...partHashes,
    result: sha256,
  }),
  measurements: measurementSchema,
  uiState: z.strictObject({ key: z.string(), value: z.unknown() }),
} as const;

/** The rest of the file. */
export const exportHeadSchema = z.strictObject({
  format: z.literal('quietboard-project'),
  version: z.literal(1),
  name: z.string().min(1).max(200),
  createdAt: time,
  /** Version of the program that made the project. */
  createdBy: z.string().max(100),
  /** Highest numbers given so far: deleted ones are not given again. */
  lastRun: count,
  lastMeasurement: count,
  draft: z.strictObject({ version: number, savedAt: time, ...partHashes }).nullable(),
});

const entries = z.array(z.unknown());

/** The whole file, its lists' entries unchecked: they are checked one by one. */
export const exportOutlineSchema = exportHeadSchema.extend({
  documents: z.strictObject({
    layout: entries,
    sources: entries,
    samples: entries,
    opening: entries,
    settings: entries,
    result: entries,
  }),
  runs: entries,
  measurements: entries,
  uiState: entries,
});

export const projectExportSchema = exportHeadSchema.extend({
  documents: z.strictObject({
    layout: z.array(exportItemSchemas['documents.layout']),
    sources: z.array(exportItemSchemas['documents.sources']),
    samples: z.array(exportItemSchemas['documents.samples']),
    opening: z.array(exportItemSchemas['documents.opening']),
    settings: z.array(exportItemSchemas['documents.settings']),
    result: z.array(exportItemSchemas['documents.result']),
  }),
  runs: z.array(exportItemSchemas.runs),
  measurements: z.array(exportItemSchemas.measurements),
  uiState: z.array(exportItemSchemas.uiState),
});

export type ProjectExport = z.output<typeof projectExportSchema>;
export type ExportHead = z.output<typeof exportHeadSchema>;
export type ExportList = keyof typeof exportItemSchemas;
export type ExportItem<L extends ExportList> = z.output<(typeof exportItemSchemas)[L]>;
export type SourcesDocument = z.output<typeof sourcesDocumentSchema>;
