import { type Filament, meanInverseOfFilaments, meanInverseOfSquareAndFilament } from './filament-kernel.ts';
import type { Mesh } from './mesh.ts';
import type { GroundPlane } from './wires.ts';

/** Mirror image of a filament in the ground plane. */
export function mirroredFilament({ from, to }: Filament, { axis, positionM }: GroundPlane): Filament {
  const flip = (p: Filament['from']): Filament['from'] =>
    axis === 1 ? [p[0], 2 * positionM - p[1], p[2]] : [p[0], p[1], 2 * positionM - p[2]];
  return { from: flip(from), to: flip(to) };
}

const lengthOf = ({ from, to }: Filament): number => Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);

/**
 * Static kernel of every wire node with every node, image (reversed charge) included, 1/m: [wire node][node].
 * Between wires the mean of the squared radii stands in for the offset, so that the matrix stays symmetric.
 */
export function wireNodeStatics(mesh: Mesh): Float64Array {
  const { nodeCount, sheet, wireNodes, ground, nodeCentreM } = mesh;
  const out = new Float64Array(wireNodes.length * nodeCount);
  const { cellM } = sheet.grid;
  wireNodes.forEach(({ halves, radiusM }, w) => {
    const total = halves.reduce((sum, half) => sum + lengthOf(half), 0);
    for (const half of halves) {
      const weight = lengthOf(half) / total;
      const image = ground === null ? null : mirroredFilament(half, ground);
      for (let cell = 0; cell < sheet.cellCount; cell++) {
        const centre = [nodeCentreM[3 * cell]!, nodeCentreM[3 * cell + 1]!, nodeCentreM[3 * cell + 2]!] as const;
        let mean = meanInverseOfSquareAndFilament(centre, cellM, half, radiusM * radiusM);
        if (image) mean -= meanInverseOfSquareAndFilament(centre, cellM, image, radiusM * radiusM);
        out[w * nodeCount + cell]! += weight * mean;
      }
      for (let v = 0; v <= w; v++) {
        const other = wireNodes[v]!;
        const offset2 = (radiusM * radiusM + other.radiusM * other.radiusM) / 2;
        const otherTotal = other.halves.reduce((sum, piece) => sum + lengthOf(piece), 0);
        for (const piece of other.halves) {
          let mean = meanInverseOfFilaments(half, piece, offset2);
          if (image) mean -= meanInverseOfFilaments(image, piece, offset2);
          out[w * nodeCount + sheet.cellCount + v]! += ((weight * lengthOf(piece)) / otherTotal) * mean;
        }
      }
    }
  });
  return out;
}

/**
 * Static (v·v') G of every wire edge with every sheet and wire edge, image (current reversed along the ground, kept
 * across it) included, m: [wire edge][edge]; only edges up to the wire edge itself are filled.
 */
export function wireEdgeStatics(mesh: Mesh): Float64Array {
  const { edgeCount, sheet, wirePieces, ground, edgeCentreM, edgeVectorM, firstWireEdge, linkCount } = mesh;
  const out = new Float64Array(wirePieces.length * edgeCount);
  const { cellM } = sheet.grid;
  const sheetEdges = firstWireEdge - linkCount;
  wirePieces.forEach(({ filament, radiusM }, w) => {
    const edge = firstWireEdge + w;
    const image = ground === null ? null : mirroredFilament(filament, ground);
    for (let e = 0; e < sheetEdges; e++) {
      const direct = edgeDot(edgeVectorM, edge, e);
      if (direct === 0) continue;
      const centre = [edgeCentreM[3 * e]!, edgeCentreM[3 * e + 1]!, edgeCentreM[3 * e + 2]!] as const;
      let sum = direct * meanInverseOfSquareAndFilament(centre, cellM, filament, radiusM * radiusM);
      if (image) {
        const mirrored = imageDot(edgeVectorM, edge, e, ground);
        sum += mirrored * meanInverseOfSquareAndFilament(centre, cellM, image, radiusM * radiusM);
      }
      out[w * edgeCount + e] = sum;
    }
    for (let v = 0; v <= w; v++) {
      const other = wirePieces[v]!;
      const offset2 = (radiusM * radiusM + other.radiusM * other.radiusM) / 2;
      const e = firstWireEdge + v;
      const direct = edgeDot(edgeVectorM, edge, e);
      let sum = direct === 0 ? 0 : direct * meanInverseOfFilaments(filament, other.filament, offset2);
      const mirrored = imageDot(edgeVectorM, edge, e, ground);
      if (image && mirrored !== 0) sum += mirrored * meanInverseOfFilaments(image, other.filament, offset2);
      out[w * edgeCount + e] = sum;
    }
  });
  return out;
}

/** v_a · v_b of two edges, m². */
export const edgeDot = (vectors: Float64Array, a: number, b: number): number =>
  vectors[3 * a]! * vectors[3 * b]! +
  vectors[3 * a + 1]! * vectors[3 * b + 1]! +
  vectors[3 * a + 2]! * vectors[3 * b + 2]!;

/** (image of v_a) · v_b: along the ground reversed, across it kept. 0 without ground. */
export function imageDot(vectors: Float64Array, a: number, b: number, ground: GroundPlane | null): number {
  if (ground === null) return 0;
  const across = vectors[3 * a + ground.axis]! * vectors[3 * b + ground.axis]!;
  return 2 * across - edgeDot(vectors, a, b);
}
