import { z } from 'zod';
import { resultSchema } from '../estimate/result-schema.ts';

/** What the host tells the window unasked. */
export const events = {
  'job.progress': z.strictObject({
    jobId: z.string(),
    /** What is being done, for people. */
    stage: z.string(),
    done: z.number(),
    total: z.number(),
  }),
  /** Lines finished so far, each time the new ones. */
  'job.points': z.strictObject({ jobId: z.string(), points: resultSchema.shape.points }),
  /** Something in a project was changed, by this window or another one or another program. */
  'project.changed': z.strictObject({
    projectId: z.string(),
    what: z.enum(['info', 'runs', 'draft', 'measurements']),
    clientId: z.string().nullable(),
  }),
  /** A native menu entry was chosen. */
  'app.command': z.strictObject({ name: z.string() }),
  /** The system handed over a file (double click, dropped on the icon). */
  'app.open-file': z.strictObject({ file: z.string() }),
} as const;

export type EventName = keyof typeof events;
export type EventOf<N extends EventName> = z.output<(typeof events)[N]>;
