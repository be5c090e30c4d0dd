import type { Radiator } from '../fields/element-set.ts';
import { SAMPLE_STRIDE } from '../site/antenna-sample.ts';
import { type CylinderPlan, centreDistanceM, cylinderPlan, fieldOnCylinder } from '../site/cylinder-field.ts';
import type { Component } from '../site/power-map.ts';
import { chebyshevWeights, trigonometricWeights } from '../site/sampling.ts';
import type { ScanRequest } from '../site/scan.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from '../site/site.ts';

export const COMPONENTS: readonly Component[] = ['horizontal', 'vertical'];

/** Search grid: at least this many angles, and this many for each order of the field. */
const LEAST_ANGLES = 36;
const ANGLES_PER_ORDER = 4;
/** Heights: at most this far apart, m, and this many a wavelength (the power's period is two wavelengths and more). */
const LARGEST_STEP_M = 0.3;
const HEIGHTS_PER_WAVELENGTH = 4;

/** Angles and heights at which the total field is kept to find maxima. */
export interface SearchGrid {
  readonly angleCount: number;
  readonly heightCount: number;
  readonly stepRad: number;
  readonly stepM: number;
}

export function searchGrid({ order, kPerM }: CylinderPlan): SearchGrid {
  const angleCount = Math.max(LEAST_ANGLES, ANGLES_PER_ORDER * order);
  const travelM = ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M;
  const stepM = Math.min(LARGEST_STEP_M, (2 * Math.PI) / kPerM / HEIGHTS_PER_WAVELENGTH);
  const heightCount = Math.ceil(travelM / stepM) + 1;
  return { angleCount, heightCount, stepRad: (2 * Math.PI) / angleCount, stepM: travelM / (heightCount - 1) };
}

/** Bytes that the fields of one unit excitation take. */
export const bytesPerUnit = (plan: CylinderPlan): number =>
  Float32Array.BYTES_PER_ELEMENT * 2 * COMPONENTS.length * (samplePlaces(plan) + gridPlaces(searchGrid(plan)));

const samplePlaces = ({ partCount, order, heightsM }: CylinderPlan): number =>
  partCount * (2 * order + 1) * heightsM.length;
const gridPlaces = ({ angleCount, heightCount }: SearchGrid): number => angleCount * heightCount;

/** How one domain excites the units: a complex factor (re, im) for each. */
export type Amplitudes = Float64Array;

/**
 * Fields of unit excitations on the antenna's cylinder at one frequency, kept so that the field of any mixture of them is
 * found again: as sampled for the scan (`fieldOnCylinder`), and the total at the points of a search grid. In single
 * precision: they only find the place of a maximum.
 */
export class KeptField {
  readonly plan: CylinderPlan;
  readonly grid: SearchGrid;
  readonly #unitCount: number;
  /** Per component: [unit][part][angle][height][re, im], e^(−jkR0)/R0 taken out. */
  readonly #samples: Record<Component, Float32Array>;
  /** Per component: [unit][height][angle][re, im], V/m. */
  readonly #totals: Record<Component, Float32Array>;

  constructor(units: readonly (readonly Radiator[])[], { kPerM, scanRadiusM, site, box, terms }: ScanRequest) {
    this.plan = cylinderPlan(kPerM, scanRadiusM, units.flat(), site);
    this.grid = searchGrid(this.plan);
    this.#unitCount = units.length;
    const perUnit = 2 * samplePlaces(this.plan);
    const totalsPerUnit = 2 * gridPlaces(this.grid);
    const empty = (size: number) => ({ horizontal: new Float32Array(size), vertical: new Float32Array(size) });
    this.#samples = empty(perUnit * units.length);
    this.#totals = empty(totalsPerUnit * units.length);
    const toGrid = new GridInterpolation(this.plan, this.grid);
    for (const [unit, field] of fieldOnCylinder(units, this.plan, box, terms).entries()) {
      for (const [c, component] of COMPONENTS.entries()) {
        const own = new Float64Array(perUnit);
        for (let i = 0; i < perUnit; i += 2) {
          own[i] = field[(i / 2) * SAMPLE_STRIDE + 2 * c]!;
          own[i + 1] = field[(i / 2) * SAMPLE_STRIDE + 2 * c + 1]!;
        }
        this.#samples[component].set(own, unit * perUnit);
        this.#totals[component].set(toGrid.totals(own, component), unit * totalsPerUnit);
      }
    }
  }

  /** Power (peak phasor squared, V²/m²) of the domains' mixtures on the search grid: [height][angle]. */
  powerOnGrid(component: Component, domains: readonly Amplitudes[]): Float64Array {
    const perUnit = 2 * gridPlaces(this.grid);
    const out = new Float64Array(perUnit / 2);
    const mixed = new Float64Array(perUnit);
    for (const amplitudes of domains) {
      this.#mix(this.#totals[component], perUnit, amplitudes, mixed);
      for (let i = 0; i < out.length; i++) out[i]! += mixed[2 * i]! ** 2 + mixed[2 * i + 1]! ** 2;
    }
    return out;
  }

