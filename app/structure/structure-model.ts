import type { Board, Cable } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { ElementCollector, type ElementSet, type Radiator } from '../fields/element-set.ts';
import { ringAreaM2 } from '../geometry/polygon.ts';
import { type SiteFrame, type SiteKind, TABLE_HEIGHT_M, toSitePoint, toSiteVector } from '../site/site.ts';
import { chooseGrid } from './cell-grid.ts';
import { buildMesh, type Mesh } from './mesh.ts';
import { rasterizePlanes } from './sheet.ts';
import { SheetLookup } from './sheet-lookup.ts';
import { type EdgeCurrents, type SeriesImpedance, StructureSolver } from './structure-solver.ts';
import { type GroundPlane, wireFromCable } from './wires.ts';

/** Longest wire piece, m (physics 11: 10–40 mm make no matter), and per wavelength. */
const LONGEST_PIECE_M = 0.02;

/** Edges of one part of the structure ("plane", or a cable's name) as radiating elements in site axes. */
export interface StructurePart {
  readonly via: string;
  readonly edges: readonly number[];
  readonly elements: ElementSet;
}

/** The board's planes and solved cables on their site, ready to be solved at any frequency. */
export class StructureModel {
  readonly mesh: Mesh;
  readonly lookup: SheetLookup;
  readonly parts: readonly StructurePart[];
  readonly #cables: readonly Cable[];
  #solver: StructureSolver | null = null;
  #solvedHz: number | null = null;

  /** `cables` are those without a stated current. Throws `input` when a cable finds no plane. */
  constructor(board: Board, frame: SiteFrame, site: SiteKind, cables: readonly Cable[], maxHz: number) {
    const layer = mainPlaneLayer(board);
    if (layer === null) {
      throw inputError(`cable ${cables[0]?.name ?? ''}`, 'joined to a copper plane', 'a board without planes');
    }
    const zM = (board.stackup[layer]!.zBottomM + board.stackup[layer]!.zTopM) / 2;
    const sheet = rasterizePlanes(board.planes, chooseGrid(board.planes, maxHz, board.structure.cellM), zM);
    const ground = groundOf(frame, site);
    const wires = cables.map((cable) => wireFromCable(cable, `cable ${cable.name}`, sheet, ground, LONGEST_PIECE_M));
    this.mesh = buildMesh(sheet, wires, ground);
    this.lookup = new SheetLookup(this.mesh);
    this.parts = partsOf(this.mesh, frame);
    this.#cables = cables;
  }

  /** The solver, factored at this frequency (once, when the same is asked for again). */
  solverAt(frequencyHz: number): StructureSolver {
    this.#solver ??= new StructureSolver(this.mesh);
    if (this.#solvedHz !== frequencyHz) {
      this.#solvedHz = null;
      this.#solver.setFrequency(frequencyHz, this.#seriesAt(frequencyHz));
      this.#solvedHz = frequencyHz;
    }
    return this.#solver;
  }

  #seriesAt(frequencyHz: number): SeriesImpedance[] {
    const series: SeriesImpedance[] = [];
    for (const [i, cable] of this.#cables.entries()) {
      const first = this.mesh.wireEdgeStart[i]!;
      const { re, im } = seriesImpedanceAt(cable, frequencyHz);
      if (re !== 0 || im !== 0) series.push({ edge: first, re, im });
      const { endOhm, pieces } = this.mesh.wires[i]!;
      if (endOhm > 0) series.push({ edge: first + pieces.length - 1, re: endOhm, im: 0 });
    }
    return series;
  }

  /** Currents of all edges (re, im pairs) as radiators, one for each part. */
  radiators(currentsA: Float64Array): Radiator[] {
    return this.parts.map(({ edges, elements }) => {
      const own = new Float64Array(2 * edges.length);
      for (const [i, edge] of edges.entries()) {
        own[2 * i] = currentsA[2 * edge]!;
        own[2 * i + 1] = currentsA[2 * edge + 1]!;
      }
      return { elements, currentsA: own };
    });
  }
}

/** Re, im pairs of the edges' currents. */
export function interleaved({ re, im }: EdgeCurrents): Float64Array {
  const out = new Float64Array(2 * re.length);
  for (let i = 0; i < re.length; i++) {
    out[2 * i] = re[i]!;
    out[2 * i + 1] = im[i]!;
  }
  return out;
}

/**
 * Impedance at a cable's connector, Ω: the resistance plus the table, linear over log frequency between its rows and held
 * at its ends.
 */
export function seriesImpedanceAt(
  { seriesOhm, seriesImpedance = [] }: Cable,
  frequencyHz: number,
): { re: number; im: number } {
  const next = seriesImpedance.findIndex((row) => row.frequencyHz >= frequencyHz);
  const high = seriesImpedance[next] ?? seriesImpedance.at(-1);
  if (!high) return { re: seriesOhm, im: 0 };
  const low = next > 0 ? seriesImpedance[next - 1]! : high;
  const part =
    low === high ? 0 : Math.log(frequencyHz / low.frequencyHz) / Math.log(high.frequencyHz / low.frequencyHz);
  return {
    re: seriesOhm + low.resistanceOhm + part * (high.resistanceOhm - low.resistanceOhm),
    im: low.reactanceOhm + part * (high.reactanceOhm - low.reactanceOhm),
  };
}

/** Copper layer with the largest plane area: the height at which the sheet lies. */
function mainPlaneLayer(board: Board): number | null {
  const areas = new Map<number, number>();
  for (const { layerIndex, ringM } of board.planes) {
    areas.set(layerIndex, (areas.get(layerIndex) ?? 0) + Math.abs(ringAreaM2(ringM)));
  }
  let best: number | null = null;
  for (const [layer, area] of areas) if (best === null || area > areas.get(best)!) best = layer;
  return best;
}

/** The site's ground in board axes. */
function groundOf({ orientation, lowestYM }: SiteFrame, site: SiteKind): GroundPlane | null {
  if (site === 'free-space') return null;
  return orientation === 'flat'
    ? { axis: 2, positionM: -TABLE_HEIGHT_M }
    : { axis: 1, positionM: lowestYM - TABLE_HEIGHT_M };
}

function partsOf(mesh: Mesh, frame: SiteFrame): StructurePart[] {
  const { xEdgeCount, yEdgeCount, wires, wireEdgeStart } = mesh;
  const range = (from: number, count: number) => Array.from({ length: count }, (_, i) => from + i);
  let link = xEdgeCount + yEdgeCount;
  const cables = wires.map(({ name, jointCells, pieces }, i) => {
    const edges = [...range(link, jointCells.length), ...range(wireEdgeStart[i]!, pieces.length)];
    link += jointCells.length;
    return { via: name, edges, elements: elementsOf(mesh, frame, edges) };
  });
  const plane = range(0, xEdgeCount + yEdgeCount);
  return [{ via: 'plane', edges: plane, elements: elementsOf(mesh, frame, plane) }, ...cables];
}

function elementsOf({ edgeCentreM, edgeVectorM }: Mesh, frame: SiteFrame, edges: readonly number[]): ElementSet {
  const collector = new ElementCollector();
  for (const e of edges) {
    collector.add(
      toSitePoint(frame, [edgeCentreM[3 * e]!, edgeCentreM[3 * e + 1]!, edgeCentreM[3 * e + 2]!]),
      toSiteVector(frame.orientation, [edgeVectorM[3 * e]!, edgeVectorM[3 * e + 1]!, edgeVectorM[3 * e + 2]!]),
    );
  }
  return collector.finish();
}
