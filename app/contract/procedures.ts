import { z } from 'zod';
import { comparisonSchema } from '../compare/comparison-schema.ts';
import { trendSchema } from '../compare/trend-schema.ts';
import { resultSchema } from '../estimate/result-schema.ts';
import { measurementSchema } from '../project/measurement.ts';
import { runSettingsSchema } from '../project/run-settings.ts';
import {
  boardBaseSchema,
  checkSchema,
  documentRefSchema,
  importSummarySchema,
  projectSchema,
  runSummarySchema,
  sourcesPartSchema,
} from './documents.ts';
import { lineDetailSchema } from './line-detail.ts';

/**
 * Every procedure the window can call, with what goes in and what comes out: one list for all hosts.
 *
 * Long procedures take a `jobId` made by the caller: progress comes as events under it, `job.stop` ends it, and the call
 * then fails with `cancelled`. Binary data travels as one `bytes` key (`Uint8Array`) beside plain JSON.
 */

const procedure = <I extends z.ZodType, O extends z.ZodType>(input: I, output: O) => ({ input, output });
const nothing = z.strictObject({});
const projectId = z.string().min(1).max(100);
const jobId = z.string().min(1).max(100);
const run = z.number().int().positive();
const bytes = z.instanceof(Uint8Array);
const inProject = z.strictObject({ projectId });

const draftSchema = z.strictObject({
  document: documentRefSchema,
  settings: runSettingsSchema,
  /** Counts the saves: a save with another number than the newest is refused as `busy`. */
  version: z.number().int(),
});

const estimateInput = z.strictObject({
  projectId,
  jobId,
  document: documentRefSchema,
  settings: runSettingsSchema,
});

