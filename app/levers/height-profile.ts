import type { CylinderPlan } from '../site/cylinder-field.ts';
import type { Component } from '../site/power-map.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from '../site/site.ts';
import type { Jet } from './ascend.ts';

const HALF_TRAVEL_M = (ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M) / 2;
const MIDDLE_M = (ANTENNA_HIGHEST_M + ANTENNA_LOWEST_M) / 2;

/** [term][node]: what a sample at a Chebyshev point gives to each coefficient. */
const tables = new Map<number, Float64Array>();

function tableOf(count: number): Float64Array {
  let table = tables.get(count);
  if (!table) {
    table = new Float64Array(count * count);
    for (let n = 0; n < count; n++) {
      // Node i lies at −cos θ: T_n(−cos θ) = (−1)^n cos nθ.
      const size = ((n % 2 === 0 ? 1 : -1) * (n === 0 ? 1 : 2)) / count;
      for (let i = 0; i < count; i++) table[n * count + i] = size * Math.cos((n * Math.PI * (i + 0.5)) / count);
    }
    tables.set(count, table);
  }
  return table;
}

/**
 * Power along the height, P(h) = Σ_d |Σ_part f_part(h) p_part(h)|²: the sampled fields p are polynomials in h (Chebyshev
 * series; values and derivatives by the recurrences of T_n, T_n', T_n''), and f = ±e^(−jkR)/R with
 *   f' = f u R',   f'' = f (u² R'² + R'²/R² + u R''),   u = −jk − 1/R,   R' = (h ∓ z0)/R,   R'' = (1 − R'²)/R.
 */
export class HeightProfile {
  readonly #plan: CylinderPlan;
  readonly #component: Component;
  /** Per domain: [part][term][re, im]. */
  readonly #series: readonly Float64Array[];
  /** Per part: f, f', f'' (re, im each). */
  readonly #factors: Float64Array;
  /** Per domain: field, its first and second derivative (re, im each). */
  readonly #sums: Float64Array;

  constructor(plan: CylinderPlan, component: Component, domainCount: number) {
    this.#plan = plan;
    this.#component = component;
    this.#series = Array.from(
      { length: domainCount },
      () => new Float64Array(2 * plan.partCount * plan.heightsM.length),
    );
    this.#factors = new Float64Array(6 * plan.partCount);
    this.#sums = new Float64Array(6);
  }

  /** Takes over one domain's samples at the plan's heights: [part][height][re, im]. */
  set(domain: number, samples: Float64Array): void {
    const count = this.#plan.heightsM.length;
    const table = tableOf(count);
    const out = this.#series[domain]!;
    for (let part = 0; part < this.#plan.partCount; part++) {
      const from = 2 * part * count;
      for (let n = 0; n < count; n++) {
        let re = 0;
        let im = 0;
        for (let i = 0; i < count; i++) {
          re += table[n * count + i]! * samples[from + 2 * i]!;
          im += table[n * count + i]! * samples[from + 2 * i + 1]!;
        }
        out[from + 2 * n] = re;
        out[from + 2 * n + 1] = im;
      }
    }
  }

  jetAt(heightM: number, out: Jet): void {
    for (let part = 0; part < this.#plan.partCount; part++) this.#setFactor(part, heightM);
    out.fill(0);
    const g = this.#sums;
    for (const series of this.#series) {
      g.fill(0);
      for (let part = 0; part < this.#plan.partCount; part++) this.#addPart(series, part, heightM);
      const [re, im, re1, im1, re2, im2] = [g[0]!, g[1]!, g[2]!, g[3]!, g[4]!, g[5]!];
      out[0]! += re * re + im * im;
      out[1]! += 2 * (re * re1 + im * im1);
      out[2]! += 2 * (re1 * re1 + im1 * im1 + re * re2 + im * im2);
    }
  }

  #setFactor(part: number, heightM: number): void {
    const { kPerM, radiusM, centreZM } = this.#plan;
    const riseM = part === 0 ? heightM - centreZM : heightM + centreZM;
    const distanceM = Math.hypot(radiusM, riseM);
    const slope = riseM / distanceM;
    const size = (part === 1 && this.#component === 'horizontal' ? -1 : 1) / distanceM;
    const re = size * Math.cos(kPerM * distanceM);
    const im = -size * Math.sin(kPerM * distanceM);
    const uRe = -1 / distanceM;
    const uIm = -kPerM;
    const firstRe = uRe * slope;
    const firstIm = uIm * slope;
    const bend = (1 - slope * slope) / distanceM;
    const secondRe = firstRe * firstRe - firstIm * firstIm + (slope / distanceM) ** 2 + uRe * bend;
    const secondIm = 2 * firstRe * firstIm + uIm * bend;
    const f = this.#factors;
    const at = 6 * part;
    f[at] = re;
    f[at + 1] = im;
    f[at + 2] = re * firstRe - im * firstIm;
    f[at + 3] = re * firstIm + im * firstRe;
    f[at + 4] = re * secondRe - im * secondIm;
    f[at + 5] = re * secondIm + im * secondRe;
  }

  #addPart(series: Float64Array, part: number, heightM: number): void {
    const count = this.#plan.heightsM.length;
    const x = (heightM - MIDDLE_M) / HALF_TRAVEL_M;
    // T, T', T'' of this term and the one before it.
    let [t, t1, t2] = [1, 0, 0];
    let [before, before1, before2] = [x, 1, 0];
    let [re, im, re1, im1, re2, im2] = [0, 0, 0, 0, 0, 0];
    const from = 2 * part * count;
    for (let n = 0; n < count; n++) {
      const cRe = series[from + 2 * n]!;
      const cIm = series[from + 2 * n + 1]!;
      re += cRe * t;
      im += cIm * t;
      re1 += cRe * t1;
      im1 += cIm * t1;
      re2 += cRe * t2;
      im2 += cIm * t2;
      const next = 2 * x * t - before;
      const next1 = 2 * t + 2 * x * t1 - before1;
      const next2 = 4 * t1 + 2 * x * t2 - before2;
      [before, before1, before2] = [t, t1, t2];
      [t, t1, t2] = [next, next1, next2];
    }
    re1 /= HALF_TRAVEL_M;
    im1 /= HALF_TRAVEL_M;
    re2 /= HALF_TRAVEL_M ** 2;
    im2 /= HALF_TRAVEL_M ** 2;
    const g = this.#sums;
    const f = this.#factors.subarray(6 * part, 6 * part + 6);
    const [f0Re, f0Im, f1Re, f1Im, f2Re, f2Im] = [f[0]!, f[1]!, f[2]!, f[3]!, f[4]!, f[5]!];
    g[0]! += f0Re * re - f0Im * im;
    g[1]! += f0Re * im + f0Im * re;
    g[2]! += f0Re * re1 - f0Im * im1 + f1Re * re - f1Im * im;
    g[3]! += f0Re * im1 + f0Im * re1 + f1Re * im + f1Im * re;
    g[4]! += f0Re * re2 - f0Im * im2 + 2 * (f1Re * re1 - f1Im * im1) + f2Re * re - f2Im * im;
    g[5]! += f0Re * im2 + f0Im * re2 + 2 * (f1Re * im1 + f1Im * re1) + f2Re * im + f2Im * re;
  }
}
