import type { Point3M, PointM } from '../../app/board/board.ts';
import type { Region } from '../../app/geometry/polygon.ts';
import { emptyIncident, type Incident } from '../../app/structure/incident.ts';
import type { LineWave } from '../../app/structure/line-wave.ts';
import { buildMesh, type Mesh } from '../../app/structure/mesh.ts';
import { PairCoupling } from '../../app/structure/pair-coupling.ts';
import { filamentSource, pairFilaments } from '../../app/structure/pair-filaments.ts';
import type { PairPiece } from '../../app/structure/pair-piece.ts';
import { rasterizePlanes, type Sheet } from '../../app/structure/sheet.ts';
import { SheetLookup } from '../../app/structure/sheet-lookup.ts';
import { StructureSolver } from '../../app/structure/structure-solver.ts';
import type { GroundPlane, Wire } from '../../app/structure/wires.ts';

const C_M_PER_S = 299_792_458;
const MU0 = 1.256_637_062_12e-6;
export const ETA0_OHM = MU0 * C_M_PER_S;

export const rectangleRing = (lowX: number, lowY: number, highX: number, highY: number): PointM[] => [
  [lowX, lowY],
  [highX, lowY],
  [highX, highY],
  [lowX, highY],
];

/** Plane from (0, 0), with cutouts. */
export const rectangle = (widthM: number, heightM: number, cutoutsM: PointM[][] = []): Region => ({
  ringM: rectangleRing(0, 0, widthM, heightM),
  cutoutsM,
});

/** Sheet at height `zM` whose cells fit the box of (0, 0)–(widthM, heightM). */
export function sheetOf(planes: readonly Region[], widthM: number, heightM: number, cellM: number, zM = 0): Sheet {
  const grid = {
    originXM: 0,
    originYM: 0,
    cellM,
    columns: Math.round(widthM / cellM),
    rows: Math.round(heightM / cellM),
  };
  return rasterizePlanes(planes, grid, zM);
}

/** The table's ground under a flat board. */
export const FLAT_GROUND: GroundPlane = { axis: 2, positionM: -0.8 };

export const uniform = (currentA: number): LineWave => ({
  gammaRePerM: 0,
  gammaImPerM: 0,
  forwardReA: currentA,
  forwardImA: 0,
  backwardReA: 0,
  backwardImA: 0,
});

/** Lossless line in air driven by 1 V without resistance, terminated by `loadOhm`. */
export function drivenLine(frequencyHz: number, lengthM: number, z0Ohm: number, loadOhm: number): LineWave {
  const k = (2 * Math.PI * frequencyHz) / C_M_PER_S;
  const reflection = (loadOhm - z0Ohm) / (loadOhm + z0Ohm);
  const backRe = reflection * Math.cos(2 * k * lengthM);
  const backIm = -reflection * Math.sin(2 * k * lengthM);
  const size = (1 + backRe) ** 2 + backIm ** 2;
  const re = (1 + backRe) / size / z0Ohm;
  const im = -backIm / size / z0Ohm;
  return {
    gammaRePerM: 0,
    gammaImPerM: k,
    forwardReA: re,
    forwardImA: im,
    backwardReA: -(re * backRe - im * backIm),
    backwardImA: -(re * backIm + im * backRe),
  };
}

/** A current element: place, length vector, current. */
export interface Element {
  readonly atM: Point3M;
  readonly vectorM: Point3M;
  readonly re: number;
  readonly im: number;
}

export const meshElements = (
  { edgeCount, edgeCentreM, edgeVectorM }: Mesh,
  re: Float64Array,
  im: Float64Array,
): Element[] =>
  Array.from({ length: edgeCount }, (_, e) => ({
    atM: [edgeCentreM[3 * e]!, edgeCentreM[3 * e + 1]!, edgeCentreM[3 * e + 2]!],
    vectorM: [edgeVectorM[3 * e]!, edgeVectorM[3 * e + 1]!, edgeVectorM[3 * e + 2]!],
    re: re[e]!,
    im: im[e]!,
  }));

