import { type Assembly, assemble, type FirstPiece } from './assembly.ts';
import type { LineSection, Network, NetworkResponse } from './network.ts';

/**
 * Solves a net of line sections at one frequency; one response per drive.
 *
 * Nodal analysis with the section's Y-parameters y11 = y22 = coth(γl)/Z0, y12 = y21 = −1/(Z0 sinh γl), written as a series
 * admittance 1/(Z0 sinh γl) and shunts tanh(γl/2)/Z0, and eliminated node by node by the star–mesh transformation, which
 * adds admittances and never subtracts them: no cancellation for very short sections, O(N) for trees, loops allowed.
 * Sections longer than about a radian are cut inside, so sinh γl never vanishes. Voltages in V, currents in A, e^(+jωt).
 * Throws `input` when two ideal sources or a source and a short meet at one node.
 * Source: D. M. Pozar, Microwave Engineering, 4th ed., table 4.1 (ABCD) and 4.2 (Y of a line); star–mesh: A. Rosen, J. IEE
 * 62, 1924.
 */
export function solveNetwork(network: Network, frequencyHz: number): NetworkResponse[] {
  const assembly = assemble(network, frequencyHz);
  return network.drives.map((_, driveIndex) => respond(network, assembly, frequencyHz, driveIndex));
}

function respond(network: Network, assembly: Assembly, frequencyHz: number, driveIndex: number): NetworkResponse {
  const drive = network.drives[driveIndex]!;
  const currents = new Float64Array(2 * assembly.nodeCount);
  const fixed = new Float64Array(2 * assembly.nodeCount);
  if (drive.resistanceOhm > 0) currents[2 * drive.node] = 1 / drive.resistanceOhm;
  else fixed[2 * drive.node] = 1;
  const voltages = assembly.solve(currents, fixed);

  const { sections, branches, drives, loads } = network;
  const forward = new Float64Array(2 * sections.length);
  const backward = new Float64Array(2 * sections.length);
  const gamma = new Float64Array(2 * sections.length);
  const arriving = new Float64Array(2 * network.nodeCount);
  for (const [i, section] of sections.entries()) {
    const first = assembly.firstPiece(i);
    gamma[2 * i] = first.alpha;
    gamma[2 * i + 1] = first.beta;
    wavesFrom(section.line.z0Ohm, first, voltages, section.nodeA, forward, backward, i);
    addEndCurrents(section, first, forward, backward, i, arriving);
  }
  const branchCurrents = new Float64Array(2 * branches.length);
  for (const [i, { nodeA, nodeB, inductanceH }] of branches.entries()) {
    const reactance = 2 * Math.PI * frequencyHz * inductanceH;
    const re = (voltages[2 * nodeA + 1]! - voltages[2 * nodeB + 1]!) / reactance;
    const im = -(voltages[2 * nodeA]! - voltages[2 * nodeB]!) / reactance;
    branchCurrents[2 * i] = re;
    branchCurrents[2 * i + 1] = im;
    arriving[2 * nodeA]! -= re;
    arriving[2 * nodeA + 1]! -= im;
    arriving[2 * nodeB]! += re;
    arriving[2 * nodeB + 1]! += im;
  }
  const loadCurrents = new Float64Array(2 * loads.length);
  for (const [i, { node, resistanceOhm, capacitanceF }] of loads.entries()) {
    if (resistanceOhm === 0) continue;
    const g = resistanceOhm === undefined ? 0 : 1 / resistanceOhm;
    const b = 2 * Math.PI * frequencyHz * capacitanceF;
    const vRe = voltages[2 * node]!;
    const vIm = voltages[2 * node + 1]!;
    loadCurrents[2 * i] = g * vRe - b * vIm;
    loadCurrents[2 * i + 1] = g * vIm + b * vRe;
    arriving[2 * node]! -= loadCurrents[2 * i]!;
    arriving[2 * node + 1]! -= loadCurrents[2 * i + 1]!;
  }
  const driveCurrents = new Float64Array(2 * drives.length);
  for (const [i, { node, resistanceOhm }] of drives.entries()) {
    if (resistanceOhm === 0) continue;
    driveCurrents[2 * i] = ((i === driveIndex ? 1 : 0) - voltages[2 * node]!) / resistanceOhm;
    driveCurrents[2 * i + 1] = -voltages[2 * node + 1]! / resistanceOhm;
    arriving[2 * node]! += driveCurrents[2 * i]!;
    arriving[2 * node + 1]! += driveCurrents[2 * i + 1]!;
  }
  // An ideal source gives, and a short takes, what is left over at its node.
  for (const [i, { node, resistanceOhm }] of drives.entries()) {
    if (resistanceOhm !== 0) continue;
    driveCurrents[2 * i] = -arriving[2 * node]!;
    driveCurrents[2 * i + 1] = -arriving[2 * node + 1]!;
  }
  for (const [i, { node, resistanceOhm }] of loads.entries()) {
    if (resistanceOhm !== 0) continue;
    loadCurrents[2 * i] = arriving[2 * node]!;
    loadCurrents[2 * i + 1] = arriving[2 * node + 1]!;
  }
  return {
    nodeVoltages: voltages.subarray(0, 2 * network.nodeCount),
    forward,
    backward,
    branchCurrents,
    driveCurrents,
    loadCurrents,
    gamma,
  };
}

