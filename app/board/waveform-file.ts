import { z } from 'zod';

/** Waveforms as a file states them: MHz, Mbit/s, ns, V or A. Drives take volts (…V keys), loops amperes (…A keys). */

const finite = z.number();
const positive = z.number().positive();
const notNegative = z.number().nonnegative();
const name = z.string().min(1).max(1000);
const base = { name, clockDomain: name.optional() };
const pointsNs = z
  .array(z.tuple([finite, finite]))
  .min(2)
  .max(1_000_000)
  .optional();

/** 10–90 % times cover 0.8 of a linear ramp. */
const RAMP_SHARE_1090 = 0.8;

/** Share of a period below which two moments are the same (decimal times are not exact in binary). */
export const SAME_TIME = 1e-9;

type Context = z.core.$RefinementCtx;

const complain = (context: Context, path: (string | number)[], must: string): void => {
  context.addIssue({ code: 'custom', message: must, path });
};

/** Both keys of one unit, none of the other. */
function requireOneUnit(
  value: Readonly<Record<string, unknown>>,
  volts: readonly string[],
  amperes: readonly string[],
  context: Context,
): void {
  const given = (keys: readonly string[]) => keys.filter((key) => value[key] !== undefined);
  const [givenV, givenA] = [given(volts), given(amperes)];
  const [wanted, other] = givenA.length > 0 && givenV.length === 0 ? [amperes, volts] : [volts, amperes];
  if (givenV.length > 0 && givenA.length > 0) {
    complain(context, [givenA[0]!], `left out beside ${givenV.join(', ')}: a waveform is in volts or in amperes`);
    return;
  }
  for (const key of wanted) {
    if (value[key] !== undefined) continue;
    const keys = (list: readonly string[]) => list.join(' and ');
    complain(context, [key], `given: ${keys(volts)} for drives, ${keys(amperes)} for loops`);
    if (given(other).length === 0) return;
  }
}

interface Edges {
  readonly riseNs: number;
  readonly fallNs: number;
}

/** Half of both ramps lies inside each plateau's time at the 50 % level. */
function requireRampsFit(edges: Edges, shortestNs: number, context: Context): void {
  const rampsNs = (edges.riseNs + edges.fallNs) / RAMP_SHARE_1090;
  if (rampsNs / 2 <= shortestNs * (1 + 1e-12)) return;
  const mostNs = 2 * RAMP_SHARE_1090 * shortestNs;
  complain(
    context,
    ['riseNs'],
    `such that riseNs + fallNs (10–90 %) is at most ${Number(mostNs.toPrecision(6))} ns here`,
  );
}

const LEVELS_V = ['lowV', 'highV'];
const LEVELS_A = ['lowA', 'highA'];
const levels = {
  lowV: finite.optional(),
  highV: finite.optional(),
  lowA: finite.optional(),
  highA: finite.optional(),
};

const trapezoid = z
  .strictObject({
    ...base,
    kind: z.literal('trapezoid'),
    frequencyMhz: positive,
    ...levels,
    dutyPercent: z.number().gt(0).lt(100).default(50),
    riseNs: notNegative,
    fallNs: notNegative,
  })
  .superRefine((value, context) => {
    requireOneUnit(value, LEVELS_V, LEVELS_A, context);
    const periodNs = 1000 / value.frequencyMhz;
    requireRampsFit(value, (periodNs * Math.min(value.dutyPercent, 100 - value.dutyPercent)) / 100, context);
  });

const randomData = z
  .strictObject({
    ...base,
    kind: z.literal('random-data'),
    bitRateMbps: positive,
    ...levels,
    riseNs: notNegative,
    fallNs: notNegative,
    /** Length of a maximum-length sequence. */
    sequenceBits: z
      .int()
      .min(3)
      .max(32767)
      .refine((bits) => Number.isInteger(Math.log2(bits + 1)), { error: '2^n − 1: 3, 7, 15, … 32767' })
      .default(127),
  })
  .superRefine((value, context) => {
    requireOneUnit(value, LEVELS_V, LEVELS_A, context);
    requireRampsFit(value, 1000 / value.bitRateMbps, context);
  });

const samples = z.strictObject({
  ...base,
  kind: z.literal('samples'),
  /** CSV of time (s) and value (V or A), relative to the board file. */
  file: z.string().min(1).max(4096),
  periodNs: positive,
});

const piecewise = z
  .strictObject({
    ...base,
    kind: z.literal('piecewise'),
    periodNs: positive,
    pointsNsV: pointsNs,
    pointsNsA: pointsNs,
  })
  .superRefine((value, context) => {
    requireOneUnit(value, ['pointsNsV'], ['pointsNsA'], context);
    const key = value.pointsNsV === undefined ? 'pointsNsA' : 'pointsNsV';
    requireRising(value[key] ?? [], key, value.periodNs, context);
  });

/** Times rise strictly and stay within one period; a full period must end where it began. */
function requireRising(
  points: readonly (readonly [number, number])[],
  key: string,
  periodNs: number,
  context: Context,
): void {
  for (let i = 1; i < points.length; i++) {
    if (points[i]![0] > points[i - 1]![0]) continue;
    complain(context, [key, i, 0], `later than the point before it (${points[i - 1]![0]} ns)`);
    return;
  }
  const [first, last] = [points[0], points.at(-1)];
  if (first === undefined || last === undefined) return;
  const spanNs = last[0] - first[0];
  if (spanNs > periodNs * (1 + SAME_TIME)) {
    complain(context, [key, points.length - 1, 0], `at most one period (${periodNs} ns) after the first point`);
  } else if (spanNs >= periodNs * (1 - SAME_TIME) && last[1] !== first[1]) {
    complain(context, [key, points.length - 1, 1], `the first point's value (${first[1]}): it is the same moment`);
  }
}

const lines = z
  .strictObject({
    ...base,
    kind: z.literal('lines'),
    /** amplitude·cos(2πft + phase), peak values. */
    lines: z
      .array(
        z.strictObject({
          frequencyMhz: positive,
          amplitudeV: finite.optional(),
          amplitudeA: finite.optional(),
          phaseDeg: finite.default(0),
        }),
      )
      .min(1)
      .max(1_000_000),
  })
  .superRefine((value, context) => {
    const seenMhz = new Set<number>();
    const isAmperes = value.lines[0]?.amplitudeA !== undefined;
    for (const [i, line] of value.lines.entries()) {
      const [wanted, other] = isAmperes
        ? (['amplitudeA', 'amplitudeV'] as const)
        : (['amplitudeV', 'amplitudeA'] as const);
      if (line[other] !== undefined) {
        complain(context, ['lines', i, other], 'left out: all lines are in volts or all in amperes, one value a line');
      } else if (line[wanted] === undefined) {
        complain(
          context,
          ['lines', i, wanted],
          isAmperes ? 'given' : 'given (amplitudeV for drives, amplitudeA for loops)',
        );
      }
      if (seenMhz.has(line.frequencyMhz)) {
        complain(context, ['lines', i, 'frequencyMhz'], 'a frequency that no other line of the waveform has');
      }
      seenMhz.add(line.frequencyMhz);
    }
  });

export const waveformSchema = z.discriminatedUnion('kind', [trapezoid, randomData, samples, piecewise, lines]);
export type WaveformFile = z.output<typeof waveformSchema>;
