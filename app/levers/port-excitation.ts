import { factorDense, solveDense } from '../math/dense-complex.ts';
import type { NetworkResponse } from '../network/network.ts';
import { PORT_OHM, type PortTerminals } from './net-ports.ts';

/**
 * A net between its ports at one frequency: `voltages[2·(q·P + p)]` is the voltage at port q (re, im) when port p is driven by
 * 1 V and every port is terminated by R0 = 50 Ω.
 */
export interface PortMatrix {
  readonly portCount: number;
  readonly voltages: Float64Array;
}

/** From the responses to the unit drives of a net (one each port), at the nodes of its ports. */
export function portMatrix(responses: readonly NetworkResponse[], nodes: readonly number[]): PortMatrix {
  const portCount = nodes.length;
  const voltages = new Float64Array(2 * portCount * portCount);
  for (const [p, { nodeVoltages }] of responses.entries()) {
    for (const [q, node] of nodes.entries()) {
      voltages[2 * (q * portCount + p)] = nodeVoltages[2 * node]!;
      voltages[2 * (q * portCount + p) + 1] = nodeVoltages[2 * node + 1]!;
    }
  }
  return { portCount, voltages };
}

/**
 * The unit drives' voltages E that leave the net in the same state as its real terminals (compensation theorem). At every
 * port the net's current, (E − V)/R0 with V = T E, is what the drivers and loads there give:
 *
 *   (E_q − V_q)/R0 = Σ_d (U_d − V_q)/R_d − Y_q V_q,      V_q = U_d at an ideal source,      V_q = 0 at a short.
 *
 * `sources`: one right-hand side each, U of every drive (re, im pairs, V peak). Returns E for each (re, im per port).
 */
export function portExcitations(
  { portCount, voltages }: PortMatrix,
  { drives, loads }: PortTerminals,
  frequencyHz: number,
  sources: readonly Float64Array[],
): Float64Array[] {
  const omega = 2 * Math.PI * frequencyHz;
  const matrix = new Float64Array(2 * portCount * portCount);
  const right = sources.map(() => new Float64Array(2 * portCount));
  for (let q = 0; q < portCount; q++) {
    const own = drives.flatMap((drive, index) => (drive.port === q ? [{ ...drive, index }] : []));
    const ownLoads = loads.filter(({ port }) => port === q);
    const ideal = own.find(({ resistanceOhm }) => resistanceOhm === 0);
    const isFixed = ideal !== undefined || ownLoads.some(({ resistanceOhm }) => resistanceOhm === 0);
    // Row: ownFactor·E_q + factor·V_q = right side.
    let ownFactor = 0;
    let factorRe = 1;
    let factorIm = 0;
    if (!isFixed) {
      ownFactor = 1;
      factorRe = -1;
      for (const { resistanceOhm } of own) factorRe += PORT_OHM / resistanceOhm;
      for (const { resistanceOhm, capacitanceF } of ownLoads) {
        factorRe += PORT_OHM / resistanceOhm;
        factorIm += PORT_OHM * omega * capacitanceF;
      }
    }
    const scale = 1 / Math.max(1, Math.abs(factorRe) + Math.abs(factorIm));
    for (let p = 0; p < portCount; p++) {
      const at = 2 * (q * portCount + p);
      const re = voltages[at]!;
      const im = voltages[at + 1]!;
      matrix[at] = scale * (factorRe * re - factorIm * im + (p === q ? ownFactor : 0));
      matrix[at + 1] = scale * (factorRe * im + factorIm * re);
    }
    for (const [s, source] of sources.entries()) {
      for (const { index, resistanceOhm } of ideal ? [ideal] : isFixed ? [] : own) {
        const factor = scale * (ideal ? 1 : PORT_OHM / resistanceOhm);
        right[s]![2 * q]! += factor * source[2 * index]!;
        right[s]![2 * q + 1]! += factor * source[2 * index + 1]!;
      }
    }
  }
  const pivots = factorDense(matrix, portCount);
  for (const b of right) solveDense(matrix, pivots, b, portCount);
  return right;
}
