import { MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { type SymmetricMatrix, SymmetricSystem } from './factor.ts';
import type { Incident } from './incident.ts';
import type { Mesh } from './mesh.ts';
import { PartialElements } from './partials.ts';

/** Currents of the mesh's edges, peak phasors, A. */
export interface EdgeCurrents {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export const newCurrents = (count: number): EdgeCurrents => ({
  re: new Float64Array(count),
  im: new Float64Array(count),
});

/** Impedance in series with an edge, Ω. */
export interface SeriesImpedance {
  readonly edge: number;
  readonly re: number;
  readonly im: number;
}

/** Fills and factors the matrix at one frequency, then solves any number of excitations. Keeps its buffers. */
export class StructureSolver {
  readonly mesh: Mesh;
  readonly #partials: PartialElements;
  readonly #nodes: SymmetricMatrix;
  readonly #edges: SymmetricSystem;
  /** Potential of what is injected, 1/m · A. */
  readonly #injected: EdgeCurrents;
  #kPerM = 0;

  constructor(mesh: Mesh) {
    this.mesh = mesh;
    this.#partials = new PartialElements(mesh);
    const size = mesh.nodeCount;
    this.#nodes = { size, re: new Float64Array(size * size), im: new Float64Array(size * size) };
    this.#edges = new SymmetricSystem(mesh.edgeCount);
    this.#injected = newCurrents(size);
  }

  setFrequency(frequencyHz: number, series: readonly SeriesImpedance[]): void {
    const omega = 2 * Math.PI * frequencyHz;
    this.#kPerM = omega / SPEED_OF_LIGHT_M_PER_S;
    this.#partials.fill(this.#kPerM, this.#nodes, this.#edges);
    const scale = (4 * Math.PI) / (omega * MU0_H_PER_M);
    const { size, re, im } = this.#edges;
    for (const { edge, re: ohm, im: reactance } of series) {
      // Z · 4π/(jωµ0): (R + jX)/j = X − jR
      re[edge * size + edge]! += scale * reactance;
      im[edge * size + edge]! -= scale * ohm;
    }
    this.#edges.factor();
  }

  /** Currents for one excitation at the frequency set last. */
  solve(incident: Incident): EdgeCurrents {
    const { re, im } = this.rightHandSide(incident);
    this.solveInPlace(re, im);
    return { re, im };
  }

  /**
   * Turns a right-hand side into its solution. The matrix is symmetric: g·Z⁻¹v = (Z⁻¹g)·v, so the solution for the weights g
   * of an observer serves every excitation v (reciprocity).
   */
  solveInPlace(re: Float64Array, im: Float64Array): void {
    this.#edges.solve(re, im);
  }

  /** Right-hand side of the edges' equations for one excitation at the frequency set last, in `out`. */
  rightHandSide(incident: Incident, out = newCurrents(this.mesh.edgeCount)): EdgeCurrents {
    const { edgeCount, edgeFrom, edgeTo } = this.mesh;
    const omegaMu = this.#kPerM * SPEED_OF_LIGHT_M_PER_S * MU0_H_PER_M;
    const scale = (4 * Math.PI) / omegaMu;
    const chargeScale = 1 / (this.#kPerM * this.#kPerM);
    const { re: gRe, im: gIm } = this.#injected;
    this.#injectedPotential(incident, gRe, gIm);
    const { re, im } = out;
    for (let e = 0; e < edgeCount; e++) {
      const from = edgeFrom[e]!;
      const to = edgeTo[e]!;
      const vRe = incident.emfRe[e]! + incident.potentialRe[from]! - (to < 0 ? 0 : incident.potentialRe[to]!);
      const vIm = incident.emfIm[e]! + incident.potentialIm[from]! - (to < 0 ? 0 : incident.potentialIm[to]!);
      // v · 4π/(jωµ0): −j v
      re[e] = scale * vIm + chargeScale * ((to < 0 ? 0 : gRe[to]!) - gRe[from]!);
      im[e] = -scale * vRe + chargeScale * ((to < 0 ? 0 : gIm[to]!) - gIm[from]!);
    }
    return out;
  }

  /** Σ G · injected current at every node (1/m · A); zero without injection. */
  #injectedPotential({ injectedRe, injectedIm }: Incident, outRe: Float64Array, outIm: Float64Array): void {
    const { size, re, im } = this.#nodes;
    outRe.fill(0);
    outIm.fill(0);
    for (let n = 0; n < size; n++) {
      const iRe = injectedRe[n]!;
      const iIm = injectedIm[n]!;
      if (iRe === 0 && iIm === 0) continue;
      const row = n * size;
      for (let m = 0; m < size; m++) {
        outRe[m]! += re[row + m]! * iRe - im[row + m]! * iIm;
        outIm[m]! += re[row + m]! * iIm + im[row + m]! * iRe;
      }
    }
  }
}
