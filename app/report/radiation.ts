import type { EstimateResult, ResultPoint } from '../estimate/result.ts';
import { inListOrder, isStructural, type Mechanism, MechanismList } from './mechanisms.ts';
import { worstOfEachFrequency } from './worst-readings.ts';

/** One spectral line by mechanism, at the reading with the least margin. */
export interface RadiatingLine {
  readonly frequencyHz: number;
  readonly marginDb: number;
  /** Level of each mechanism minus the limit, dB; those that radiate nothing are absent. */
  readonly excessDb: ReadonlyMap<Mechanism, number>;
  /** The strongest. */
  readonly ruler: Mechanism;
}

export interface Radiation {
  /** Those of the lines below, in the order of a list. */
  readonly mechanisms: readonly Mechanism[];
  /** Lines that count, by frequency. */
  readonly lines: readonly RadiatingLine[];
  /** Lines with a larger margin do not count. */
  readonly countedMarginDb: number;
  readonly uncountedLines: number;
  /** From here up nothing was solved for planes and cables; 0: nowhere; absent: everywhere solved. */
  readonly unsolvedFromHz?: number;
}

/** Lines this far below the worst one, and with at least this margin, do not matter to anybody. */
const COUNTED_BELOW_WORST_DB = 30;
const COUNTED_AT_LEAST_DB = 20;

/**
 * Level of each mechanism at one reading, dBµV/m: what the contributors radiate through it added as powers,
 * 10·log10 Σ 10^(L/10), as if their phases were unrelated.
 */
export function mechanismLevels({ contributors }: ResultPoint, list: MechanismList): Map<Mechanism, number> {
  const powers = new Map<Mechanism, number>();
  for (const contributor of contributors) {
    for (const [path, levelDbuvPerM] of Object.entries(contributor.viaDbuvPerM)) {
      const mechanism = list.of(contributor, path);
      powers.set(mechanism, (powers.get(mechanism) ?? 0) + 10 ** (levelDbuvPerM / 10));
    }
  }
  return new Map([...powers].map(([mechanism, power]) => [mechanism, 10 * Math.log10(power)]));
}

/** What radiates at which line, against the limit: for the lines near enough to it. */
export function radiationOf(result: EstimateResult): Radiation {
  const list = new MechanismList();
  const all = worstOfEachFrequency(result.points).flatMap((point) => {
    const line = radiatingLine(point, list);
    return line ? [line] : [];
  });
  const worstDb = all[0]?.marginDb ?? 0;
  const countedMarginDb = Math.max(COUNTED_AT_LEAST_DB, Math.ceil((worstDb + COUNTED_BELOW_WORST_DB) / 10) * 10);
  const lines = all.filter(({ marginDb }) => marginDb <= countedMarginDb);
  const unsolvedFromHz = unsolvedFrom(result, all);
  return {
    mechanisms: [...new Set(lines.flatMap(({ excessDb }) => [...excessDb.keys()]))].sort(inListOrder),
    lines: lines.sort((one, other) => one.frequencyHz - other.frequencyHz),
    countedMarginDb,
    uncountedLines: all.length - lines.length,
    ...(unsolvedFromHz !== undefined && { unsolvedFromHz }),
  };
}

function radiatingLine(point: ResultPoint, list: MechanismList): RadiatingLine | undefined {
  const excessDb = new Map<Mechanism, number>();
  let ruler: Mechanism | undefined;
  for (const [mechanism, levelDbuvPerM] of mechanismLevels(point, list)) {
    if (!Number.isFinite(levelDbuvPerM)) continue;
    excessDb.set(mechanism, levelDbuvPerM - point.limitDbuvPerM);
    const lead = ruler === undefined ? 1 : excessDb.get(mechanism)! - excessDb.get(ruler)!;
    if (lead > 0 || (lead === 0 && inListOrder(mechanism, ruler!) < 0)) ruler = mechanism;
  }
  return ruler && { frequencyHz: point.frequencyHz, marginDb: point.marginDb, excessDb, ruler };
}

/** Planes and cables are solved up to some frequency: the first line above it whose drivers have nothing but themselves. */
function unsolvedFrom(result: EstimateResult, lines: readonly RadiatingLine[]): number | undefined {
  if (result.structure !== 'solved') return 0;
  const has = (test: (mechanism: Mechanism) => boolean) =>
    lines.filter(({ excessDb }) => [...excessDb.keys()].some(test)).map(({ frequencyHz }) => frequencyHz);
  const solvedToHz = has(isStructural).reduce((one, other) => Math.max(one, other), 0);
  const above = has(({ kind }) => kind === 'pair' || kind === 'loop').filter((hz) => hz > solvedToHz);
  return solvedToHz === 0 || above.length === 0 ? undefined : above.reduce((one, other) => Math.min(one, other));
}
