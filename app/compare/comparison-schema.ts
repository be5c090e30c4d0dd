import { z } from 'zod';

/** Schema of a comparison's JSON; a test keeps it equal to the types of `types.ts`. */

const number = z.number();
const text = z.string();
const level = number.nullable();

const detector = z.enum(['quasi-peak', 'average', 'peak']);
const verdict = z.enum(['meets', 'exceeds', 'falls-short', 'within-uncertainty']);
const contributorKind = z.enum(['net', 'loop', 'cable']);
const index = z.int().nonnegative();

const run = z.strictObject({
  run: z.int(),
  startedAt: text,
  board: text,
  revision: text,
  layoutSha256: text,
  sourcesSha256: text,
  programVersion: text,
  note: text,
  limit: text,
  requiredMarginDb: number,
  verdict,
  worst: z
    .strictObject({
      frequencyHz: number,
      detector,
      marginDb: number,
      contributor: z.strictObject({ kind: contributorKind, name: text, path: text }).nullable(),
    })
    .nullable(),
});

const reading = z.strictObject({
  levelDbuvPerM: number,
  limitDbuvPerM: number,
  marginDb: number,
  polarization: z.enum(['horizontal', 'vertical']),
  antennaHeightM: number,
  turntableDeg: number,
});

const line = z.strictObject({
  frequencyHz: number,
  detector,
  status: z.enum(['changed', 'unchanged', 'new', 'gone']),
  before: reading.nullable(),
  after: reading.nullable(),
  levelChangeDb: level,
  limitChangeDb: level,
  marginChangeDb: level,
  crossing: z.enum(['newly-over', 'still-over', 'newly-under', 'under']),
  contributors: z.array(
    z.strictObject({
      kind: contributorKind,
      name: text,
      path: text,
      beforeDbuvPerM: level,
      afterDbuvPerM: level,
      changeDb: level,
      share: number,
    }),
  ),
  causes: z.array(index),
});

const bandState = z.strictObject({
  worst: z.strictObject({ frequencyHz: number, marginDb: number }).nullable(),
  lines: index,
  over: index,
});

const change = z.strictObject({
  kind: z.enum([
    'setup',
    'limit',
    'program',
    'waveform',
    'drive',
    'load',
    'loop',
    'cable',
    'trace',
    'net',
    'plane',
    'stackup',
    'outline',
    'structure',
    'board',
  ]),
  nets: z.array(text),
  loops: z.array(text),
  cables: z.array(text),
  text,
  effect: z
    .strictObject({
      frequencyHz: number,
      detector,
      name: text,
      beforeDbuvPerM: level,
      afterDbuvPerM: level,
      changeDb: level,
      isAlone: z.boolean(),
    })
    .nullable(),
});

export const comparisonSchema = z.strictObject({
  format: z.literal('quietboard-comparison'),
  version: z.literal(1),
  before: run,
  after: run,
  headline: text,
  warnings: z.array(
    z.strictObject({
      code: z.enum(['setups-differ', 'programs-differ', 'boards-differ', 'ranges-differ']),
      message: text,
    }),
  ),
  worstMarginChangeDb: level,
  counts: z.strictObject({
    better: index,
    worse: index,
    unchanged: index,
    new: index,
    gone: index,
    newlyOver: index,
    newlyUnder: index,
    stillOver: index,
  }),
  changes: z.array(change),
  bands: z.array(
    z.strictObject({
      detector,
      fromHz: number,
      toHz: number,
      before: bandState,
      after: bandState,
      marginChangeDb: level,
    }),
  ),
  lines: z.array(line),
});
