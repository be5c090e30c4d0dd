import type { Point3M } from '../board/board.ts';
import { EPSILON0_F_PER_M, MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { type Filament, meanInverseOfFilaments, meanInverseOfSquareAndFilament } from './filament-kernel.ts';
import type { Incident } from './incident.ts';
import type { Mesh } from './mesh.ts';
import { retardedIm, retardedRe } from './retarded.ts';
import { mirroredFilament } from './wire-kernel.ts';

/** Fills mean current (re, im, A) and charge (re, im, C) of source `index` into `out`. */
export type SourceOf = (index: number, out: Float64Array) => void;

/**
 * Field of given thin filaments (current along, charge spread evenly) on parts of the mesh, images included:
 *   e.m.f. along an edge v: −jω (µ0/4π) Σ I (l·v) G,   potential of a node: (1/4πε0) Σ q G,
 * with the kernel of `PartialElements`. Static parts are computed once.
 */
export class RegularField {
  readonly #mesh: Mesh;
  readonly #sources: readonly Filament[];
  readonly #edges: readonly number[];
  readonly #nodes: readonly number[];
  /** [source][edge]: (l·v) × static kernel, image included, m. */
  readonly #edgeStatic: Float64Array;
  /** [source][node]: static kernel, image included, 1/m. */
  readonly #nodeStatic: Float64Array;
  readonly #centresM: Float64Array;
  readonly #vectorsM: Float64Array;

  constructor(mesh: Mesh, sources: readonly Filament[], edges: readonly number[], nodes: readonly number[]) {
    this.#mesh = mesh;
    this.#sources = sources;
    this.#edges = edges;
    this.#nodes = nodes;
    this.#edgeStatic = new Float64Array(sources.length * edges.length);
    this.#nodeStatic = new Float64Array(sources.length * nodes.length);
    this.#centresM = new Float64Array(3 * sources.length);
    this.#vectorsM = new Float64Array(3 * sources.length);
    for (const [s, { from, to }] of sources.entries()) {
      for (let axis = 0; axis < 3; axis++) {
        this.#centresM[3 * s + axis] = (from[axis]! + to[axis]!) / 2;
        this.#vectorsM[3 * s + axis] = to[axis]! - from[axis]!;
      }
      this.#prepare(s);
    }
  }

  #prepare(s: number): void {
    const mesh = this.#mesh;
    const source = this.#sources[s]!;
    const image = mesh.ground === null ? null : mirroredFilament(source, mesh.ground);
    for (const [i, edge] of this.#edges.entries()) {
      const direct = this.#dot(s, edge);
      const mirrored = this.#imageDot(s, edge);
      let sum = direct === 0 ? 0 : direct * meanToEdge(mesh, edge, source);
      if (image && mirrored !== 0) sum += mirrored * meanToEdge(mesh, edge, image);
      this.#edgeStatic[s * this.#edges.length + i] = sum;
    }
    for (const [i, node] of this.#nodes.entries()) {
      const mean = meanToNode(mesh, node, source) - (image ? meanToNode(mesh, node, image) : 0);
      this.#nodeStatic[s * this.#nodes.length + i] = mean;
    }
  }

  #dot(s: number, edge: number): number {
    const v = this.#mesh.edgeVectorM;
    const l = this.#vectorsM;
    return l[3 * s]! * v[3 * edge]! + l[3 * s + 1]! * v[3 * edge + 1]! + l[3 * s + 2]! * v[3 * edge + 2]!;
  }

  #imageDot(s: number, edge: number): number {
    const { ground, edgeVectorM } = this.#mesh;
    if (ground === null) return 0;
    return 2 * this.#vectorsM[3 * s + ground.axis]! * edgeVectorM[3 * edge + ground.axis]! - this.#dot(s, edge);
  }

  /** Adds the field at one frequency. */
  addTo(incident: Incident, frequencyHz: number, sourceOf: SourceOf): void {
    const omega = 2 * Math.PI * frequencyHz;
    const kPerM = omega / SPEED_OF_LIGHT_M_PER_S;
    const { ground, edgeCentreM, nodeCentreM } = this.#mesh;
    const edgeScale = (omega * MU0_H_PER_M) / (4 * Math.PI);
    const nodeScale = 1 / (4 * Math.PI * EPSILON0_F_PER_M);
    const source = new Float64Array(4);
    for (let s = 0; s < this.#sources.length; s++) {
      sourceOf(s, source);
      const [iRe, iIm, qRe, qIm] = source as unknown as [number, number, number, number];
      for (let i = 0; i < this.#edges.length; i++) {
        const edge = this.#edges[i]!;
        const direct = this.#dot(s, edge);
        const mirrored = this.#imageDot(s, edge);
        if (direct === 0 && mirrored === 0) continue;
        const directM = this.#distanceM(s, edgeCentreM, edge, false);
        let gRe = this.#edgeStatic[s * this.#edges.length + i]! + direct * retardedRe(kPerM, directM);
        let gIm = direct * retardedIm(kPerM, directM);
        if (ground !== null) {
          const imageM = this.#distanceM(s, edgeCentreM, edge, true);
          gRe += mirrored * retardedRe(kPerM, imageM);
          gIm += mirrored * retardedIm(kPerM, imageM);
        }
        // −jω…: re += im, im −= re
        incident.emfRe[edge]! += edgeScale * (iRe * gIm + iIm * gRe);
        incident.emfIm[edge]! -= edgeScale * (iRe * gRe - iIm * gIm);
      }
      if (qRe === 0 && qIm === 0) continue;
      for (let i = 0; i < this.#nodes.length; i++) {
        const node = this.#nodes[i]!;
        const directM = this.#distanceM(s, nodeCentreM, node, false);
        let gRe = this.#nodeStatic[s * this.#nodes.length + i]! + retardedRe(kPerM, directM);
        let gIm = retardedIm(kPerM, directM);
        if (ground !== null) {
          const imageM = this.#distanceM(s, nodeCentreM, node, true);
          gRe -= retardedRe(kPerM, imageM);
          gIm -= retardedIm(kPerM, imageM);
        }
        incident.potentialRe[node]! += nodeScale * (qRe * gRe - qIm * gIm);
        incident.potentialIm[node]! += nodeScale * (qRe * gIm + qIm * gRe);
      }
    }
  }

  #distanceM(s: number, centresM: Float64Array, target: number, isImage: boolean): number {
    let sum = 0;
    const { ground } = this.#mesh;
    for (let axis = 0; axis < 3; axis++) {
      const own = this.#centresM[3 * s + axis]!;
      const at = isImage && ground !== null && axis === ground.axis ? 2 * ground.positionM - own : own;
      const difference = centresM[3 * target + axis]! - at;
      sum += difference * difference;
    }
    return Math.sqrt(sum);
  }
}