  /** One component's samples of every domain's mixture: [part][angle][height][re, im]. */
  mixtures(component: Component, domains: readonly Amplitudes[]): Float64Array[] {
    const perUnit = 2 * samplePlaces(this.plan);
    return domains.map((amplitudes) => {
      const mixed = new Float64Array(perUnit);
      this.#mix(this.#samples[component], perUnit, amplitudes, mixed);
      return mixed;
    });
  }

  #mix(kept: Float32Array, perUnit: number, amplitudes: Amplitudes, out: Float64Array): void {
    out.fill(0);
    for (let unit = 0; unit < this.#unitCount; unit++) {
      const re = amplitudes[2 * unit]!;
      const im = amplitudes[2 * unit + 1]!;
      if (re === 0 && im === 0) continue;
      const from = unit * perUnit;
      for (let i = 0; i < perUnit; i += 2) {
        const fRe = kept[from + i]!;
        const fIm = kept[from + i + 1]!;
        out[i]! += re * fRe - im * fIm;
        out[i + 1]! += re * fIm + im * fRe;
      }
    }
  }
}

/**
 * Factor of each part of one component at an antenna height (re, im per part): e^(−jkR0)/R0, the mirrored part of the
 * horizontal component reversed.
 */
export function partFactors(plan: CylinderPlan, component: Component, heightM: number, out: Float64Array): void {
  for (let part = 0; part < plan.partCount; part++) {
    const distanceM = centreDistanceM(plan, part === 0 ? heightM : -heightM);
    const size = (part === 1 && component === 'horizontal' ? -1 : 1) / distanceM;
    out[2 * part] = size * Math.cos(plan.kPerM * distanceM);
    out[2 * part + 1] = -size * Math.sin(plan.kPerM * distanceM);
  }
}

/** From a unit's samples to its total field on the search grid. */
class GridInterpolation {
  readonly #plan: CylinderPlan;
  readonly #grid: SearchGrid;
  readonly #heightWeights: Float64Array;
  readonly #angleWeights: Float64Array;

  constructor(plan: CylinderPlan, grid: SearchGrid) {
    this.#plan = plan;
    this.#grid = grid;
    const angles = 2 * plan.order + 1;
    this.#heightWeights = new Float64Array(grid.heightCount * plan.heightsM.length);
    for (let h = 0; h < grid.heightCount; h++) {
      const heightM = ANTENNA_LOWEST_M + h * grid.stepM;
      chebyshevWeights(plan.heightsM, heightM, this.#heightWeights, h * plan.heightsM.length);
    }
    this.#angleWeights = new Float64Array(grid.angleCount * angles);
    for (let a = 0; a < grid.angleCount; a++) {
      trigonometricWeights(plan.order, a * grid.stepRad, this.#angleWeights, a * angles);
    }
  }

  totals(samples: Float64Array, component: Component): Float64Array {
    const { partCount, order, heightsM } = this.#plan;
    const { angleCount, heightCount, stepM } = this.#grid;
    const angles = 2 * order + 1;
    const heights = heightsM.length;
    const out = new Float64Array(2 * angleCount * heightCount);
    const row = new Float64Array(2 * angles);
    const factors = new Float64Array(2 * partCount);
    for (let h = 0; h < heightCount; h++) {
      partFactors(this.#plan, component, ANTENNA_LOWEST_M + h * stepM, factors);
      rowTotals(samples, partCount, angles, this.#heightWeights.subarray(h * heights, (h + 1) * heights), factors, row);
      for (let a = 0; a < angleCount; a++) {
        let re = 0;
        let im = 0;
        for (let i = 0; i < angles; i++) {
          const weight = this.#angleWeights[a * angles + i]!;
          re += weight * row[2 * i]!;
          im += weight * row[2 * i + 1]!;
        }
        out[2 * (h * angleCount + a)] = re;
        out[2 * (h * angleCount + a) + 1] = im;
      }
    }
    return out;
  }
}

/** Total field at one height on the sampled angles (re, im each), from samples, the height's weights and the parts' factors. */
export function rowTotals(
  samples: Float64Array,
  partCount: number,
  angles: number,
  heightWeights: Float64Array,
  factors: Float64Array,
  out: Float64Array,
): void {
  const heights = heightWeights.length;
  for (let a = 0; a < angles; a++) {
    let totalRe = 0;
    let totalIm = 0;
    for (let part = 0; part < partCount; part++) {
      let re = 0;
      let im = 0;
      const from = 2 * (part * angles + a) * heights;
      for (let h = 0; h < heights; h++) {
        re += heightWeights[h]! * samples[from + 2 * h]!;
        im += heightWeights[h]! * samples[from + 2 * h + 1]!;
      }
      totalRe += factors[2 * part]! * re - factors[2 * part + 1]! * im;
      totalIm += factors[2 * part]! * im + factors[2 * part + 1]! * re;
    }
    out[2 * a] = totalRe;
    out[2 * a + 1] = totalIm;
  }
}
