import { inputError } from '../errors.ts';
import { checkNetwork, type Network, type NetworkResponse } from './network.ts';
import { NodalMatrix, REFERENCE_OHM } from './nodal-matrix.ts';
import { SparseLu } from './sparse-lu.ts';

interface Prepared {
  readonly matrix: NodalMatrix;
  readonly factors: SparseLu;
}

/** Where the order of elimination is chosen: the same for every sweep, so that none leaves a trace in the numbers of another. */
const TYPICAL_HZ = 200e6;

/** What depends on the network alone, so that a sweep over frequency pays for it once. */
const prepared = new WeakMap<Network, Prepared>();

/**
 * Voltages and currents of a net of line sections, series inductances, sources and loads at one frequency; one response
 * for each drive. Trees cost O(N); loops are allowed. Parts without a drive stay at 0 V.
 *
 * Equations: `NodalMatrix`. An exact resonance without any loss has no finite answer and gives a very large one.
 * Throws `input` for an impossible network (`checkNetwork`) or a frequency that is not positive.
 * Source: D. M. Pozar, Microwave Engineering, 4th ed., 2.7, 4.2 (two-port of a lossy line).
 */
export function solveNetwork(network: Network, frequencyHz: number): NetworkResponse[] {
  if (!(frequencyHz > 0 && frequencyHz < Infinity)) throw inputError('frequencyHz', 'positive and finite', frequencyHz);
  const { matrix, factors } = prepare(network);
  matrix.fill(frequencyHz);
  factors.factor(matrix.values);
  const gamma = matrix.gamma.slice();
  const unknowns = new Float64Array(2 * matrix.size);
  return network.drives.map((_, driveIndex) => {
    const { row, scale } = matrix.driveRow(driveIndex);
    unknowns.fill(0);
    unknowns[2 * row] = 1 / scale;
    factors.solve(unknowns);
    return responseOf(matrix, unknowns, gamma);
  });
}

function prepare(network: Network): Prepared {
  const known = prepared.get(network);
  if (known) return known;
  checkNetwork(network);
  const matrix = new NodalMatrix(network);
  matrix.fill(TYPICAL_HZ);
  const { columnStarts, rowIndices, order } = matrix;
  const made = { matrix, factors: new SparseLu(columnStarts, rowIndices, order, matrix.values.slice()) };
  prepared.set(network, made);
  return made;
}

function responseOf(matrix: NodalMatrix, unknowns: Float64Array, gamma: Float64Array): NetworkResponse {
  const { nodeCount, sections, branches, drives } = matrix.network;
  const firstBranch = nodeCount + sections.length;
  const firstDrive = firstBranch + branches.length;
  const firstLoad = firstDrive + drives.length;
  const currents = (from: number, to: number) =>
    unknowns.slice(2 * from, 2 * to).map((scaled) => scaled / REFERENCE_OHM);
  return {
    nodeVoltages: unknowns.slice(0, 2 * nodeCount),
    ...wavesOf(matrix, unknowns),
    branchCurrents: currents(firstBranch, firstDrive),
    driveCurrents: currents(firstDrive, firstLoad),
    loadCurrents: currents(firstLoad, matrix.size),
    gamma,
  };
}

/** Waves of every section, each from the end where it starts: no growing exponential meets a rounded number. */
function wavesOf(matrix: NodalMatrix, unknowns: Float64Array): { forward: Float64Array; backward: Float64Array } {
  const { nodeCount, sections } = matrix.network;
  const forward = new Float64Array(2 * sections.length);
  const backward = new Float64Array(2 * sections.length);
  for (let s = 0; s < sections.length; s++) {
    const { nodeA, nodeB, lengthM, line } = sections[s]!;
    const aRe = unknowns[2 * nodeA]! / line.z0Ohm;
    const aIm = unknowns[2 * nodeA + 1]! / line.z0Ohm;
    const bRe = unknowns[2 * nodeB]! / line.z0Ohm;
    const bIm = unknowns[2 * nodeB + 1]! / line.z0Ohm;
    const unknownRe = unknowns[2 * (nodeCount + s)]! / REFERENCE_OHM;
    const unknownIm = unknowns[2 * (nodeCount + s) + 1]! / REFERENCE_OHM;
    // The other excitation's current, from the voltages.
    const sign = matrix.isTanh[s] === 1 ? 1 : -1;
    const halfRe = matrix.half[2 * s]!;
    const halfIm = matrix.half[2 * s + 1]!;
    const meanRe = (aRe + sign * bRe) / 2;
    const meanIm = (aIm + sign * bIm) / 2;
    const otherRe = halfRe * meanRe - halfIm * meanIm;
    const otherIm = halfRe * meanIm + halfIm * meanRe;
    // Into A: even + odd. Out at B: odd − even.
    const inRe = unknownRe + otherRe;
    const inIm = unknownIm + otherIm;
    const outRe = sign * (unknownRe - otherRe);
    const outIm = sign * (unknownIm - otherIm);
    forward[2 * s] = (inRe + aRe) / 2;
    forward[2 * s + 1] = (inIm + aIm) / 2;
    const atBRe = (outRe - bRe) / 2;
    const atBIm = (outIm - bIm) / 2;
    const decay = Math.exp(-matrix.gamma[2 * s]! * lengthM);
    const phase = -matrix.gamma[2 * s + 1]! * lengthM;
    const c = decay * Math.cos(phase);
    const d = decay * Math.sin(phase);
    backward[2 * s] = atBRe * c - atBIm * d;
    backward[2 * s + 1] = atBRe * d + atBIm * c;
  }
  return { forward, backward };
}