const centreOf = (centresM: Float64Array, index: number): Point3M => [
  centresM[3 * index]!,
  centresM[3 * index + 1]!,
  centresM[3 * index + 2]!,
];

/** From this many times their sizes apart, the second-order series stands for the mean of 1/R (error below 1e-5). */
const FAR_SIZES = 7;

/** 1/24 of the mean square extent of a source or target along a direction, times the second derivative of 1/R, over 1/R. */
const extentTerm = (lengthM: number, alongM: number, distance2: number): number =>
  (lengthM * lengthM * ((3 * alongM * alongM) / distance2 - 1)) / (24 * distance2);

/**
 * Mean of 1/R between a filament and a far target, null when it is near. The target is a square (`squareM` > 0, normal to z) or
 * a straight piece with length vector `vectorM`. Second order, because trace and return nearly cancel.
 */
function farMean(centreM: Point3M, squareM: number, vectorM: Point3M, { from, to }: Filament): number | null {
  const rx = centreM[0] - (from[0] + to[0]) / 2;
  const ry = centreM[1] - (from[1] + to[1]) / 2;
  const rz = centreM[2] - (from[2] + to[2]) / 2;
  const lx = to[0] - from[0];
  const ly = to[1] - from[1];
  const lz = to[2] - from[2];
  const lengthM = Math.sqrt(lx * lx + ly * ly + lz * lz);
  const targetM = Math.sqrt(vectorM[0] * vectorM[0] + vectorM[1] * vectorM[1] + vectorM[2] * vectorM[2]);
  const r2 = rx * rx + ry * ry + rz * rz;
  const far = FAR_SIZES * Math.max(lengthM, targetM, squareM);
  if (r2 < far * far) return null;
  let factor = 1 + extentTerm(lengthM, (rx * lx + ry * ly + rz * lz) / lengthM, r2);
  if (squareM > 0) factor += extentTerm(squareM, rx, r2) + extentTerm(squareM, ry, r2);
  else factor += extentTerm(targetM, (rx * vectorM[0] + ry * vectorM[1] + rz * vectorM[2]) / targetM, r2);
  return factor / Math.sqrt(r2);
}

const NO_VECTOR: Point3M = [0, 0, 0];
const vectorOf = ({ from, to }: Filament): Point3M => [to[0] - from[0], to[1] - from[1], to[2] - from[2]];
const middleOf = ({ from, to }: Filament): Point3M => [
  (from[0] + to[0]) / 2,
  (from[1] + to[1]) / 2,
  (from[2] + to[2]) / 2,
];

/** Static mean of 1/R between a filament and the patch or wire piece of an edge. */
function meanToEdge(mesh: Mesh, edge: number, source: Filament): number {
  const { firstWireEdge, wirePieces, edgeCentreM } = mesh;
  if (edge < firstWireEdge) return meanToSquare(mesh, centreOf(edgeCentreM, edge), source);
  const { filament, radiusM } = wirePieces[edge - firstWireEdge]!;
  return meanToPiece(filament, radiusM, source);
}

/** Static mean of 1/R between a filament and a cell or wire node. */
function meanToNode(mesh: Mesh, node: number, source: Filament): number {
  const { sheet, wireNodes, nodeCentreM } = mesh;
  if (node < sheet.cellCount) return meanToSquare(mesh, centreOf(nodeCentreM, node), source);
  const { halves, radiusM } = wireNodes[node - sheet.cellCount]!;
  let sum = 0;
  let total = 0;
  for (const half of halves) {
    const lengthM = Math.hypot(...vectorOf(half));
    sum += lengthM * meanToPiece(half, radiusM, source);
    total += lengthM;
  }
  return sum / total;
}

const meanToSquare = ({ sheet }: Mesh, centreM: Point3M, source: Filament): number =>
  farMean(centreM, sheet.grid.cellM, NO_VECTOR, source) ??
  meanInverseOfSquareAndFilament(centreM, sheet.grid.cellM, source, 0);

const meanToPiece = (piece: Filament, radiusM: number, source: Filament): number =>
  farMean(middleOf(piece), 0, vectorOf(piece), source) ?? meanInverseOfFilaments(piece, source, radiusM * radiusM);
