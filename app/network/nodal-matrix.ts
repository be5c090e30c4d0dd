import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { eliminationOrder } from './elimination-order.ts';
import type { Network, NetworkLoad } from './network.ts';

/** Currents are scaled by this, so that all entries of the matrix are of the order of 1. */
export const REFERENCE_OHM = 50;

/** Beyond this attenuation (Np over half a section) tanh is 1 to the last digit. */
const LONG_SECTION_NP = 20;

/**
 * Nodal equations with a current for every element, so that no length, resistance or inductance makes an entry infinite.
 *
 * Unknowns: node voltages, then one scaled current j = R_ref·i for each section, branch, drive and load. Rows: the sum of the
 * currents leaving each node is 0, then one row for each element. A section is split into its even and odd excitation,
 *
 *   I_even = t (V_A + V_B)/2 / Z0,   I_odd = (V_A − V_B)/2 / (Z0 t),   t = tanh(γl/2)
 *
 * (currents into A: I_even + I_odd, into B: I_even − I_odd; the same as y11 = coth(γl)/Z0, y12 = −1/(Z0 sinh γl)).
 * For |t| ≤ 1 the odd current is the unknown and its row reads (V_A − V_B)/2 = Z0 t I_odd; for |t| > 1 the even one, with
 * (V_A + V_B)/2 = Z0 I_even / t. Neither a short section (t → 0) nor half a wavelength (t → 0 or ∞) loses a digit.
 */
export class NodalMatrix {
  readonly network: Network;
  readonly size: number;
  readonly columnStarts: Int32Array;
  readonly rowIndices: Int32Array;
  readonly order: Int32Array;
  /** Entries (re, im pairs) in the order of the pattern. */
  readonly values: Float64Array;
  /** γ of each section, re, im. */
  readonly gamma: Float64Array;
  /** tanh(γl/2) of each section, or its inverse where that is smaller; re, im. */
  readonly half: Float64Array;
  /** 1 where `half` holds tanh, 0 where it holds coth. */
  readonly isTanh: Uint8Array;
  /** Place in `values` of every stamp, in the order of stamping. */
  readonly #places: Int32Array;
  #next = 0;

  constructor(network: Network) {
    const { nodeCount, sections, branches, drives, loads } = network;
    this.network = network;
    this.size = nodeCount + sections.length + branches.length + drives.length + loads.length;
    this.gamma = new Float64Array(2 * sections.length);
    this.half = new Float64Array(2 * sections.length);
    this.isTanh = new Uint8Array(sections.length);
    const stamps = stampsOf(network);
    const { starts, rows, places } = compress(this.size, stamps);
    this.columnStarts = starts;
    this.rowIndices = rows;
    this.#places = places;
    this.values = new Float64Array(2 * rows.length);
    this.order = eliminationOrder(this.size, stamps);
  }

  /** Fills `values` for a frequency. */
  fill(frequencyHz: number): void {
    const { sections, branches, drives, loads } = this.network;
    const omega = 2 * Math.PI * frequencyHz;
    this.values.fill(0);
    this.#next = 0;
    for (let s = 0; s < sections.length; s++) this.#fillSection(s, frequencyHz);
    for (const { inductanceH } of branches) {
      this.#link();
      this.#row(0, (omega * inductanceH) / REFERENCE_OHM, [1, -1]);
    }
    for (const { resistanceOhm } of drives) {
      this.#put(-1, 0);
      this.#row(-resistanceOhm / REFERENCE_OHM, 0, [1]);
    }
    for (const load of loads) {
      this.#put(1, 0);
      this.#fillLoad(load, frequencyHz);
    }
  }

  /** The source's row is V + R i = 1; returns its place and what the row was divided by. */
  driveRow(driveIndex: number): { row: number; scale: number } {
    const { nodeCount, sections, branches, drives } = this.network;
    const row = nodeCount + sections.length + branches.length + driveIndex;
    return { row, scale: Math.max(1, drives[driveIndex]!.resistanceOhm / REFERENCE_OHM) };
  }

