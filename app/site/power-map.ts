import { SAMPLE_STRIDE } from './antenna-sample.ts';
import { type CylinderPlan, centreDistanceM, samplingOf } from './cylinder-field.ts';
import { resample, type Sampling } from './resample.ts';
import { chebyshevNodes, chebyshevWeights, trigonometricWeights } from './sampling.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from './site.ts';

/** Horizontal (φ) or vertical (z) component. */
export type Component = 'horizontal' | 'vertical';

/**
 * Power of all domains on the antenna's cylinder, exact between its samples.
 *
 * The total of a direct part d and a mirrored part i with the phase factors R0 put back is
 *   P = Σ|d|²/Rd² + Σ|i|²/Ri² ± 2 Re(Σ d i* e^(−jk(Rd − Ri)))/(Rd Ri),
 * and each of the three sums over domains is a trigonometric polynomial of twice the field's order in angle and of twice
 * its degree in height: it is sampled on 4N + 1 angles and 2H − 1 heights, so any number of domains costs one search.
 */
export class PowerMap {
  readonly plan: CylinderPlan;
  readonly component: Component;
  readonly order: number;
  readonly heightsM: Float64Array;
  /** [angle][height][direct power, mirrored power, cross re, cross im]. */
  readonly #sums: Float64Array;

  constructor(plan: CylinderPlan, component: Component) {
    this.plan = plan;
    this.component = component;
    this.order = 2 * plan.order;
    const { angleCount, heightCount } = powerSampling(plan);
    this.heightsM = chebyshevNodes(heightCount, ANTENNA_LOWEST_M, ANTENNA_HIGHEST_M);
    this.#sums = new Float64Array(angleCount * heightCount * 4);
  }

  /** Adds one domain's field (as `onPowerGrid` returns it). */
  addDomain([direct, mirrored]: readonly Float64Array[]): void {
    const sums = this.#sums;
    const offset = this.component === 'horizontal' ? 0 : 2;
    for (let i = 0; i < sums.length / 4; i++) {
      const at = i * SAMPLE_STRIDE + offset;
      const dRe = direct![at]!;
      const dIm = direct![at + 1]!;
      sums[4 * i]! += dRe * dRe + dIm * dIm;
      if (!mirrored) continue;
      const mRe = mirrored[at]!;
      const mIm = mirrored[at + 1]!;
      sums[4 * i + 1]! += mRe * mRe + mIm * mIm;
      sums[4 * i + 2]! += dRe * mRe + dIm * mIm;
      sums[4 * i + 3]! += dIm * mRe - dRe * mIm;
    }
  }

  /** Power (peak phasor squared, V²/m²) at one height on the fine angles, given the height's weights. */
  rowAt(heightM: number, heightWeights: Float64Array, offset: number, out: Float64Array): void {
    this.#combine(this.#sums, heightM, heightWeights, offset, out);
  }

  /** Direct, mirrored and cross sums at one height put together, for each angle in `sums`. */
  #combine(sums: Float64Array, heightM: number, heightWeights: Float64Array, offset: number, out: Float64Array): void {
    const { plan } = this;
    const directM = centreDistanceM(plan, heightM);
    const mirroredM = centreDistanceM(plan, -heightM);
    const sign = this.component === 'horizontal' ? -2 : 2;
    const phase = plan.kPerM * (directM - mirroredM);
    const crossRe = (sign * Math.cos(phase)) / (directM * mirroredM);
    const crossIm = (sign * Math.sin(phase)) / (directM * mirroredM);
    const first = 1 / directM ** 2;
    const second = 1 / mirroredM ** 2;
    const count = this.heightsM.length;
    for (let a = 0; a < out.length; a++) {
      let direct = 0;
      let mirrored = 0;
      let re = 0;
      let im = 0;
      for (let h = 0; h < count; h++) {
        const weight = heightWeights[offset + h]!;
        const at = 4 * (a * count + h);
        direct += weight * sums[at]!;
        mirrored += weight * sums[at + 1]!;
        re += weight * sums[at + 2]!;
        im += weight * sums[at + 3]!;
      }
      out[a] = direct * first + (plan.partCount === 2 ? mirrored * second + re * crossRe + im * crossIm : 0);
    }
  }

  /** Power as a function of the angle at one height, V²/m² (peak phasor squared). */
  alongAngle(heightM: number): (angleRad: number) => number {
    const heightWeights = new Float64Array(this.heightsM.length);
    chebyshevWeights(this.heightsM, heightM, heightWeights);
    const row = new Float64Array(2 * this.order + 1);
    this.rowAt(heightM, heightWeights, 0, row);
    const angleWeights = new Float64Array(row.length);
    return (angleRad) => {
      trigonometricWeights(this.order, angleRad, angleWeights);
      let power = 0;
      for (let a = 0; a < row.length; a++) power += angleWeights[a]! * row[a]!;
      return power;
    };
  }

  /** Power as a function of the height at one angle, V²/m² (peak phasor squared). */
  alongHeight(angleRad: number): (heightM: number) => number {
    const angleWeights = new Float64Array(2 * this.order + 1);
    trigonometricWeights(this.order, angleRad, angleWeights);
    const count = this.heightsM.length;
    const column = new Float64Array(4 * count);
    for (let a = 0; a < angleWeights.length; a++) {
      for (let i = 0; i < 4 * count; i++) column[i]! += angleWeights[a]! * this.#sums[4 * a * count + i]!;
    }
    const heightWeights = new Float64Array(count);
    return (heightM) => {
      chebyshevWeights(this.heightsM, heightM, heightWeights);
      const power = new Float64Array(1);
      this.#combine(column, heightM, heightWeights, 0, power);
      return power[0]!;
    };
  }

  /** Power at any angle and height, V²/m² (peak phasor squared). */
  powerAt(angleRad: number, heightM: number): number {
    return this.alongAngle(heightM)(angleRad);
  }
}

/** Angles and heights that hold the square of what a plan's samples hold. */
const powerSampling = ({ order, heightsM }: CylinderPlan): Sampling => ({
  angleCount: 4 * order + 1,
  heightCount: 2 * heightsM.length - 1,
});

/** A field as `fieldOnCylinder` returns it, interpolated to the places of a power map: one array for each part. */
export function onPowerGrid(plan: CylinderPlan, samples: Float64Array): Float64Array[] {
  const from = samplingOf(plan);
  const perPart = from.angleCount * from.heightCount * SAMPLE_STRIDE;
  return Array.from({ length: plan.partCount }, (_, part) =>
    resample(samples, part * perPart, SAMPLE_STRIDE, from, powerSampling(plan)),
  );
}
