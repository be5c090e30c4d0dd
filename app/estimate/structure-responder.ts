import { solveNetwork } from '../network/solve-network.ts';
import { clearIncident, emptyIncident, type Incident } from '../structure/incident.ts';
import { interleaved, type StructureModel } from '../structure/structure-model.ts';
import { type EdgeCurrents, newCurrents, type StructureSolver } from '../structure/structure-solver.ts';
import { addScaled } from '../sweep/aaa.ts';
import { adaptiveSweep, type Solved, type Sweep } from '../sweep/adaptive-sweep.ts';
import { type Scene, SOLVED_TO_HZ } from './scene.ts';
import type { FrequencyLines, SourceLine } from './spectrum-table.ts';

/** What one net or loop does to the structure in one domain; `vector` is weighed by `StructureAnswer.weigh`. */
export interface StructureShare {
  readonly kind: SourceLine['kind'];
  readonly name: string;
  readonly domain: string;
  readonly vector: Float64Array;
}

/** The structure at one frequency, driven by all lines there. Vectors: re, im per edge. */
export interface StructureAnswer {
  readonly shares: readonly StructureShare[];
  /** Currents of every domain, A. */
  readonly currentsByDomain: ReadonlyMap<string, Float64Array>;
  /** Turns an observer's weights (answer per ampere of each edge) into weights of the shares' vectors. */
  weigh(observer: Float64Array): Float64Array;
}

/** Structure currents for 1 V of each drive and 1 A in each loop. */
type UnitCurrents = readonly Float64Array[];

/** With no more lines than this every line is solved itself; more are interpolated between solved frequencies. */
export const DIRECT_LINES = 64;
/** 0.05 dB: half of what is allowed at a line. */
const TOLERANCE = 0.006;
const MOST_SOLUTIONS = 160;
/** Responses that stand for all of them in the fit. */
const SKETCHED_UNITS = 12;

/**
 * The structure's answer to the board's drives and loops over a set of frequencies, one factorisation per solved frequency
 * for all of them.
 *
 * Few lines: each is solved, one right-hand side per domain; what a single net contributes at the antenna follows by
 * reciprocity from one more solution for the observer. Many lines: every drive's response is solved where needed and
 * interpolated by a rational function with a checked error.
 */
export class StructureResponder {
  readonly #scene: Scene;
  readonly #model: StructureModel;
  readonly #unitOf = new Map<string, number>();
  readonly #sweep: Sweep<UnitCurrents> | null;
  readonly #onSolve: (() => void) | undefined;
  /** Used again for every excitation. */
  readonly #incident: Incident;
  readonly #currents: EdgeCurrents;