  #fillSection(s: number, frequencyHz: number): void {
    const { line, lengthM } = this.network.sections[s]!;
    const alpha = line.alphaNpPerM(frequencyHz);
    const beta = (2 * Math.PI * frequencyHz * Math.sqrt(line.epsilonEff)) / SPEED_OF_LIGHT_M_PER_S;
    this.gamma[2 * s] = alpha;
    this.gamma[2 * s + 1] = beta;
    const x = Math.min((alpha * lengthM) / 2, LONG_SECTION_NP);
    const y = (beta * lengthM) / 2;
    const sinh = Math.sinh(x);
    const sin = Math.sin(y);
    const cos = Math.cos(y);
    // tanh(x + jy) = (sinh x cosh x + j sin y cos y)/(sinh²x + cos²y); coth has sin² below and the other sign of j.
    const isTanh = sin * sin <= cos * cos;
    const below = sinh * sinh + (isTanh ? cos * cos : sin * sin);
    const re = (sinh * Math.cosh(x)) / below;
    const im = ((isTanh ? 1 : -1) * sin * cos) / below;
    this.isTanh[s] = isTanh ? 1 : 0;
    this.half[2 * s] = re;
    this.half[2 * s + 1] = im;
    const admittance = REFERENCE_OHM / (2 * line.z0Ohm);
    const impedance = line.z0Ohm / REFERENCE_OHM;
    const sign = isTanh ? 1 : -1;
    this.#put(admittance * re, admittance * im); // A, A
    this.#put(sign * admittance * re, sign * admittance * im); // A, B
    this.#put(sign * admittance * re, sign * admittance * im); // B, A
    this.#put(admittance * re, admittance * im); // B, B
    this.#put(1, 0); // A, current
    this.#put(-sign, 0); // B, current
    this.#row(impedance * re, impedance * im, [0.5, -sign * 0.5]);
  }

  #fillLoad({ resistanceOhm, capacitanceF, impedance }: NetworkLoad, frequencyHz: number): void {
    if (impedance) {
      const { re, im } = impedance(frequencyHz);
      this.#row(re / REFERENCE_OHM, im / REFERENCE_OHM, [1]);
      return;
    }
    if (resistanceOhm === 0) {
      this.#row(0, 0, [1]);
      return;
    }
    const conductance = resistanceOhm === undefined ? 0 : REFERENCE_OHM / resistanceOhm;
    const susceptance = 2 * Math.PI * frequencyHz * capacitanceF * REFERENCE_OHM;
    const size = conductance + susceptance;
    // Y V − j = 0, divided by |Y| where that is large.
    const scale = 1 / Math.max(1, size);
    this.#put(conductance * scale, susceptance * scale);
    this.#put(-scale, 0);
  }

  /** A current from node A to node B. */
  #link(): void {
    this.#put(1, 0);
    this.#put(-1, 0);
  }

  /** Row of an element: Σ factor·V − z·j = 0, divided by |z| where that is large. */
  #row(re: number, im: number, factors: readonly number[]): void {
    const scale = 1 / Math.max(1, Math.abs(re) + Math.abs(im));
    for (const factor of factors) this.#put(factor * scale, 0);
    this.#put(-re * scale, -im * scale);
  }

  #put(re: number, im: number): void {
    const at = 2 * this.#places[this.#next++]!;
    this.values[at]! += re;
    this.values[at + 1]! += im;
  }
}

/** Row and column of every stamp, in the order in which `fill` makes them. */
function stampsOf({ nodeCount, sections, branches, drives, loads }: Network): [row: number, column: number][] {
  const stamps: [number, number][] = [];
  let current = nodeCount;
  for (const { nodeA: a, nodeB: b } of sections) {
    stamps.push(
      [a, a],
      [a, b],
      [b, a],
      [b, b],
      [a, current],
      [b, current],
      [current, a],
      [current, b],
      [current, current],
    );
    current++;
  }
  for (const { nodeA: a, nodeB: b } of branches) {
    stamps.push([a, current], [b, current], [current, a], [current, b], [current, current]);
    current++;
  }
  for (const { node } of [...drives, ...loads]) {
    stamps.push([node, current], [current, node], [current, current]);
    current++;
  }
  return stamps;
}

/** Compressed columns of the stamps, equal places merged. */
function compress(
  size: number,
  stamps: readonly (readonly [row: number, column: number])[],
): { starts: Int32Array; rows: Int32Array; places: Int32Array } {
  const columns = Array.from({ length: size }, () => new Map<number, number[]>());
  stamps.forEach(([row, column], i) => {
    const entries = columns[column]!;
    const list = entries.get(row);
    if (list) list.push(i);
    else entries.set(row, [i]);
  });
  const starts = new Int32Array(size + 1);
  const places = new Int32Array(stamps.length);
  const rows: number[] = [];
  columns.forEach((entries, column) => {
    for (const [row, list] of entries) {
      for (const i of list) places[i] = rows.length;
      rows.push(row);
    }
    starts[column + 1] = rows.length;
  });
  return { starts, rows: Int32Array.from(rows), places };
}