/** Pairs on a sheet (wires aside), solved: elements of the pairs and of the structure. */
export function solvePairs(
  sheet: Sheet,
  ground: GroundPlane | null,
  frequencyHz: number,
  pieces: readonly PairPiece[],
  waves: readonly LineWave[],
  wires: readonly Wire[] = [],
): { readonly mesh: Mesh; readonly pair: Element[]; readonly structure: Element[]; readonly incident: Incident } {
  const mesh = buildMesh(sheet, wires, ground);
  const solver = new StructureSolver(mesh);
  solver.setFrequency(frequencyHz, []);
  const incident = emptyIncident(mesh);
  const coupling = new PairCoupling(new SheetLookup(mesh), pieces, 'pieces');
  coupling.addTo(incident, frequencyHz, waves);
  const { re, im } = solver.solve(incident);
  const omega = 2 * Math.PI * frequencyHz;
  const source = new Float64Array(4);
  const filaments = pairFilaments(pieces, coupling.gaps, sheet.zM, 2e-3);
  const pair = filaments.map((part): Element => {
    filamentSource(part, pieces[part.piece]!, waves[part.piece]!, omega, source);
    const { from, to } = part.filament;
    return {
      atM: [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2, (from[2] + to[2]) / 2],
      vectorM: [to[0] - from[0], to[1] - from[1], to[2] - from[2]],
      re: source[0]!,
      im: source[1]!,
    };
  });
  return { mesh, pair, structure: meshElements(mesh, re, im), incident };
}

/** E (V/m) of elements and their images at a point: [x re, x im, y re, y im, z re, z im]; formula of physics 2.1. */
export function fieldAt(
  elements: readonly Element[],
  ground: GroundPlane | null,
  frequencyHz: number,
  atM: Point3M,
): Float64Array {
  const e = new Float64Array(6);
  const k = (2 * Math.PI * frequencyHz) / C_M_PER_S;
  for (const one of elements) {
    addElement(e, k, one.atM, one.vectorM, one, atM);
    if (ground === null) continue;
    const place = one.atM.map((v, axis) => (axis === ground.axis ? 2 * ground.positionM - v : v));
    const vector = one.vectorM.map((v, axis) => (axis === ground.axis ? v : -v));
    addElement(e, k, place, vector, one, atM);
  }
  return e;
}

function addElement(
  e: Float64Array,
  k: number,
  place: readonly number[],
  vector: readonly number[],
  { re, im }: Element,
  atM: Point3M,
): void {
  const r = [0, 1, 2].map((axis) => atM[axis]! - place[axis]!);
  const distance = Math.hypot(...r);
  const n = r.map((v) => v / distance);
  const radial = n.reduce((sum, v, axis) => sum + v * vector[axis]!, 0);
  const x = k * distance;
  // −jkη0 e^(−jx)/(4πR) · { [1 − j/x − 1/x²] m + [−1 + 3j/x + 3/x²] (n·m) n }
  const scale = (k * ETA0_OHM) / (4 * Math.PI * distance);
  const turnRe = -scale * Math.sin(x);
  const turnIm = -scale * Math.cos(x);
  const factorRe = turnRe * re - turnIm * im;
  const factorIm = turnRe * im + turnIm * re;
  for (let axis = 0; axis < 3; axis++) {
    const partRe = (1 - 1 / x ** 2) * vector[axis]! + (3 / x ** 2 - 1) * radial * n[axis]!;
    const partIm = (-1 / x) * vector[axis]! + (3 / x) * radial * n[axis]!;
    e[2 * axis]! += factorRe * partRe - factorIm * partIm;
    e[2 * axis + 1]! += factorRe * partIm + factorIm * partRe;
  }
}

/** Largest horizontal (across the line of sight) and vertical field on the 3 m cylinder, 1–4 m over a flat board's ground. */
export function maxima(
  elements: readonly Element[],
  frequencyHz: number,
  centreM: PointM,
): { horizontal: number; vertical: number } {
  let horizontal = 0;
  let vertical = 0;
  for (let a = 0; a < 20; a++) {
    const angle = (a * Math.PI) / 10;
    for (let z = 1; z <= 4; z += 0.5) {
      const at: Point3M = [
        centreM[0] + 3 * Math.cos(angle),
        centreM[1] + 3 * Math.sin(angle),
        z + FLAT_GROUND.positionM,
      ];
      const e = fieldAt(elements, FLAT_GROUND, frequencyHz, at);
      const across = (part: number): number => e[2 + part]! * Math.cos(angle) - e[part]! * Math.sin(angle);
      horizontal = Math.max(horizontal, Math.hypot(across(0), across(1)));
      vertical = Math.max(vertical, Math.hypot(e[4]!, e[5]!));
    }
  }
  return { horizontal, vertical };
}

export const decibels = (ratio: number): number => 20 * Math.log10(ratio);
