import type { Cable } from '../board/board.ts';
import type { LinearElement } from '../fields/linear-element.ts';
import type { Region } from '../geometry/polygon.ts';
import { emptyIncident } from '../structure/incident.ts';
import { buildMesh, type Mesh } from '../structure/mesh.ts';
import { PartialElements } from '../structure/partials.ts';
import { solveRealSymmetric } from '../structure/real-solve.ts';
import { rasterizePlanes, type Sheet } from '../structure/sheet.ts';
import { type EdgeCurrents, StructureSolver } from '../structure/structure-solver.ts';
import { type GroundPlane, wireFromCable } from '../structure/wires.ts';
import { EPSILON0_F_PER_M } from '../units/constants.ts';
import { radiatedPowerW } from './radiator.ts';

/** Small structures whose answer a handbook or a law gives, solved by the program's own partial elements. */

function plate(widthM: number, heightM: number, cellM: number): Sheet {
  const region: Region = {
    ringM: [
      [0, 0],
      [widthM, 0],
      [widthM, heightM],
      [0, heightM],
    ],
    cutoutsM: [],
  };
  const grid = {
    originXM: 0,
    originYM: 0,
    cellM,
    columns: Math.round(widthM / cellM),
    rows: Math.round(heightM / cellM),
  };
  return rasterizePlanes([region], grid, 0);
}

/** C = Σ q/V of a free plate with all of it at one potential, F. */
export function plateCapacitanceF(widthM: number, heightM: number, cellsAcross: number): number {
  const mesh = buildMesh(plate(widthM, heightM, heightM / cellsAcross), [], null);
  const matrix = (size: number) => ({ size, re: new Float64Array(size * size), im: new Float64Array(size * size) });
  // G = 4πε0·P, 1/m; the retarded part is below 1e-6 of it.
  const nodes = matrix(mesh.nodeCount);
  new PartialElements(mesh).fill(1e-6, nodes, matrix(mesh.edgeCount));
  const charges = new Float64Array(mesh.nodeCount).fill(1);
  solveRealSymmetric(nodes.re, charges);
  return 4 * Math.PI * EPSILON0_F_PER_M * charges.reduce((sum, value) => sum + value, 0);
}

/** A piece of copper of one cell that carries the joint of a thin-wire antenna: small against everything. */
export const JOINT_CELL_M = 0.5e-3;
export const ANTENNA_RADIUS_M = 0.2e-3;
const ANTENNA_PIECE_M = 10e-3;

const antennaWire = (
  name: string,
  endM: readonly [number, number, number],
  farEnd: 'open' | 'ground',
): Cable & { readonly name: string } => ({
  name,
  pointsM: [[JOINT_CELL_M / 2, JOINT_CELL_M / 2, 0], endM],
  radiusM: ANTENNA_RADIUS_M,
  farEnd,
  seriesOhm: 0,
});

/** Driven by 1 V in one edge. */
function drivenAt(mesh: Mesh, edge: number, frequencyHz: number): EdgeCurrents {
  const solver = new StructureSolver(mesh);
  solver.setFrequency(frequencyHz, []);
  const incident = emptyIncident(mesh);
  incident.emfRe[edge] = 1;
  return solver.solve(incident);
}

interface Impedance {
  readonly re: number;
  readonly im: number;
}

function impedanceOhm(cables: readonly Cable[], ground: GroundPlane | null, atEnd: boolean, hz: number): Impedance {
  const sheet = plate(JOINT_CELL_M, JOINT_CELL_M, JOINT_CELL_M);
  const wires = cables.map((one) => wireFromCable(one, one.name, sheet, ground, ANTENNA_PIECE_M));
  const mesh = buildMesh(sheet, wires, ground);
  const edge = mesh.wireEdgeStart[0]! + (atEnd ? wires[0]!.pieces.length - 1 : 0);
  const { re, im } = drivenAt(mesh, edge, hz);
  const size = re[edge]! ** 2 + im[edge]! ** 2;
  return { re: re[edge]! / size, im: -im[edge]! / size };
}

