import { inputError } from '../errors.ts';
import type { Line } from '../lines/cross-section.ts';
import type { Complex } from '../math/complex.ts';

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

/** R ∥ C to the return; no resistance given: C alone. An impedance given as a function takes the place of both. */
export interface NetworkLoad {
  readonly node: number;
  readonly resistanceOhm?: number;
  readonly capacitanceF: number;
  readonly impedance?: (frequencyHz: number) => Complex;
}

/** Must not be changed once solved: what is prepared for it is kept. */
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

/** Throws `input` when an element is impossible, or when two ideal sources, or one and a short, meet at a node. */
export function checkNetwork({ nodeCount, sections, branches, drives, loads }: Network): void {
  const expectNode = (path: string, node: number) => {
    const isNode = Number.isInteger(node) && node >= 0 && node < nodeCount;
    if (!isNode) throw inputError(path, `a node number below ${nodeCount}`, node);
  };
  const expectNotNegative = (path: string, amount: number) => {
    if (!(amount >= 0 && amount < Infinity)) throw inputError(path, 'a finite number of at least 0', amount);
  };
  for (const [i, { nodeA, nodeB, lengthM, line }] of sections.entries()) {
    expectNode(`sections[${i}].nodeA`, nodeA);
    expectNode(`sections[${i}].nodeB`, nodeB);
    expectNotNegative(`sections[${i}].lengthM`, lengthM);
    expectNotNegative(`sections[${i}].line.epsilonEff`, line.epsilonEff);
    if (!(line.z0Ohm > 0 && line.z0Ohm < Infinity))
      throw inputError(`sections[${i}].line.z0Ohm`, 'positive', line.z0Ohm);
  }
  for (const [i, { nodeA, nodeB, inductanceH }] of branches.entries()) {
    expectNode(`branches[${i}].nodeA`, nodeA);
    expectNode(`branches[${i}].nodeB`, nodeB);
    expectNotNegative(`branches[${i}].inductanceH`, inductanceH);
  }
  const idealAt = new Set<number>();
  for (const [i, { node, resistanceOhm }] of drives.entries()) {
    expectNode(`drives[${i}].node`, node);
    expectNotNegative(`drives[${i}].resistanceOhm`, resistanceOhm);
    if (resistanceOhm > 0) continue;
    if (idealAt.has(node)) {
      throw inputError(`drives[${i}].resistanceOhm`, 'above 0 where another ideal source drives the same place', 0);
    }
    idealAt.add(node);
  }
  for (const [i, { node, resistanceOhm = Infinity, capacitanceF }] of loads.entries()) {
    expectNode(`loads[${i}].node`, node);
    expectNotNegative(`loads[${i}].capacitanceF`, capacitanceF);
    if (!(resistanceOhm >= 0)) throw inputError(`loads[${i}].resistanceOhm`, 'at least 0', resistanceOhm);
    if (resistanceOhm === 0 && idealAt.has(node)) {
      throw inputError(`loads[${i}].resistanceOhm`, 'above 0 where an ideal source drives the same place', 0);
    }
  }
}
