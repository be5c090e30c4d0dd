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

/** From this many times their sizes apart, 1/R between the middles stands for the mean: (size/R)²/24 below 1e-3. */
const FAR_SIZES = 7;

/** 1/R between the middles when they are far against the filament and the target's size, else null. */
function farInverse(centresM: Float64Array, target: number, sizeM: number, { from, to }: Filament): number | null {
  const distanceM = Math.hypot(
    centresM[3 * target]! - (from[0] + to[0]) / 2,
    centresM[3 * target + 1]! - (from[1] + to[1]) / 2,
    centresM[3 * target + 2]! - (from[2] + to[2]) / 2,
  );
  const lengthM = Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);
  return distanceM > FAR_SIZES * Math.max(lengthM, sizeM) ? 1 / distanceM : null;
}

/** Static mean of 1/R between a filament and the patch or wire piece of an edge. */
function meanToEdge(mesh: Mesh, edge: number, source: Filament): number {
  const { firstWireEdge, wirePieces, edgeCentreM, edgeVectorM, sheet } = mesh;
  const sizeM = Math.hypot(edgeVectorM[3 * edge]!, edgeVectorM[3 * edge + 1]!, edgeVectorM[3 * edge + 2]!);
  const far = farInverse(edgeCentreM, edge, sizeM, source);
  if (far !== null) return far;
  if (edge < firstWireEdge) {
    return meanInverseOfSquareAndFilament(centreOf(edgeCentreM, edge), sheet.grid.cellM, source, 0);
  }
  const { filament, radiusM } = wirePieces[edge - firstWireEdge]!;
  return meanInverseOfFilaments(filament, source, radiusM * radiusM);
}

/** Static mean of 1/R between a filament and a cell or wire node. */
function meanToNode(mesh: Mesh, node: number, source: Filament): number {
  const { sheet, wireNodes, nodeCentreM } = mesh;
  if (node < sheet.cellCount) {
    return meanInverseOfSquareAndFilament(centreOf(nodeCentreM, node), sheet.grid.cellM, source, 0);
  }
  const { halves, radiusM } = wireNodes[node - sheet.cellCount]!;
  const sizeM = halves.reduce(
    (most, { from, to }) => Math.max(most, Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2])),
    0,
  );
  const far = halves.length === 1 ? farInverse(nodeCentreM, node, sizeM, source) : null;
  if (far !== null) return far;
  let sum = 0;
  let total = 0;
  for (const half of halves) {
    const lengthM = Math.hypot(half.to[0] - half.from[0], half.to[1] - half.from[1], half.to[2] - half.from[2]);
    sum += lengthM * meanInverseOfFilaments(half, source, radiusM * radiusM);
    total += lengthM;
  }
  return sum / total;
}
