import type { Component } from '../site/power-map.ts';
import { chebyshevWeights, trigonometricWeights } from '../site/sampling.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from '../site/site.ts';
import { AngleProfile } from './angle-profile.ts';
import { ascend, type Jet } from './ascend.ts';
import { HeightProfile } from './height-profile.ts';
import { type Amplitudes, type KeptField, partFactors, rowTotals, type SearchGrid } from './kept-field.ts';

/** A place of the antenna. */
export interface AntennaPlace {
  readonly angleRad: number;
  readonly heightM: number;
}

/** Grid maxima within 2 dB of the best may be the highest between the grid's points. */
const CANDIDATE_FACTOR = 10 ** -0.2;
/** Parabolas through the grid's points tell a maximum between them within 0.5 dB. */
const HOPELESS_FACTOR = 10 ** -0.05;
const MOST_CANDIDATES = 24;
/** Powers closer than this, relative, are equal (single precision): the lower height, then the smaller angle is taken. */
const SAME_POWER = 1e-6;
const MOST_ROUNDS = 12;
/** A round that gains less than this, relative, is the last. */
const GAIN = 1e-7;
/** Heights closer than this are one, m. */
const SAME_HEIGHT_M = 1e-3;

/** Place at which the power of the domains' mixtures is largest: grid maxima near the best, each climbed between samples. */
export function keptMaximum(field: KeptField, component: Component, domains: readonly Amplitudes[]): AntennaPlace {
  const { grid } = field;
  const powers = field.powerOnGrid(component, domains);
  const climb = new Climb(field, component, domains);
  let best = { angleRad: 0, heightM: ANTENNA_LOWEST_M, power: 0 };
  for (const { angleRad, heightM, power } of candidates(powers, grid)) {
    if (power < HOPELESS_FACTOR * best.power) break;
    const top = climb.from(angleRad, heightM);
    const isHigher = top.power > best.power * (1 + SAME_POWER);
    const isSame = !isHigher && top.power > best.power * (1 - SAME_POWER);
    if (isHigher || (isSame && isBefore(top, best))) best = top;
  }
  return { angleRad: turned(best.angleRad), heightM: best.heightM };
}

/** Lower, or as high and at a smaller angle (a step of the search apart). */
const isBefore = (one: AntennaPlace, other: AntennaPlace): boolean =>
  one.heightM < other.heightM - SAME_HEIGHT_M ||
  (one.heightM <= other.heightM + SAME_HEIGHT_M && turned(one.angleRad) < turned(other.angleRad));

/** Into 0 to 2π. */
function turned(angleRad: number): number {
  const turn = 2 * Math.PI;
  return ((angleRad % turn) + turn) % turn;
}

/** Grid points not below their neighbours and near the best, as parabolas see the maxima there; the highest first. */
function candidates(powers: Float64Array, { angleCount, heightCount, stepRad, stepM }: SearchGrid) {
  let highest = 0;
  for (const power of powers) if (power > highest) highest = power;
  const least = CANDIDATE_FACTOR * highest;
  const found: (AntennaPlace & { readonly power: number })[] = [];
  for (let h = 0; h < heightCount; h++) {
    for (let a = 0; a < angleCount; a++) {
      const at = h * angleCount + a;
      const here = powers[at]!;
      const bound = here * (1 + SAME_POWER);
      if (bound < least || highest === 0) continue;
      const left = powers[a > 0 ? at - 1 : at + angleCount - 1]!;
      const right = powers[a < angleCount - 1 ? at + 1 : at + 1 - angleCount]!;
      const below = h > 0 ? powers[at - angleCount]! : 0;
      const above = h < heightCount - 1 ? powers[at + angleCount]! : 0;
      if (bound < left || bound < right || bound < below || bound < above) continue;
      const along = vertexOf(left, here, right);
      const isInside = h > 0 && h < heightCount - 1;
      const up = isInside ? vertexOf(below, here, above) : { shift: 0, gain: 0 };
      found.push({
        angleRad: (a + along.shift) * stepRad,
        heightM: ANTENNA_LOWEST_M + (h + up.shift) * stepM,
        power: here + along.gain + up.gain,
      });
    }
  }
  return found.sort((one, other) => other.power - one.power).slice(0, MOST_CANDIDATES);
}

