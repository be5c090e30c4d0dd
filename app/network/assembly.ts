import { inputError } from '../errors.ts';
import type { Line } from '../lines/cross-section.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { type EliminationPlan, eliminationPlan } from './elimination-plan.ts';
import type { Network } from './network.ts';

/** The first piece of a section: what the waves at node A are worked out from. */
export interface FirstPiece {
  readonly alpha: number;
  readonly beta: number;
  readonly lengthM: number;
  readonly farNode: number;
}

/** Longest piece of line taken at once, rad: sinh γl stays away from its zeros at multiples of π. */
const LONGEST_PIECE_RAD = 1.5;
/** Most pieces a section is cut into; beyond it a file asks for a line of thousands of wavelengths. */
const MOST_PIECES = 100_000;

interface PlannedNetwork {
  readonly plan: EliminationPlan;
  readonly edgeOfPair: Int32Array;
  readonly pieceCounts: readonly number[];
}

const plans = new WeakMap<Network, PlannedNetwork>();

/** A net's admittances at one frequency, ready to be solved for any excitation. */
export class Assembly {
  readonly nodeCount: number;
  readonly #plan: EliminationPlan;
  readonly #firstPieces: readonly FirstPiece[];
  /** Edge admittances after elimination (each as it was when its first node went), re, im. */
  readonly #edges: Float64Array;
  /** 1/Σ of each step, re, im. */
  readonly #inverse: Float64Array;

  constructor(
    nodeCount: number,
    plan: EliminationPlan,
    firstPieces: readonly FirstPiece[],
    edges: Float64Array,
    shunts: Float64Array,
  ) {
    this.nodeCount = nodeCount;
    this.#plan = plan;
    this.#firstPieces = firstPieces;
    this.#edges = edges;
    this.#inverse = eliminate(plan, edges, shunts);
  }

  firstPiece(section: number): FirstPiece {
    return this.#firstPieces[section]!;
  }

  /** Node voltages for injected currents (A, re, im per node); nodes of ideal sources and shorts hold `fixed` (V). */
  solve(currents: Float64Array, fixed: Float64Array): Float64Array {
    const { steps } = this.#plan;
    const i = currents.slice();
    for (let s = 0; s < steps.length; s++) {
      const { node, neighbours, edges } = steps[s]!;
      const re = i[2 * node]! * this.#inverse[2 * s]! - i[2 * node + 1]! * this.#inverse[2 * s + 1]!;
      const im = i[2 * node]! * this.#inverse[2 * s + 1]! + i[2 * node + 1]! * this.#inverse[2 * s]!;
      if (re === 0 && im === 0) continue;
      for (let n = 0; n < edges.length; n++) {
        const yRe = this.#edges[2 * edges[n]!]!;
        const yIm = this.#edges[2 * edges[n]! + 1]!;
        i[2 * neighbours[n]!]! += re * yRe - im * yIm;
        i[2 * neighbours[n]! + 1]! += re * yIm + im * yRe;
      }
    }
    const v = fixed.slice();
    for (let s = steps.length - 1; s >= 0; s--) {
      const { node, neighbours, edges } = steps[s]!;
      let re = i[2 * node]!;
      let im = i[2 * node + 1]!;
      for (let n = 0; n < edges.length; n++) {
        const yRe = this.#edges[2 * edges[n]!]!;
        const yIm = this.#edges[2 * edges[n]! + 1]!;
        const vRe = v[2 * neighbours[n]!]!;
        const vIm = v[2 * neighbours[n]! + 1]!;
        re += yRe * vRe - yIm * vIm;
        im += yRe * vIm + yIm * vRe;
      }
      v[2 * node] = re * this.#inverse[2 * s]! - im * this.#inverse[2 * s + 1]!;
      v[2 * node + 1] = re * this.#inverse[2 * s + 1]! + im * this.#inverse[2 * s]!;
    }
    return v;
  }
}

/** Star–mesh elimination in place: neighbours get y_i y_j/Σ between them and y_i y_s/Σ to the return. */
function eliminate({ steps }: EliminationPlan, edges: Float64Array, shunts: Float64Array): Float64Array {
  const inverse = new Float64Array(2 * steps.length);
  for (let s = 0; s < steps.length; s++) {
    const step = steps[s]!;
    const shuntRe = shunts[2 * step.node]!;
    const shuntIm = shunts[2 * step.node + 1]!;
    let re = shuntRe;
    let im = shuntIm;
    for (const edge of step.edges) {
      re += edges[2 * edge]!;
      im += edges[2 * edge + 1]!;
    }
    const size = re * re + im * im;
    if (size === 0) continue;
    const iRe = re / size;
    const iIm = -im / size;
    inverse[2 * s] = iRe;
    inverse[2 * s + 1] = iIm;
    let mesh = 0;
    for (let a = 0; a < step.edges.length; a++) {
      const yRe = edges[2 * step.edges[a]!]!;
      const yIm = edges[2 * step.edges[a]! + 1]!;
      const shareRe = yRe * iRe - yIm * iIm;
      const shareIm = yRe * iIm + yIm * iRe;
      const other = step.neighbours[a]!;
      shunts[2 * other]! += shareRe * shuntRe - shareIm * shuntIm;
      shunts[2 * other + 1]! += shareRe * shuntIm + shareIm * shuntRe;
      for (let b = a + 1; b < step.edges.length; b++) {
        const zRe = edges[2 * step.edges[b]!]!;
        const zIm = edges[2 * step.edges[b]! + 1]!;
        const target = 2 * step.meshEdges[mesh++]!;
        edges[target]! += shareRe * zRe - shareIm * zIm;
        edges[target + 1]! += shareRe * zIm + shareIm * zRe;
      }
    }
  }
  return inverse;
}

