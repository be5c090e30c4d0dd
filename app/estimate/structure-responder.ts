import { solveNetwork } from '../network/solve-network.ts';
import { emptyIncident } from '../structure/incident.ts';
import { interleaved, type StructureModel } from '../structure/structure-model.ts';
import { addScaled } from '../sweep/aaa.ts';
import { adaptiveSweep, type Solved, type Sweep } from '../sweep/adaptive-sweep.ts';
import { type Scene, SOLVED_TO_HZ } from './scene.ts';

/** Structure currents (re, im per edge, A) for 1 V of each drive and 1 A in each loop, in the order of `units`. */
type UnitCurrents = readonly Float64Array[];

/** With no more lines than this every line is solved itself; more are interpolated between solved frequencies. */
const DIRECT_LINES = 64;
/** 0.05 dB: half of what is allowed at a line. */
const TOLERANCE = 0.006;
const MOST_SOLUTIONS = 160;
/** Responses that stand for all of them in the fit. */
const SKETCHED_UNITS = 12;

/**
 * The structure's response to every drive and loop over a set of frequencies: one factorisation per solved frequency for
 * all of them, interpolated by a rational function with a checked error where there are many lines.
 */
export class StructureResponder {
  readonly #scene: Scene;
  readonly #model: StructureModel;
  readonly #unitOf = new Map<string, number>();
  readonly #sweep: Sweep<UnitCurrents> | null;
  readonly #onSolve: (() => void) | undefined;

  /** `frequenciesHz`: the lines to be served, ascending. `onSolve` is called before each solution (stop, progress). */
  constructor(scene: Scene, model: StructureModel, frequenciesHz: readonly number[], onSolve?: () => void) {
    this.#scene = scene;
    this.#model = model;
    this.#onSolve = onSolve;
    for (const net of scene.nets.values()) {
      for (const driveIndex of net.drives.keys())
        this.#unitOf.set(unitKey('net', net.name, driveIndex), this.#unitOf.size);
    }
    for (const name of scene.loops.keys()) this.#unitOf.set(unitKey('loop', name, 0), this.#unitOf.size);
    const served = frequenciesHz.filter((hz) => hz <= SOLVED_TO_HZ);
    this.#sweep =
      served.length > DIRECT_LINES
        ? adaptiveSweep((hz) => this.#solved(hz), {
            fromHz: served[0]!,
            toHz: served.at(-1)!,
            tolerance: TOLERANCE,
            mostSolutions: Math.min(MOST_SOLUTIONS, served.length),
          })
        : null;
  }

  /** False when interpolation did not reach its tolerance everywhere. */
  get isConverged(): boolean {
    return this.#sweep?.isConverged ?? true;
  }

  /** Currents at a frequency as a function of the driver (a net's drive, or a loop); null above the solved range. */
  at(frequencyHz: number): ((kind: 'net' | 'loop', name: string, driveIndex: number) => Float64Array) | null {
    if (frequencyHz > SOLVED_TO_HZ) return null;
    if (!this.#sweep) {
      const currents = this.#solveUnits(frequencyHz);
      return (kind, name, driveIndex) => currents[this.#unitOf.get(unitKey(kind, name, driveIndex))!]!;
    }
    const { contents, factors } = this.#sweep.blendAt(frequencyHz);
    return (kind, name, driveIndex) => {
      const unit = this.#unitOf.get(unitKey(kind, name, driveIndex))!;
      const out = new Float64Array(2 * this.#model.mesh.edgeCount);
      for (const [j, units] of contents.entries()) addScaled(out, units[unit]!, factors[2 * j]!, factors[2 * j + 1]!);
      return out;
    };
  }

  #solveUnits(frequencyHz: number): UnitCurrents {
    this.#onSolve?.();
    const solver = this.#model.solverAt(frequencyHz);
    const currents: Float64Array[] = [];
    for (const { network, coupling, drives } of this.#scene.nets.values()) {
      const responses = solveNetwork(network, frequencyHz);
      for (const driveIndex of drives.keys()) {
        const incident = emptyIncident(this.#model.mesh);
        coupling?.addTo(incident, frequencyHz, responses[driveIndex]!);
        currents.push(interleaved(solver.solve(incident)));
      }
    }
    for (const { coupling } of this.#scene.loops.values()) {
      const incident = emptyIncident(this.#model.mesh);
      coupling?.addTo(incident, frequencyHz, 1, 0);
      currents.push(interleaved(solver.solve(incident)));
    }
    return currents;
  }

  /** Moments of plane and cables stand for the currents: what radiates. */
  #solved(frequencyHz: number): Solved<UnitCurrents> {
    const content = this.#solveUnits(frequencyHz);
    const { parts, mesh } = this.#model;
    const groups = Math.min(SKETCHED_UNITS, content.length);
    const perUnit = 3 * parts.length;
    const sketch = new Float64Array(2 * groups * perUnit);
    for (const [u, currents] of content.entries()) {
      for (const [p, { edges }] of parts.entries()) {
        const at = 2 * ((u % groups) * perUnit + 3 * p);
        for (const [i, edge] of edges.entries()) {
          const weight = 1 + (2 * i) / edges.length;
          for (let axis = 0; axis < 3; axis++) {
            const length = mesh.edgeVectorM[3 * edge + axis]! * weight;
            sketch[at + 2 * axis]! += length * currents[2 * edge]!;
            sketch[at + 2 * axis + 1]! += length * currents[2 * edge + 1]!;
          }
        }
      }
    }
    return { content, sketch };
  }
}

const unitKey = (kind: 'net' | 'loop', name: string, driveIndex: number): string =>
  JSON.stringify([kind, name, driveIndex]);
