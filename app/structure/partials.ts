import { applyChanges, boundaryCorrections, type KernelChanges } from './boundary-corrections.ts';
import type { SymmetricMatrix } from './factor.ts';
import type { Mesh } from './mesh.ts';
import { retardedIm, retardedRe } from './retarded.ts';
import { SheetKernel } from './sheet-kernel.ts';
import { edgeDot, imageDot, wireEdgeStatics, wireNodeStatics } from './wire-kernel.ts';

/**
 * Partial inductances and potential coefficients of the mesh over the site's ground.
 *
 * Both share the kernel G, 1/m: potential coefficient p = G/(4πε0), partial inductance L = (µ0/4π) (v·v') G for edges
 * with length vectors v, v', where
 *   G = mean of 1/R over both patches + (e^(−jkR) − 1)/R between centres (−jk at R = 0),
 * and the same for the image: charge reversed, current reversed along the ground and kept across it.
 * The static part is computed once; only the retarded part depends on frequency.
 * Source: A. E. Ruehli, IEEE Trans. MTT 22(3), 1974. Copper edges and slots: `boundaryCorrections`.
 */
export class PartialElements {
  readonly mesh: Mesh;
  readonly #sheet: SheetKernel;
  readonly #nodeStatic: Float64Array;
  readonly #edgeStatic: Float64Array;
  readonly #changes: KernelChanges;

  constructor(mesh: Mesh) {
    this.mesh = mesh;
    this.#sheet = new SheetKernel(mesh.sheet, mesh.ground);
    this.#nodeStatic = wireNodeStatics(mesh);
    this.#edgeStatic = wireEdgeStatics(mesh);
    this.#changes = boundaryCorrections(mesh);
  }

  /**
   * Fills the kernel between nodes with images, G (1/m, full), and the scaled impedance matrix (m, lower triangle)
   *   z = Z · 4π/(jωµ0) = (v·v') G − (1/k²) [G(to, to') − G(to, from') − G(from, to') + G(from, from')].
   * A retarded kernel e^(−jkR) times the static mean would break the power balance by per cents; the sum does not.
   */
  fill(kPerM: number, nodes: SymmetricMatrix, edges: SymmetricMatrix): void {
    this.#sheet.update(kPerM);
    this.#fillCells(nodes);
    this.#fillWireNodes(kPerM, nodes);
    applyChanges(this.#changes.nodes, nodes, true);
    this.#fillInductances(edges);
    this.#fillWireInductances(kPerM, edges);
    applyChanges(this.#changes.edges, edges, false);
    addCharges(this.mesh, 1 / (kPerM * kPerM), nodes, edges);
  }

  #fillCells({ size, re, im }: SymmetricMatrix): void {
    const { columnOf, rowOf, cellCount, grid } = this.mesh.sheet;
    const { directRe, directIm, imageRe, imageIm, imageKind } = this.#sheet;
    const { columns } = grid;
    for (let i = 0; i < cellCount; i++) {
      const ci = columnOf[i]!;
      const ri = rowOf[i]!;
      for (let j = 0; j <= i; j++) {
        const dc = Math.abs(ci - columnOf[j]!);
        const rj = rowOf[j]!;
        const direct = Math.abs(ri - rj) * columns + dc;
        let valueRe = directRe[direct]!;
        let valueIm = directIm[direct]!;
        if (imageKind !== 0) {
          const image = imageKind === 1 ? direct : (ri + rj) * columns + dc;
          valueRe -= imageRe[image]!;
          valueIm -= imageIm[image]!;
        }
        re[i * size + j] = valueRe;
        im[i * size + j] = valueIm;
        re[j * size + i] = valueRe;
        im[j * size + i] = valueIm;
      }
    }
  }

  #fillWireNodes(kPerM: number, { size, re, im }: SymmetricMatrix): void {
    const { nodeCentreM, sheet, ground } = this.mesh;
    for (let i = sheet.cellCount; i < size; i++) {
      const row = (i - sheet.cellCount) * size;
      for (let j = 0; j <= i; j++) {
        const directM = distanceM(nodeCentreM, i, j);
        let valueRe = this.#nodeStatic[row + j]! + retardedRe(kPerM, directM);
        let valueIm = retardedIm(kPerM, directM);
        if (ground !== null) {
          const imageM = imageDistanceM(nodeCentreM, i, j, ground);
          valueRe -= retardedRe(kPerM, imageM);
          valueIm -= retardedIm(kPerM, imageM);
        }
        re[i * size + j] = valueRe;
        im[i * size + j] = valueIm;
        re[j * size + i] = valueRe;
        im[j * size + i] = valueIm;
      }
    }
  }