/** Impedance of two arms of `armM` in line, driven beside their middle, Ω. */
export const dipoleOhm = (armM: number, frequencyHz: number): Impedance =>
  impedanceOhm(
    [
      antennaWire('A', [armM, JOINT_CELL_M / 2, 0], 'open'),
      antennaWire('B', [JOINT_CELL_M - armM, JOINT_CELL_M / 2, 0], 'open'),
    ],
    null,
    false,
    frequencyHz,
  );

/** Impedance of an upright wire of `armM`, driven at the ground it stands on, Ω. */
export const monopoleOhm = (armM: number, frequencyHz: number): Impedance =>
  impedanceOhm(
    [antennaWire('A', [JOINT_CELL_M / 2, JOINT_CELL_M / 2, -armM], 'ground')],
    { axis: 2, positionM: -armM },
    true,
    frequencyHz,
  );

export const STRIP_LENGTH_M = 0.15;
export const STRIP_WIDTH_M = 0.01;

/** Reactance of a free strip of 150 × 10 mm driven across its middle, Ω. */
export function stripReactanceOhm(cellsAcross: number, frequencyHz: number): number {
  const cellM = STRIP_WIDTH_M / cellsAcross;
  const mesh = buildMesh(plate(STRIP_LENGTH_M, STRIP_WIDTH_M, cellM), [], null);
  const solver = new StructureSolver(mesh);
  solver.setFrequency(frequencyHz, []);
  const incident = emptyIncident(mesh);
  const middle = Array.from({ length: mesh.xEdgeCount }, (_, e) => e).filter(
    (e) => Math.abs(mesh.edgeCentreM[3 * e]! - STRIP_LENGTH_M / 2) < cellM / 4,
  );
  for (const e of middle) incident.emfRe[e] = 1;
  const { re, im } = solver.solve(incident);
  const total = (part: Float64Array): number => middle.reduce((sum, e) => sum + part[e]!, 0);
  return -total(im) / (total(re) ** 2 + total(im) ** 2);
}

/** Where a reactance given at two frequencies passes through zero, Hz, by linear interpolation. */
export const zeroCrossingHz = (
  [lowHz, highHz]: readonly [number, number],
  [low, high]: readonly [number, number],
): number => lowHz + ((highHz - lowHz) * low) / (low - high);

/** A free plate of 60 × 40 mm with a bent cable, driven at the joint: power that goes in, and through a far sphere, W. */
export function powerBalanceW(frequencyHz: number): { readonly inputW: number; readonly radiatedW: number } {
  const sheet = plate(0.06, 0.04, 5e-3);
  const cable: Cable = {
    name: 'BENT',
    pointsM: [
      [0.06, 0.0225, 0],
      [0.4, 0.0225, 0],
      [0.4, 0.3, -0.2],
    ],
    radiusM: 1e-3,
    farEnd: 'open',
    seriesOhm: 0,
  };
  const mesh = buildMesh(sheet, [wireFromCable(cable, 'cable BENT', sheet, null, 0.02)], null);
  const first = mesh.wireEdgeStart[0]!;
  const { re, im } = drivenAt(mesh, first, frequencyHz);
  const elements = Array.from({ length: mesh.edgeCount }, (_, e): LinearElement => {
    const end = (sign: number) =>
      [0, 1, 2].map((axis) => mesh.edgeCentreM[3 * e + axis]! + (sign * mesh.edgeVectorM[3 * e + axis]!) / 2);
    const [fromM, toM] = [end(-1), end(1)] as unknown as [LinearElement['fromM'], LinearElement['toM']];
    return { fromM, toM, startRe: re[e]!, startIm: im[e]!, endRe: re[e]!, endIm: im[e]! };
  });
  return { inputW: re[first]! / 2, radiatedW: radiatedPowerW(elements, frequencyHz, FAR_SPHERE_M) };
}
const FAR_SPHERE_M = 100;
