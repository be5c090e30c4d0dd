import type { Point3M } from '../board/board.ts';
import { type Filament, meanInverseOfFilaments, meanInverseOfSquareAndFilament } from './filament-kernel.ts';
import type { Mesh } from './mesh.ts';

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
export function meanToEdge(mesh: Mesh, edge: number, source: Filament): number {
  const { firstWireEdge, wirePieces, edgeCentreM } = mesh;
  if (edge < firstWireEdge) return meanToSquare(mesh, centreOf(edgeCentreM, edge), source);
  const { filament, radiusM } = wirePieces[edge - firstWireEdge]!;
  return meanToPiece(filament, radiusM, source);
}

/** Static mean of 1/R between a filament and a cell or wire node. */
export function meanToNode(mesh: Mesh, node: number, source: Filament): number {
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
