import { EPSILON0_F_PER_M, MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import type { Filament } from './filament-kernel.ts';
import { meanToEdge, meanToNode } from './filament-means.ts';
import { FilamentSums } from './filament-sums.ts';
import type { Incident } from './incident.ts';
import type { Mesh } from './mesh.ts';
import { mirroredFilament } from './wire-kernel.ts';

/** Fills mean current (re, im, A) and charge (re, im, C) of source `index` into `out`. */
export type SourceOf = (index: number, out: Float64Array) => void;

/**
 * Field of given thin filaments (current along, charge spread evenly) on parts of the mesh, images included:
 *   e.m.f. along an edge v: −jω (µ0/4π) Σ I (l·v) G,   potential of a node: (1/4πε0) Σ q G,
 * with the kernel of `PartialElements`. Static parts are computed once.
 */
export class RegularField {
  readonly #sourceCount: number;
  readonly #edges: readonly number[];
  readonly #nodes: readonly number[];
  readonly #onEdges: FilamentSums;
  readonly #onNodes: FilamentSums;

  constructor(mesh: Mesh, sources: readonly Filament[], edges: readonly number[], nodes: readonly number[]) {
    this.#sourceCount = sources.length;
    this.#edges = edges;
    this.#nodes = nodes;
    const { ground } = mesh;
    const images = ground === null ? null : sources.map((source) => mirroredFilament(source, ground));
    const placesM = middlesOf(sources);
    const imagePlacesM = images && middlesOf(images);
    const lengths = lengthsOf(sources, 1);
    // The image of a current: reversed along the ground, kept across it; mirroring alone does the opposite.
    const imageLengths = images && lengthsOf(images, -1);
    this.#onEdges = new FilamentSums(
      {
        placesM,
        vectors: lengths,
        images: imagePlacesM && imageLengths && { placesM: imagePlacesM, vectors: imageLengths },
      },
      { placesM: pick(mesh.edgeCentreM, edges), vectors: pick(mesh.edgeVectorM, edges) },
      (s, i) => {
        const edge = edges[i]!;
        const direct = dot(lengths, s, mesh.edgeVectorM, edge);
        const mirrored = imageLengths ? dot(imageLengths, s, mesh.edgeVectorM, edge) : 0;
        return (
          (direct === 0 ? 0 : direct * meanToEdge(mesh, edge, sources[s]!)) +
          (mirrored === 0 ? 0 : mirrored * meanToEdge(mesh, edge, images![s]!))
        );
      },
    );
    this.#onNodes = new FilamentSums(
      {
        placesM,
        vectors: scalars(sources.length, 1),
        images: imagePlacesM && { placesM: imagePlacesM, vectors: scalars(sources.length, -1) },
      },
      { placesM: pick(mesh.nodeCentreM, nodes), vectors: scalars(nodes.length, 1) },
      (s, i) => meanToNode(mesh, nodes[i]!, sources[s]!) - (images ? meanToNode(mesh, nodes[i]!, images[s]!) : 0),
    );
  }

  /** Adds the field at one frequency. */
  addTo(incident: Incident, frequencyHz: number, sourceOf: SourceOf): void {
    const omega = 2 * Math.PI * frequencyHz;
    const kPerM = omega / SPEED_OF_LIGHT_M_PER_S;
    const currents = new Float64Array(2 * this.#sourceCount);
    const charges = new Float64Array(2 * this.#sourceCount);
    const source = new Float64Array(4);
    for (let s = 0; s < this.#sourceCount; s++) {
      sourceOf(s, source);
      currents[2 * s] = source[0]!;
      currents[2 * s + 1] = source[1]!;
      charges[2 * s] = source[2]!;
      charges[2 * s + 1] = source[3]!;
    }
    const edgeScale = (omega * MU0_H_PER_M) / (4 * Math.PI);
    const onEdges = this.#onEdges.at(kPerM, currents);
    for (const [i, edge] of this.#edges.entries()) {
      // −jω…: re += im, im −= re
      incident.emfRe[edge]! += edgeScale * onEdges.im[i]!;
      incident.emfIm[edge]! -= edgeScale * onEdges.re[i]!;
    }
    const nodeScale = 1 / (4 * Math.PI * EPSILON0_F_PER_M);
    const onNodes = this.#onNodes.at(kPerM, charges);
    for (const [i, node] of this.#nodes.entries()) {
      incident.potentialRe[node]! += nodeScale * onNodes.re[i]!;
      incident.potentialIm[node]! += nodeScale * onNodes.im[i]!;
    }
  }
}

const middlesOf = (filaments: readonly Filament[]): Float64Array =>
  Float64Array.from(filaments.flatMap(({ from, to }) => [0, 1, 2].map((axis) => (from[axis]! + to[axis]!) / 2)));

const lengthsOf = (filaments: readonly Filament[], sign: 1 | -1): Float64Array =>
  Float64Array.from(filaments.flatMap(({ from, to }) => [0, 1, 2].map((axis) => sign * (to[axis]! - from[axis]!))));

const pick = (vectors: Float64Array, indices: readonly number[]): Float64Array =>
  Float64Array.from(indices.flatMap((index) => [0, 1, 2].map((axis) => vectors[3 * index + axis]!)));

const scalars = (count: number, value: 1 | -1): Float64Array =>
  Float64Array.from({ length: 3 * count }, (_, i) => (i % 3 === 0 ? value : 0));

const dot = (a: Float64Array, i: number, b: Float64Array, j: number): number =>
  a[3 * i]! * b[3 * j]! + a[3 * i + 1]! * b[3 * j + 1]! + a[3 * i + 2]! * b[3 * j + 2]!;
