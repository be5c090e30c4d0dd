import type { Contributor, EstimateResult, ResultPoint } from '../estimate/result.ts';

/** One contributor through one path: the unit of what can be cured. */
export interface Cause {
  readonly contributor: Pick<Contributor, 'kind' | 'name'>;
  readonly path: string;
  /** Where it comes nearest to (or farthest over) the limit by itself. */
  readonly point: ResultPoint;
  readonly ownDbuvPerM: number;
  /** Limit minus its own level there. */
  readonly ownMarginDb: number;
}

/** A contributor with all its paths, where it comes nearest to the limit by itself. */
export interface Emitter {
  readonly contributor: Contributor;
  readonly point: ResultPoint;
  readonly ownMarginDb: number;
}

/** Values by contributor and path; a kind has no space in it, so the keys of two contributors differ. */
class ByPath<Value> {
  readonly #byContributor = new Map<string, Map<string, Value>>();

  pathsOf({ kind, name }: Pick<Contributor, 'kind' | 'name'>): Map<string, Value> {
    const key = `${kind} ${name}`;
    const held = this.#byContributor.get(key);
    if (held) return held;
    const paths = new Map<string, Value>();
    this.#byContributor.set(key, paths);
    return paths;
  }

  values(): Value[] {
    return [...this.#byContributor.values()].flatMap((paths) => [...paths.values()]);
  }
}

const byOwnMargin = (one: { readonly ownMarginDb: number }, other: { readonly ownMarginDb: number }): number =>
  one.ownMarginDb - other.ownMarginDb;

/** All causes, the one that by itself comes nearest to a limit first; ties in order of appearance. */
export function causesOf(result: EstimateResult): Cause[] {
  const causes = new ByPath<Cause>();
  for (const point of result.points) {
    for (const contributor of point.contributors) {
      const paths = causes.pathsOf(contributor);
      for (const [path, ownDbuvPerM] of Object.entries(contributor.viaDbuvPerM)) {
        const ownMarginDb = point.limitDbuvPerM - ownDbuvPerM;
        if (!(ownMarginDb < (paths.get(path)?.ownMarginDb ?? Infinity))) continue;
        paths.set(path, { contributor, path, point, ownDbuvPerM, ownMarginDb });
      }
    }
  }
  return causes.values().sort(byOwnMargin);
}

/** All contributors in the order of what they emit by themselves against the limit; ties in order of appearance. */
export function emittersOf(result: EstimateResult): Emitter[] {
  const emitters = new ByPath<Emitter>();
  for (const point of result.points) {
    for (const contributor of point.contributors) {
      const whole = emitters.pathsOf(contributor);
      const ownMarginDb = point.limitDbuvPerM - contributor.levelDbuvPerM;
      if (!(ownMarginDb < (whole.get('')?.ownMarginDb ?? Infinity))) continue;
      whole.set('', { contributor, point, ownMarginDb });
    }
  }
  return emitters.values().sort(byOwnMargin);
}

/**
 * The reading with the least margin when some causes are gone. Phases are not in a result, so a level falls by the causes'
 * share of the power: L' = L + 10·log10(1 − Σ own powers / Σ all powers), exact where they do not interfere, else a guess
 * that may be wrong by several dB either way. Undefined when nothing is left.
 */
export function worstWithout(
  result: EstimateResult,
  causes: readonly Cause[],
): { readonly frequencyHz: number; readonly marginDb: number } | undefined {
  const gone = new ByPath<true>();
  for (const { contributor, path } of causes) gone.pathsOf(contributor).set(path, true);
  let worst: { frequencyHz: number; marginDb: number } | undefined;
  for (const point of result.points) {
    let allPower = 0;
    let leftPower = 0;
    for (const contributor of point.contributors) {
      const goneOfIt = gone.pathsOf(contributor);
      for (const [path, levelDbuvPerM] of Object.entries(contributor.viaDbuvPerM)) {
        const power = 10 ** (levelDbuvPerM / 10);
        allPower += power;
        if (!goneOfIt.has(path)) leftPower += power;
      }
    }
    if (allPower > 0 && leftPower === 0) continue;
    const marginDb = point.marginDb + (allPower > 0 ? 10 * Math.log10(allPower / leftPower) : 0);
    if (worst === undefined || marginDb < worst.marginDb) worst = { frequencyHz: point.frequencyHz, marginDb };
  }
  return worst;
}
