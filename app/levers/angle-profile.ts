import type { Jet } from './ascend.ts';

/** Cosine and sine of 2πi/count. */
const tables = new Map<number, { readonly cos: Float64Array; readonly sin: Float64Array }>();

function tableOf(count: number): { readonly cos: Float64Array; readonly sin: Float64Array } {
  let table = tables.get(count);
  if (!table) {
    const angles = Float64Array.from({ length: count }, (_, i) => (2 * Math.PI * i) / count);
    table = { cos: angles.map(Math.cos), sin: angles.map(Math.sin) };
    tables.set(count, table);
  }
  return table;
}

/**
 * Power along the angle, P(φ) = Σ_d |g_d(φ)|² with g = Σ_m c_m e^(jmφ), |m| ≤ order: exact from 2·order + 1 equally spaced samples of
 * each domain's field. P' = 2 Re Σ g* g', P'' = 2 Σ (|g'|² + Re g* g'').
 */
export class AngleProfile {
  readonly #order: number;
  /** Per domain: c_m from −order on, re and im. */
  readonly #coefficients: readonly Float64Array[];

  constructor(order: number, domainCount: number) {
    this.#order = order;
    this.#coefficients = Array.from({ length: domainCount }, () => new Float64Array(2 * (2 * order + 1)));
  }

  /** Takes over one domain's samples (re, im) at the angles 2πi/(2·order + 1). */
  set(domain: number, samples: Float64Array): void {
    const count = 2 * this.#order + 1;
    const { cos, sin } = tableOf(count);
    const out = this.#coefficients[domain]!;
    for (let m = -this.#order; m <= this.#order; m++) {
      let re = 0;
      let im = 0;
      const stride = m < 0 ? m + count : m;
      let at = 0;
      for (let i = 0; i < count; i++) {
        re += samples[2 * i]! * cos[at]! + samples[2 * i + 1]! * sin[at]!;
        im += samples[2 * i + 1]! * cos[at]! - samples[2 * i]! * sin[at]!;
        at += stride;
        if (at >= count) at -= count;
      }
      out[2 * (m + this.#order)] = re / count;
      out[2 * (m + this.#order) + 1] = im / count;
    }
  }

  jetAt(angleRad: number, out: Jet): void {
    const stepRe = Math.cos(angleRad);
    const stepIm = Math.sin(angleRad);
    const firstRe = Math.cos(this.#order * angleRad);
    const firstIm = -Math.sin(this.#order * angleRad);
    out.fill(0);
    for (const coefficients of this.#coefficients) {
      let [re, im, re1, im1, re2, im2] = [0, 0, 0, 0, 0, 0];
      let turnRe = firstRe;
      let turnIm = firstIm;
      for (let i = 0, m = -this.#order; m <= this.#order; i += 2, m++) {
        const cRe = coefficients[i]! * turnRe - coefficients[i + 1]! * turnIm;
        const cIm = coefficients[i]! * turnIm + coefficients[i + 1]! * turnRe;
        re += cRe;
        im += cIm;
        re1 -= m * cIm;
        im1 += m * cRe;
        re2 -= m * m * cRe;
        im2 -= m * m * cIm;
        const next = turnRe * stepRe - turnIm * stepIm;
        turnIm = turnRe * stepIm + turnIm * stepRe;
        turnRe = next;
      }
      out[0]! += re * re + im * im;
      out[1]! += 2 * (re * re1 + im * im1);
      out[2]! += 2 * (re1 * re1 + im1 * im1 + re * re2 + im * im2);
    }
  }
}