export const procedures = {
  'app.info': procedure(
    nothing,
    z.strictObject({
      version: z.string(),
      host: z.enum(['window', 'loopback']),
      /** The host can ask for files with the system's own dialogs. */
      hasDialogs: z.boolean(),
      /** The project named on the command line or by double click. */
      startProject: projectSchema.nullable(),
      cautions: z.array(z.string()),
    }),
  ),
  'settings.get': procedure(
    z.strictObject({ projectId: projectId.nullable(), key: z.string().max(200) }),
    z.strictObject({ value: z.unknown() }),
  ),
  'settings.put': procedure(
    z.strictObject({ projectId: projectId.nullable(), key: z.string().max(200), value: z.unknown() }),
    nothing,
  ),

  'project.recent': procedure(
    nothing,
    z.strictObject({ projects: z.array(z.strictObject({ file: z.string(), name: z.string(), openedAt: z.string() })) }),
  ),
  /** `file` absent: a project in the program's own folder, kept until it is saved elsewhere. */
  'project.open': procedure(
    z.strictObject({ file: z.string().max(4096).optional(), create: z.boolean() }),
    z.strictObject({ project: projectSchema }),
  ),
  /** A fresh copy of the sample project. */
  'project.open-sample': procedure(nothing, z.strictObject({ project: projectSchema })),
  'project.info': procedure(inProject, z.strictObject({ project: projectSchema })),
  'project.rename': procedure(z.strictObject({ projectId, name: z.string().min(1).max(200) }), nothing),
  /** A copy of the whole project under another name; the copy is then the open one. */
  'project.save-as': procedure(
    z.strictObject({ projectId, file: z.string().max(4096) }),
    z.strictObject({ project: projectSchema }),
  ),
  'project.export': procedure(inProject, z.strictObject({ name: z.string(), bytes })),
  'project.close': procedure(inProject, nothing),

  'dialog.open-project': procedure(nothing, z.strictObject({ file: z.string().nullable() })),
  'dialog.save-project': procedure(
    z.strictObject({ name: z.string() }),
    z.strictObject({ file: z.string().nullable() }),
  ),
  /** The window's commands, for a menu of the system; a host without one does nothing. `app.command` says what was chosen. */
  'window.menu': procedure(
    z.strictObject({
      commands: z
        .array(
          z.strictObject({
            name: z.string().max(200),
            label: z.string().max(200),
            /** The menu it stands in. */
            group: z.string().max(50),
            /** As in `Mod+Shift+Z`; Mod is Ctrl, or Command on a Mac. */
            keys: z.string().max(50).nullable(),
            isEnabled: z.boolean(),
          }),
        )
        .max(1000),
    }),
    nothing,
  ),
  /** Asks where to, and writes. `file` is null when the user backed out. */
  'dialog.save-bytes': procedure(
    z.strictObject({ name: z.string().max(255), bytes }),
    z.strictObject({ file: z.string().nullable() }),
  ),

  'file.upload': procedure(
    z.strictObject({ name: z.string().max(255), bytes }),
    z.strictObject({ uploadId: z.string(), sizeBytes: z.number().int() }),
  ),
  /**
   * Reads uploaded files: one board (board file or layout), and with it or upon the document given, sources files and
   * waveform tables. Answers with the whole document; nothing is stored before it is saved as draft.
   */
  'board.open': procedure(
    z.strictObject({
      projectId,
      jobId,
      uploadIds: z.array(z.string().max(100)).min(1).max(50),
      onto: documentRefSchema.optional(),
    }),
    z.strictObject({
      baseId: z.string(),
      base: boardBaseSchema,
      sources: sourcesPartSchema,
      /** Absent for board files. */
      summary: importSummarySchema.optional(),
    }),
  ),
  'base.put': procedure(z.strictObject({ projectId, base: boardBaseSchema }), z.strictObject({ baseId: z.string() })),
  'base.get': procedure(z.strictObject({ projectId, baseId: z.string() }), z.strictObject({ base: boardBaseSchema })),
  'draft.load': procedure(inProject, z.strictObject({ draft: draftSchema.nullable() })),
  'draft.save': procedure(
    z.strictObject({
      projectId,
      document: documentRefSchema,
      settings: runSettingsSchema,
      /** The version this is a change of; 0 for the first. */
      basedOn: z.number().int(),
      /** Names the window, so that it knows its own changes in the events. */
      clientId: z.string().max(100),
    }),
    z.strictObject({ version: z.number().int() }),
  ),

  /** Estimates and, with `store`, keeps the run. Events: `job.progress`, `job.points`. */
  'estimate.run': procedure(
    estimateInput.extend({ store: z.boolean(), note: z.string().max(10_000).default('') }),
    z.strictObject({ result: resultSchema, run: run.nullable() }),
  ),
  'estimate.line-detail': procedure(
    estimateInput.extend({ frequencyHz: z.number().positive() }),
    z.strictObject({ detail: lineDetailSchema }),
  ),
  'job.stop': procedure(z.strictObject({ jobId }), z.strictObject({ wasRunning: z.boolean() })),

  /** Solves what stays the same while sources, series resistors and loads change. Events: `job.progress`. */
  'levers.prepare': procedure(estimateInput, z.strictObject({ leversId: z.string() })),
  /** The estimate with other waveforms, drives and loads on the same nets and pins: fast, nothing is solved again. */
  'levers.try': procedure(
    z.strictObject({ leversId: z.string(), sources: sourcesPartSchema, settings: runSettingsSchema }),
    z.union([
      z.strictObject({
        points: resultSchema.shape.points,
        worst: resultSchema.shape.worst,
        verdict: resultSchema.shape.verdict,
      }),
      /** Why what is kept cannot tell: what changed has to be solved. */
      z.strictObject({ needsSolve: z.string() }),
    ]),
  ),
  'levers.release': procedure(z.strictObject({ leversId: z.string() }), nothing),

  'runs.list': procedure(inProject, z.strictObject({ runs: z.array(runSummarySchema) })),
  'runs.load': procedure(
    z.strictObject({ projectId, run }),
    z.strictObject({
      summary: runSummarySchema,
      result: resultSchema,
      settings: runSettingsSchema,
      document: documentRefSchema,
    }),
  ),
  'runs.note': procedure(z.strictObject({ projectId, run, note: z.string().max(10_000) }), nothing),
  'runs.delete': procedure(z.strictObject({ projectId, run }), nothing),
  'runs.compare': procedure(
    z.strictObject({ projectId, before: run, after: run }),
    z.strictObject({ comparison: comparisonSchema }),
  ),
  'runs.trend': procedure(inProject, z.strictObject({ trend: trendSchema })),

  'measurements.list': procedure(inProject, z.strictObject({ measurements: z.array(measurementSchema) })),
  'measurements.add': procedure(
    z.strictObject({ projectId, uploadId: z.string(), name: z.string().max(200), revision: z.string().max(1000) }),
    z.strictObject({ measurement: measurementSchema }),
  ),
  'measurements.delete': procedure(z.strictObject({ projectId, id: z.number().int() }), nothing),

  'report.render': procedure(
    z.strictObject({
      projectId,
      subject: z.discriminatedUnion('kind', [
        z.strictObject({ kind: z.literal('run'), run }),
        z.strictObject({ kind: z.literal('comparison'), before: run, after: run }),
        z.strictObject({ kind: z.literal('trend') }),
      ]),
      format: z.enum(['pdf', 'html', 'csv', 'json', 'junit']),
      paper: z.enum(['A4', 'Letter']).default('A4'),
      author: z.string().max(200).default(''),
      /** As it is to be printed, in the user's own form. */
      dateText: z.string().max(100).default(''),
    }),
    z.strictObject({ name: z.string(), mediaType: z.string(), bytes }),
  ),

  'validate.run': procedure(z.strictObject({ jobId }), z.strictObject({ checks: z.array(checkSchema) })),
} as const;

export type ProcedureName = keyof typeof procedures;
/** What a caller gives (defaults may be absent). */
export type Input<N extends ProcedureName> = z.input<(typeof procedures)[N]['input']>;
/** What a handler receives. */
export type Received<N extends ProcedureName> = z.output<(typeof procedures)[N]['input']>;
export type Output<N extends ProcedureName> = z.output<(typeof procedures)[N]['output']>;
export type Handlers = { [N in ProcedureName]: (input: Received<N>) => Promise<DeepReadonly<Output<N>>> };

/** Handlers may answer with data that nobody may change. */
export type DeepReadonly<T> = unknown extends T
  ? T
  : T extends Uint8Array
    ? Uint8Array
    : T extends object
      ? { readonly [K in keyof T]: DeepReadonly<T[K]> }
      : T;
