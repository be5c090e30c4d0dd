import type { Filament } from './filament-kernel.ts';
import { cellCentreXM, cellCentreYM, type Sheet } from './sheet.ts';
import type { GroundPlane, Wire } from './wires.ts';

/**
 * Unknowns of the structure, board axes. Nodes carry charge: cells first, then the wires' nodes. Edges carry current from
 * `edgeFrom` to `edgeTo` (node numbers, −1 = ground): x edges, y edges, links of joints, wire pieces, in this order.
 */
export interface Mesh {
  readonly sheet: Sheet;
  readonly wires: readonly Wire[];
  readonly ground: GroundPlane | null;
  readonly nodeCount: number;
  readonly edgeCount: number;
  readonly xEdgeCount: number;
  readonly yEdgeCount: number;
  readonly linkCount: number;
  /** First edge of the wires (x, y edges and links lie before it). */
  readonly firstWireEdge: number;
  readonly edgeFrom: Int32Array;
  readonly edgeTo: Int32Array;
  /** x, y, z of each node's and edge's centre, m. */
  readonly nodeCentreM: Float64Array;
  readonly edgeCentreM: Float64Array;
  /** Direction of the edge times its length, m (links: from the cell's centre to the joint). */
  readonly edgeVectorM: Float64Array;
  /** Halves of the wire nodes and pieces of the wire edges, each in the order of its numbers, with the wire's radius. */
  readonly wireNodes: readonly { readonly halves: readonly Filament[]; readonly radiusM: number }[];
  readonly wirePieces: readonly { readonly filament: Filament; readonly radiusM: number }[];
  /** First edge and node of every wire. */
  readonly wireEdgeStart: readonly number[];
  readonly wireNodeStart: readonly number[];
}

/** Numbers cells, edges, joints and wire pieces. */
export function buildMesh(sheet: Sheet, wires: readonly Wire[], ground: GroundPlane | null): Mesh {
  const { cellCount, grid, columnOf, rowOf, conductsRight, conductsUp, cellAt, zM } = sheet;
  const from: number[] = [];
  const to: number[] = [];
  const centres: number[] = [];
  const vectors: number[] = [];
  const cellM = grid.cellM;
  const addEdge = (a: number, b: number, centre: readonly number[], vector: readonly number[]): void => {
    from.push(a);
    to.push(b);
    centres.push(...centre);
    vectors.push(...vector);
  };
  for (let cell = 0; cell < cellCount; cell++) {
    if (conductsRight[cell] === 0) continue;
    const neighbour = cellAt[rowOf[cell]! * grid.columns + columnOf[cell]! + 1]!;
    const x = cellCentreXM(sheet, cell) + cellM / 2;
    addEdge(cell, neighbour, [x, cellCentreYM(sheet, cell), zM], [cellM, 0, 0]);
  }
  const xEdgeCount = from.length;
  for (let cell = 0; cell < cellCount; cell++) {
    if (conductsUp[cell] === 0) continue;
    const neighbour = cellAt[(rowOf[cell]! + 1) * grid.columns + columnOf[cell]!]!;
    const y = cellCentreYM(sheet, cell) + cellM / 2;
    addEdge(cell, neighbour, [cellCentreXM(sheet, cell), y, zM], [0, cellM, 0]);
  }
  const yEdgeCount = from.length - xEdgeCount;
  const nodeCentres: number[] = [];
  for (let cell = 0; cell < cellCount; cell++)
    nodeCentres.push(cellCentreXM(sheet, cell), cellCentreYM(sheet, cell), zM);

  const wireNodes: { halves: readonly Filament[]; radiusM: number }[] = [];
  const wireNodeStart: number[] = [];
  let nodeCount = cellCount;
  for (const wire of wires) {
    wireNodeStart.push(nodeCount);
    for (const cell of wire.jointCells) {
      const x = cellCentreXM(sheet, cell);
      const y = cellCentreYM(sheet, cell);
      const [jx, jy, jz] = wire.jointM;
      addEdge(cell, nodeCount, [(x + jx) / 2, (y + jy) / 2, (zM + jz) / 2], [jx - x, jy - y, jz - zM]);
    }
    for (const { halves, centreM } of wire.nodes) {
      wireNodes.push({ halves, radiusM: wire.radiusM });
      nodeCentres.push(...centreM);
    }
    nodeCount += wire.nodes.length;
  }
  const firstWireEdge = from.length;
  const wirePieces: { filament: Filament; radiusM: number }[] = [];
  const wireEdgeStart: number[] = [];
  wires.forEach((wire, w) => {
    const start = wireNodeStart[w]!;
    wireEdgeStart.push(from.length);
    for (const { filament, fromNode, toNode } of wire.pieces) {
      const [a, b] = [filament.from, filament.to];
      addEdge(
        start + fromNode,
        toNode < 0 ? -1 : start + toNode,
        [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2, (a[2] + b[2]) / 2],
        [b[0] - a[0], b[1] - a[1], b[2] - a[2]],
      );
      wirePieces.push({ filament, radiusM: wire.radiusM });
    }
  });
  return {
    sheet,
    wires,
    ground,
    nodeCount,
    edgeCount: from.length,
    xEdgeCount,
    yEdgeCount,
    linkCount: firstWireEdge - xEdgeCount - yEdgeCount,
    firstWireEdge,
    edgeFrom: Int32Array.from(from),
    edgeTo: Int32Array.from(to),
    nodeCentreM: Float64Array.from(nodeCentres),
    edgeCentreM: Float64Array.from(centres),
    edgeVectorM: Float64Array.from(vectors),
    wireNodes,
    wirePieces,
    wireEdgeStart,
    wireNodeStart,
  };
}