/** Builds a net's admittances at one frequency. */
export function assemble(network: Network, frequencyHz: number): Assembly {
  const omega = 2 * Math.PI * frequencyHz;
  const betas = network.sections.map(({ line }) => (omega * Math.sqrt(line.epsilonEff)) / SPEED_OF_LIGHT_M_PER_S);
  const pieceCounts = network.sections.map(({ lengthM }, i) =>
    Math.min(MOST_PIECES, Math.max(1, Math.ceil((betas[i]! * lengthM) / LONGEST_PIECE_RAD))),
  );
  const { plan, edgeOfPair } = plannedFor(network, pieceCounts);
  const nodeCount = network.nodeCount + pieceCounts.reduce((sum, count) => sum + count - 1, 0);
  const edges = new Float64Array(2 * plan.edgeCount);
  const shunts = new Float64Array(2 * nodeCount);
  const addEdge = (pair: number, re: number, im: number) => {
    const edge = edgeOfPair[pair]!;
    if (edge < 0) return;
    edges[2 * edge]! += re;
    edges[2 * edge + 1]! += im;
  };
  let pair = 0;
  let inner = network.nodeCount;
  const firstPieces: FirstPiece[] = [];
  for (const [i, { nodeA, nodeB, lengthM, line }] of network.sections.entries()) {
    const count = pieceCounts[i]!;
    const pieceM = lengthM / count;
    const alpha = line.alphaNpPerM(frequencyHz);
    const { seriesRe, seriesIm, shuntRe, shuntIm } = pieceAdmittances(line, alpha * pieceM, betas[i]! * pieceM);
    firstPieces.push({ alpha, beta: betas[i]!, lengthM: pieceM, farNode: count === 1 ? nodeB : inner });
    let from = nodeA;
    for (let piece = 0; piece < count; piece++) {
      const to = piece === count - 1 ? nodeB : inner++;
      addEdge(pair++, seriesRe, seriesIm);
      for (const node of [from, to]) {
        shunts[2 * node]! += shuntRe;
        shunts[2 * node + 1]! += shuntIm;
      }
      from = to;
    }
  }
  for (const { inductanceH } of network.branches) addEdge(pair++, 0, -1 / (omega * inductanceH));
  for (const { node, resistanceOhm } of network.drives) if (resistanceOhm > 0) shunts[2 * node]! += 1 / resistanceOhm;
  for (const { node, resistanceOhm, capacitanceF } of network.loads) {
    if (resistanceOhm === 0) continue;
    shunts[2 * node]! += resistanceOhm === undefined ? 0 : 1 / resistanceOhm;
    shunts[2 * node + 1]! += omega * capacitanceF;
  }
  return new Assembly(nodeCount, plan, firstPieces, edges, shunts);
}

/** Series 1/(Z0 sinh γl) and shunt tanh(γl/2)/Z0 of a piece, a = αl, b = βl. */
function pieceAdmittances({ z0Ohm }: Pick<Line, 'z0Ohm'>, a: number, b: number) {
  const sRe = Math.sinh(a) * Math.cos(b);
  const sIm = Math.cosh(a) * Math.sin(b);
  const size = (sRe * sRe + sIm * sIm) * z0Ohm;
  // tanh(x + jy) = (sinh 2x + j sin 2y)/(cosh 2x + cos 2y), here with 2x = a, 2y = b
  const below = (Math.cosh(a) + Math.cos(b)) * z0Ohm;
  return { seriesRe: sRe / size, seriesIm: -sIm / size, shuntRe: Math.sinh(a) / below, shuntIm: Math.sin(b) / below };
}

function plannedFor(network: Network, pieceCounts: readonly number[]): PlannedNetwork {
  const known = plans.get(network);
  if (known && known.pieceCounts.every((count, i) => count === pieceCounts[i])) return known;
  requireOneIdealSource(network);
  const pairs: [number, number][] = [];
  let inner = network.nodeCount;
  for (const [i, { nodeA, nodeB }] of network.sections.entries()) {
    let from = nodeA;
    for (let piece = 1; piece < pieceCounts[i]!; piece++) {
      pairs.push([from, inner]);
      from = inner++;
    }
    pairs.push([from, nodeB]);
  }
  for (const { nodeA, nodeB } of network.branches) pairs.push([nodeA, nodeB]);
  const kept = new Set([...network.drives, ...network.loads].filter(({ resistanceOhm }) => resistanceOhm === 0).map(({ node }) => node));
  const planned = { ...eliminationPlan(inner, pairs, kept), pieceCounts };
  plans.set(network, planned);
  return planned;
}

/** Refuses a node that two ideal sources, or an ideal source and a short, both fix. */
function requireOneIdealSource({ drives, loads }: Network): void {
  const fixed = new Set<number>();
  for (const { node, resistanceOhm } of drives) {
    if (resistanceOhm !== 0) continue;
    if (fixed.has(node)) throw inputError('drives', 'given a source resistance where two meet at one place', '0 ohm twice');
    fixed.add(node);
  }
  for (const { node, resistanceOhm } of loads) {
    if (resistanceOhm === 0 && fixed.has(node)) {
      throw inputError('loads', 'more than 0 ohm where a source of 0 ohm sits at the same place', 0);
    }
  }
}