/** I⁺ = (Va e^(γl) − Vb)/(2 Z0 sinh γl), I⁻ = (Va e^(−γl) − Vb)/(2 Z0 sinh γl). */
function wavesFrom(
  z0Ohm: number,
  { alpha, beta, lengthM, farNode }: FirstPiece,
  voltages: Float64Array,
  nodeA: number,
  forward: Float64Array,
  backward: Float64Array,
  at: number,
): void {
  const a = alpha * lengthM;
  const b = beta * lengthM;
  const c = Math.cos(b);
  const s = Math.sin(b);
  const sinhRe = Math.sinh(a) * c;
  const sinhIm = Math.cosh(a) * s;
  const scale = 1 / (2 * z0Ohm * (sinhRe * sinhRe + sinhIm * sinhIm));
  const aRe = voltages[2 * nodeA]!;
  const aIm = voltages[2 * nodeA + 1]!;
  const bRe = voltages[2 * farNode]!;
  const bIm = voltages[2 * farNode + 1]!;
  for (const [sign, out] of [
    [1, forward],
    [-1, backward],
  ] as const) {
    const grow = Math.exp(sign * a);
    const re = grow * (aRe * c - sign * aIm * s) - bRe;
    const im = grow * (aIm * c + sign * aRe * s) - bIm;
    out[2 * at] = scale * (re * sinhRe + im * sinhIm);
    out[2 * at + 1] = scale * (im * sinhRe - re * sinhIm);
  }
}

/** Kirchhoff's balance: what a section takes from node A and brings to node B. */
function addEndCurrents(
  { nodeA, nodeB, lengthM }: LineSection,
  { alpha, beta }: FirstPiece,
  forward: Float64Array,
  backward: Float64Array,
  at: number,
  arriving: Float64Array,
): void {
  const fRe = forward[2 * at]!;
  const fIm = forward[2 * at + 1]!;
  const bRe = backward[2 * at]!;
  const bIm = backward[2 * at + 1]!;
  arriving[2 * nodeA]! -= fRe + bRe;
  arriving[2 * nodeA + 1]! -= fIm + bIm;
  const decay = Math.exp(-alpha * lengthM);
  const c = Math.cos(beta * lengthM);
  const s = Math.sin(beta * lengthM);
  arriving[2 * nodeB]! += decay * (fRe * c + fIm * s) + (bRe * c - bIm * s) / decay;
  arriving[2 * nodeB + 1]! += decay * (fIm * c - fRe * s) + (bIm * c + bRe * s) / decay;
}

