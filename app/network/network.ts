import type { Line } from '../lines/cross-section.ts';

/** A uniform piece of line between two nodes; γ = α(f) + jω√ε_eff/c. */
export interface LineSection {
  readonly nodeA: number;
  readonly nodeB: number;
  readonly lengthM: number;
  readonly line: Pick<Line, 'z0Ohm' | 'epsilonEff' | 'alphaNpPerM'>;
}

/** A via barrel in series. */
export interface LumpedBranch {
  readonly nodeA: number;
  readonly nodeB: number;
  readonly inductanceH: number;
}

/** Thévenin driver: an ideal source behind R (0 allowed) from the return to the node. */
export interface NetworkDrive {
  readonly node: number;
  readonly resistanceOhm: number;
}

/** R ∥ C to the return; no resistance given: C alone. */
export interface NetworkLoad {
  readonly node: number;
  readonly resistanceOhm?: number;
  readonly capacitanceF: number;
}

export interface Network {
  readonly nodeCount: number;
  readonly sections: readonly LineSection[];
  readonly branches: readonly LumpedBranch[];
  readonly drives: readonly NetworkDrive[];
  readonly loads: readonly NetworkLoad[];
}

/** Response to 1 V (peak) of one drive, the others at 0 V behind their R. All arrays re, im per entry. */
export interface NetworkResponse {
  readonly nodeVoltages: Float64Array;
  /** I⁺ and I⁻ per section, referred to node A: I(s) = I⁺e^(−γs) + I⁻e^(+γs), positive from A to B, A. */
  readonly forward: Float64Array;
  readonly backward: Float64Array;
  /** Per branch, positive from A to B, A. */
  readonly branchCurrents: Float64Array;
  /** Per drive, out of the source into the net, A. */
  readonly driveCurrents: Float64Array;
  /** Per load, into the load, A. A shorted load (0 Ω) takes what arrives at its node. */
  readonly loadCurrents: Float64Array;
  /** Per section, 1/m. */
  readonly gamma: Float64Array;
}
