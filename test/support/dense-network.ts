import type { Network } from '../../app/network/network.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { solveDenseComplex } from './dense-solve.ts';

/** Complex numbers as pairs, for oracles where clarity counts and speed does not. */
export type C = readonly [re: number, im: number];
export const add = (a: C, b: C): C => [a[0] + b[0], a[1] + b[1]];
export const sub = (a: C, b: C): C => [a[0] - b[0], a[1] - b[1]];
export const mul = (a: C, b: C): C => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
export const div = (a: C, b: C): C => {
  const size = b[0] * b[0] + b[1] * b[1];
  return [(a[0] * b[0] + a[1] * b[1]) / size, (a[1] * b[0] - a[0] * b[1]) / size];
};
export const exp = ([re, im]: C): C => [Math.exp(re) * Math.cos(im), Math.exp(re) * Math.sin(im)];
export const abs = ([re, im]: C): number => Math.hypot(re, im);
export const at = (values: Float64Array, i: number): C => [values[2 * i]!, values[2 * i + 1]!];

export const gammaOf = ({ line }: Network['sections'][number], frequencyHz: number): C => [
  line.alphaNpPerM(frequencyHz),
  (2 * Math.PI * frequencyHz * Math.sqrt(line.epsilonEff)) / SPEED_OF_LIGHT_M_PER_S,
];

/** y11 = coth(γl)/Z0, y12 = −1/(Z0 sinh γl), from exponentials. */
function lineAdmittances(section: Network['sections'][number], frequencyHz: number): { y11: C; y12: C } {
  const x = mul(gammaOf(section, frequencyHz), [section.lengthM, 0]);
  const decay = exp([-x[0], -x[1]]);
  const twice = mul(decay, decay);
  const below = mul(sub([1, 0], twice), [section.line.z0Ohm, 0]);
  return { y11: div(add([1, 0], twice), below), y12: div(mul([-2, 0], decay), below) };
}

export interface DenseResponse {
  readonly nodeVoltages: C[];
  /** Into each section at its node A, and at its node B. */
  readonly intoA: C[];
  readonly intoB: C[];
  readonly driveCurrents: C[];
}

/** Second way: plain nodal analysis with Y-parameters, source currents as unknowns, dense elimination with pivoting. */
export function solveDenseNetwork(network: Network, frequencyHz: number, driveIndex: number): DenseResponse {
  const { nodeCount, sections, branches, drives, loads } = network;
  const size = nodeCount + branches.length + drives.length;
  const matrix = new Float64Array(2 * size * size);
  const rhs = new Float64Array(2 * size);
  const put = (row: number, column: number, [re, im]: C) => {
    matrix[2 * (row * size + column)]! += re;
    matrix[2 * (row * size + column) + 1]! += im;
  };
  const omega = 2 * Math.PI * frequencyHz;
  for (const section of sections) {
    const { y11, y12 } = lineAdmittances(section, frequencyHz);
    put(section.nodeA, section.nodeA, y11);
    put(section.nodeB, section.nodeB, y11);
    put(section.nodeA, section.nodeB, y12);
    put(section.nodeB, section.nodeA, y12);
  }
  for (const { node, resistanceOhm, capacitanceF } of loads) {
    put(node, node, [resistanceOhm === undefined ? 0 : 1 / resistanceOhm, omega * capacitanceF]);
  }
  branches.forEach(({ nodeA, nodeB, inductanceH }, i) => {
    const own = nodeCount + i;
    put(nodeA, own, [1, 0]);
    put(nodeB, own, [-1, 0]);
    put(own, nodeA, [1, 0]);
    put(own, nodeB, [-1, 0]);
    put(own, own, [0, -omega * inductanceH]);
  });
  drives.forEach(({ node, resistanceOhm }, i) => {
    const own = nodeCount + branches.length + i;
    put(node, own, [-1, 0]);
    put(own, node, [1, 0]);
    put(own, own, [resistanceOhm, 0]);
  });
  rhs[2 * (nodeCount + branches.length + driveIndex)] = 1;
  const x = solveDenseComplex(matrix, rhs);
  const nodeVoltages = Array.from({ length: nodeCount }, (_, i) => at(x, i));
  const into = (near: 'nodeA' | 'nodeB', far: 'nodeA' | 'nodeB') =>
    sections.map((section) => {
      const { y11, y12 } = lineAdmittances(section, frequencyHz);
      return add(mul(y11, nodeVoltages[section[near]]!), mul(y12, nodeVoltages[section[far]]!));
    });
  return {
    nodeVoltages,
    intoA: into('nodeA', 'nodeB'),
    intoB: into('nodeB', 'nodeA'),
    driveCurrents: drives.map((_, i) => at(x, nodeCount + branches.length + i)),
  };
}