/** Top of the parabola through three equally spaced values, the middle one not below the others: shift in steps. */
function vertexOf(before: number, here: number, after: number): { readonly shift: number; readonly gain: number } {
  const bend = 2 * here - before - after;
  if (!(bend > 0)) return { shift: 0, gain: 0 };
  const slope = (after - before) / 2;
  const shift = Math.max(-0.5, Math.min(0.5, slope / bend));
  return { shift, gain: (slope * shift) / 2 };
}

/** Climbs along angle and height in turn on the exact interpolant. */
class Climb {
  readonly #field: KeptField;
  readonly #component: Component;
  readonly #samples: readonly Float64Array[];
  readonly #byAngle: AngleProfile;
  readonly #byHeight: HeightProfile;
  readonly #row: Float64Array;
  readonly #column: Float64Array;
  readonly #angleWeights: Float64Array;
  readonly #heightWeights: Float64Array;
  readonly #factors: Float64Array;

  constructor(field: KeptField, component: Component, domains: readonly Amplitudes[]) {
    const { plan } = field;
    const { order, heightsM, partCount } = plan;
    this.#field = field;
    this.#component = component;
    this.#samples = field.mixtures(component, domains);
    this.#byAngle = new AngleProfile(order, domains.length);
    this.#byHeight = new HeightProfile(plan, component, domains.length);
    this.#row = new Float64Array(2 * (2 * order + 1));
    this.#column = new Float64Array(2 * partCount * heightsM.length);
    this.#angleWeights = new Float64Array(2 * order + 1);
    this.#heightWeights = new Float64Array(heightsM.length);
    this.#factors = new Float64Array(2 * partCount);
  }

  from(angleRad: number, heightM: number): AntennaPlace & { readonly power: number } {
    const { stepRad, stepM } = this.#field.grid;
    const jet: Jet = new Float64Array(3);
    let angle = angleRad;
    let height = heightM;
    let power = 0;
    for (let round = 0; round < MOST_ROUNDS; round++) {
      const before = power;
      this.#setHeight(height);
      angle = ascend((at, out) => this.#byAngle.jetAt(at, out), angle - stepRad, angle, angle + stepRad, jet);
      // Where turning no longer gains, the height is the best of this angle already.
      if (round > 0 && jet[0]! <= before * (1 + GAIN)) return { angleRad: angle, heightM: height, power: jet[0]! };
      this.#setAngle(angle);
      const low = Math.max(ANTENNA_LOWEST_M, height - stepM);
      const high = Math.min(ANTENNA_HIGHEST_M, height + stepM);
      height = ascend((at, out) => this.#byHeight.jetAt(at, out), low, height, high, jet);
      power = jet[0]!;
      if (power <= before * (1 + GAIN)) break;
    }
    return { angleRad: angle, heightM: height, power };
  }

  #setHeight(heightM: number): void {
    const { plan } = this.#field;
    chebyshevWeights(plan.heightsM, heightM, this.#heightWeights);
    partFactors(plan, this.#component, heightM, this.#factors);
    for (const [d, samples] of this.#samples.entries()) {
      rowTotals(samples, plan.partCount, 2 * plan.order + 1, this.#heightWeights, this.#factors, this.#row);
      this.#byAngle.set(d, this.#row);
    }
  }

  #setAngle(angleRad: number): void {
    const { order, heightsM, partCount } = this.#field.plan;
    trigonometricWeights(order, angleRad, this.#angleWeights);
    const angles = 2 * order + 1;
    const width = 2 * heightsM.length;
    for (const [d, samples] of this.#samples.entries()) {
      const column = this.#column.fill(0);
      for (let part = 0; part < partCount; part++) {
        for (let a = 0; a < angles; a++) {
          const weight = this.#angleWeights[a]!;
          const from = (part * angles + a) * width;
          for (let i = 0; i < width; i++) column[part * width + i]! += weight * samples[from + i]!;
        }
      }
      this.#byHeight.set(d, column);
    }
  }
}