  #fillInductances(edges: SymmetricMatrix): void {
    const { xEdgeCount, yEdgeCount, linkCount } = this.mesh;
    this.#fillParallel(edges, 0, xEdgeCount, -1, 0);
    // Upright, the y edges stand across the ground: their images keep the sign, half a cell higher than their cells.
    const isUpright = this.#sheet.imageKind === 2;
    this.#fillParallel(edges, xEdgeCount, yEdgeCount, isUpright ? 1 : -1, isUpright ? 1 : 0);
    const { size, re, im } = edges;
    for (let e = xEdgeCount; e < xEdgeCount + yEdgeCount; e++) {
      re.fill(0, e * size, e * size + xEdgeCount);
      im.fill(0, e * size, e * size + xEdgeCount);
    }
    for (let e = xEdgeCount + yEdgeCount; e < xEdgeCount + yEdgeCount + linkCount; e++) {
      re.fill(0, e * size, e * size + e + 1);
      im.fill(0, e * size, e * size + e + 1);
    }
  }

  /** Edges of one direction among themselves; each lies on the square between the cells it joins. */
  #fillParallel(
    { size, re, im }: SymmetricMatrix,
    first: number,
    count: number,
    imageSign: number,
    shift: number,
  ): void {
    const { edgeFrom, sheet } = this.mesh;
    const { columnOf, rowOf, grid } = sheet;
    const { directRe, directIm, imageRe, imageIm, imageKind } = this.#sheet;
    const { columns, cellM } = grid;
    const area = cellM * cellM;
    for (let e = first; e < first + count; e++) {
      const ce = columnOf[edgeFrom[e]!]!;
      const rowE = rowOf[edgeFrom[e]!]!;
      for (let f = first; f <= e; f++) {
        const dc = Math.abs(ce - columnOf[edgeFrom[f]!]!);
        const rowF = rowOf[edgeFrom[f]!]!;
        const direct = Math.abs(rowE - rowF) * columns + dc;
        let valueRe = directRe[direct]!;
        let valueIm = directIm[direct]!;
        if (imageKind !== 0) {
          const image = imageKind === 1 ? direct : (rowE + rowF + shift) * columns + dc;
          valueRe += imageSign * imageRe[image]!;
          valueIm += imageSign * imageIm[image]!;
        }
        re[e * size + f] = area * valueRe;
        im[e * size + f] = area * valueIm;
      }
    }
  }

  #fillWireInductances(kPerM: number, { size, re, im }: SymmetricMatrix): void {
    const { edgeCentreM, edgeVectorM, firstWireEdge, linkCount, ground } = this.mesh;
    const firstLink = firstWireEdge - linkCount;
    for (let e = firstWireEdge; e < size; e++) {
      const row = (e - firstWireEdge) * size;
      for (let f = 0; f <= e; f++) {
        let valueRe = this.#edgeStatic[row + f]!;
        let valueIm = 0;
        const isLink = f >= firstLink && f < firstWireEdge;
        if (!isLink) {
          const direct = edgeDot(edgeVectorM, e, f);
          if (direct !== 0) {
            const directM = distanceM(edgeCentreM, e, f);
            valueRe += direct * retardedRe(kPerM, directM);
            valueIm += direct * retardedIm(kPerM, directM);
          }
          const image = imageDot(edgeVectorM, e, f, ground);
          if (ground !== null && image !== 0) {
            const imageM = imageDistanceM(edgeCentreM, e, f, ground);
            valueRe += image * retardedRe(kPerM, imageM);
            valueIm += image * retardedIm(kPerM, imageM);
          }
        }
        re[e * size + f] = valueRe;
        im[e * size + f] = valueIm;
      }
    }
  }
}

/** −(1/k²) times the second difference of the node kernel: the potential that the charges of edge f put across edge e. */
function addCharges({ edgeFrom, edgeTo }: Mesh, scale: number, nodes: SymmetricMatrix, edges: SymmetricMatrix): void {
  const n = nodes.size;
  const { re: nRe, im: nIm } = nodes;
  const { size, re, im } = edges;
  for (let e = 0; e < size; e++) {
    const fromRow = edgeFrom[e]! * n;
    const toRow = edgeTo[e]! * n;
    const row = e * size;
    for (let f = 0; f <= e; f++) {
      const from = edgeFrom[f]!;
      const to = edgeTo[f]!;
      let sumRe = nRe[fromRow + from]!;
      let sumIm = nIm[fromRow + from]!;
      if (to >= 0) {
        sumRe -= nRe[fromRow + to]!;
        sumIm -= nIm[fromRow + to]!;
      }
      if (toRow >= 0) {
        sumRe -= nRe[toRow + from]!;
        sumIm -= nIm[toRow + from]!;
        if (to >= 0) {
          sumRe += nRe[toRow + to]!;
          sumIm += nIm[toRow + to]!;
        }
      }
      re[row + f]! -= scale * sumRe;
      im[row + f]! -= scale * sumIm;
    }
  }
}

function distanceM(centres: Float64Array, i: number, j: number): number {
  const dx = centres[3 * i]! - centres[3 * j]!;
  const dy = centres[3 * i + 1]! - centres[3 * j + 1]!;
  const dz = centres[3 * i + 2]! - centres[3 * j + 2]!;
  return Math.sqrt(dx * dx + dy * dy + dz * dz);
}

function imageDistanceM(
  centres: Float64Array,
  i: number,
  j: number,
  { axis, positionM }: NonNullable<Mesh['ground']>,
): number {
  const dx = centres[3 * i]! - centres[3 * j]!;
  const sum = centres[3 * i + axis]! + centres[3 * j + axis]! - 2 * positionM;
  const other = 3 - axis;
  const along = centres[3 * i + other]! - centres[3 * j + other]!;
  return Math.sqrt(dx * dx + along * along + sum * sum);
}