  /** `frequenciesHz`: the lines to be served, ascending. `onSolve` is called before each solution (stop). */
  constructor(scene: Scene, model: StructureModel, frequenciesHz: readonly number[], onSolve?: () => void) {
    this.#scene = scene;
    this.#model = model;
    this.#onSolve = onSolve;
    this.#incident = emptyIncident(model.mesh);
    this.#currents = newCurrents(model.mesh.edgeCount);
    for (const { name, drives } of scene.nets.values()) {
      for (const driveIndex of drives.keys()) this.#unitOf.set(unitKey('net', name, driveIndex), this.#unitOf.size);
    }
    for (const name of scene.loops.keys()) this.#unitOf.set(unitKey('loop', name, 0), this.#unitOf.size);
    const served = frequenciesHz.filter((hz) => hz <= SOLVED_TO_HZ);
    this.#sweep =
      served.length > DIRECT_LINES
        ? adaptiveSweep((hz) => this.#solved(hz), {
            frequenciesHz: served,
            tolerance: TOLERANCE,
            mostSolutions: MOST_SOLUTIONS,
          })
        : null;
  }

  /** False when interpolation did not reach its tolerance everywhere. */
  get isConverged(): boolean {
    return this.#sweep?.isConverged ?? true;
  }

  /** The answer to the lines of one frequency; null above the solved range, or when no line drives the structure. */
  answer({ frequencyHz, lines }: FrequencyLines): StructureAnswer | null {
    if (frequencyHz > SOLVED_TO_HZ || lines.length === 0) return null;
    return this.#sweep ? this.#blended(this.#sweep, frequencyHz, lines) : this.#direct(frequencyHz, lines);
  }

  #direct(frequencyHz: number, lines: readonly SourceLine[]): StructureAnswer {
    this.#onSolve?.();
    const solver = this.#model.solverAt(frequencyHz);
    const shares = groupShares(lines).map(({ kind, name, domain, own }): StructureShare => {
      const rhs = solver.rightHandSide(this.#incidentOf(frequencyHz, kind, name, own), this.#currents);
      return { kind, name, domain, vector: interleaved(rhs) };
    });
    return {
      shares,
      currentsByDomain: new Map([...sumByDomain(shares)].map(([domain, vector]) => [domain, solved(solver, vector)])),
      weigh: (observer) => solved(solver, observer),
    };
  }

  #blended(sweep: Sweep<UnitCurrents>, frequencyHz: number, lines: readonly SourceLine[]): StructureAnswer {
    const { contents, factors } = sweep.blendAt(frequencyHz);
    const size = 2 * this.#model.mesh.edgeCount;
    const shares = groupShares(lines).map(({ kind, name, domain, own }): StructureShare => {
      const vector = new Float64Array(size);
      for (const { driveIndex, re, im } of own) {
        const unit = this.#unitOf.get(unitKey(kind, name, driveIndex))!;
        for (const [j, units] of contents.entries()) {
          const fRe = factors[2 * j]!;
          const fIm = factors[2 * j + 1]!;
          addScaled(vector, units[unit]!, fRe * re - fIm * im, fRe * im + fIm * re);
        }
      }
      return { kind, name, domain, vector };
    });
    return { shares, currentsByDomain: sumByDomain(shares), weigh: (observer) => observer };
  }

  /** What the lines of one net or loop do to the structure; the next call overwrites it. */
  #incidentOf(
    frequencyHz: number,
    kind: SourceLine['kind'],
    name: string,
    own: readonly Pick<SourceLine, 'driveIndex' | 're' | 'im'>[],
  ): Incident {
    const incident = this.#incident;
    clearIncident(incident);
    if (kind === 'loop') {
      const { coupling } = this.#scene.loops.get(name)!;
      for (const { re, im } of own) coupling?.addTo(incident, frequencyHz, re, im);
      return incident;
    }
    const { network, coupling } = this.#scene.nets.get(name)!;
    if (!coupling) return incident;
    const responses = solveNetwork(network, frequencyHz);
    for (const { driveIndex, re, im } of own) coupling.addTo(incident, frequencyHz, responses[driveIndex]!, re, im);
    return incident;
  }

  #solveUnits(frequencyHz: number): UnitCurrents {
    this.#onSolve?.();
    const solver = this.#model.solverAt(frequencyHz);
    return [...this.#unitOf.keys()].map((key) => {
      const { kind, name, driveIndex } = unitOfKey(key);
      const incident = this.#incidentOf(frequencyHz, kind, name, [{ driveIndex, re: 1, im: 0 }]);
      return interleaved(solver.solve(incident));
    });
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

const unitKey = (kind: SourceLine['kind'], name: string, driveIndex: number): string =>
  JSON.stringify([kind, name, driveIndex]);

function unitOfKey(key: string): Pick<SourceLine, 'kind' | 'name' | 'driveIndex'> {
  const [kind, name, driveIndex] = JSON.parse(key) as [SourceLine['kind'], string, number];
  return { kind, name, driveIndex };
}

function groupShares(lines: readonly SourceLine[]) {
  const groups = new Map<string, { kind: SourceLine['kind']; name: string; domain: string; own: SourceLine[] }>();
  for (const line of lines) {
    const key = JSON.stringify([line.kind, line.name, line.domain]);
    const group = groups.get(key) ?? { kind: line.kind, name: line.name, domain: line.domain, own: [] };
    group.own.push(line);
    groups.set(key, group);
  }
  return [...groups.values()];
}

function sumByDomain(shares: readonly StructureShare[]): Map<string, Float64Array> {
  const sums = new Map<string, Float64Array>();
  for (const { domain, vector } of shares) {
    const sum = sums.get(domain);
    if (sum) addScaled(sum, vector, 1, 0);
    else sums.set(domain, vector.slice());
  }
  return sums;
}

function solved(solver: StructureSolver, vector: Float64Array): Float64Array {
  const { re, im } = newCurrents(vector.length / 2);
  for (let i = 0; i < re.length; i++) {
    re[i] = vector[2 * i]!;
    im[i] = vector[2 * i + 1]!;
  }
  solver.solveInPlace(re, im);
  return interleaved({ re, im });
}
