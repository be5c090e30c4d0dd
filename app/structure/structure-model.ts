import type { Board, Cable, Point3M } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { ElementCollector, type ElementSet, type Radiator } from '../fields/element-set.ts';
import { ringAreaM2 } from '../geometry/polygon.ts';
import { type SiteFrame, type SiteKind, TABLE_HEIGHT_M, toSitePoint, toSiteVector } from '../site/site.ts';
import { chooseGrid } from './cell-grid.ts';
import { buildMesh, type Mesh } from './mesh.ts';
import { rasterizePlanes } from './sheet.ts';
import { SheetLookup } from './sheet-lookup.ts';
import { type EdgeCurrents, type SeriesImpedance, StructureSolver } from './structure-solver.ts';
import { type GroundPlane, type Wire, wireFromCable } from './wires.ts';

/** Longest wire piece, m (physics 11: 10–40 mm make no matter), and per wavelength. */
const LONGEST_PIECE_M = 0.02;

/** Edges as radiating elements in site axes. */
interface EdgeSet {
  readonly edges: readonly number[];
  readonly elements: ElementSet;
}

/** Edges of one part of the structure: "plane", or a cable's name. */
export interface StructurePart extends EdgeSet {
  readonly via: string;
}

/** The board's planes and solved cables on their site, ready to be solved at any frequency. */
export class StructureModel {
  readonly mesh: Mesh;
  readonly lookup: SheetLookup;
  readonly parts: readonly StructurePart[];
  /** All edges, cut for the scan: on and beside the board, then every straight stretch of the cables. */
  readonly #radiating: readonly EdgeSet[];
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
    this.#radiating = radiatingSets(this.mesh, frame);
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

  /** Elements on and beside the board: planes and what joins the cables to them. */
  get boardElements(): ElementSet {
    return this.#radiating[0]!.elements;
  }

  /** Currents of all edges (re, im pairs) as radiators: the board's elements, then straight stretches of the cables. */
  radiators(currentsA: Float64Array): Radiator[] {
    return this.#radiating.map(({ edges, elements }) => {
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

const range = (from: number, count: number) => Array.from({ length: count }, (_, i) => from + i);

function partsOf(mesh: Mesh, frame: SiteFrame): StructurePart[] {
  const { xEdgeCount, yEdgeCount, wires, wireEdgeStart } = mesh;
  let link = xEdgeCount + yEdgeCount;
  const cables = wires.map(({ name, jointCells, pieces }, i) => {
    const edges = [...range(link, jointCells.length), ...range(wireEdgeStart[i]!, pieces.length)];
    link += jointCells.length;
    return { via: name, ...edgeSet(mesh, frame, edges) };
  });
  return [{ via: 'plane', ...edgeSet(mesh, frame, range(0, xEdgeCount + yEdgeCount)) }, ...cables];
}

function radiatingSets(mesh: Mesh, frame: SiteFrame): EdgeSet[] {
  const { firstWireEdge, wires, wireEdgeStart } = mesh;
  const stretches = wires.flatMap((wire, i) =>
    straightStretches(wire).map(([from, count]) => edgeSet(mesh, frame, range(wireEdgeStart[i]! + from, count))),
  );
  return [edgeSet(mesh, frame, range(0, firstWireEdge)), ...stretches];
}

/** Pieces in line with each other, one after the other: first piece and number of each stretch. */
function straightStretches({ pieces }: Wire): [from: number, count: number][] {
  const out: [from: number, count: number][] = [];
  let before: Point3M | null = null;
  for (const [i, { filament }] of pieces.entries()) {
    const lengthM = Math.hypot(...[0, 1, 2].map((axis) => filament.to[axis]! - filament.from[axis]!));
    const along = (axis: 0 | 1 | 2) => (filament.to[axis] - filament.from[axis]) / lengthM;
    const direction: Point3M = [along(0), along(1), along(2)];
    if (before && direction.every((value, axis) => Math.abs(value - before![axis]!) < 1e-9)) out.at(-1)![1]++;
    else out.push([i, 1]);
    before = direction;
  }
  return out;
}

function edgeSet({ edgeCentreM, edgeVectorM }: Mesh, frame: SiteFrame, edges: readonly number[]): EdgeSet {
  const collector = new ElementCollector();
  for (const e of edges) {
    collector.add(
      toSitePoint(frame, [edgeCentreM[3 * e]!, edgeCentreM[3 * e + 1]!, edgeCentreM[3 * e + 2]!]),
      toSiteVector(frame.orientation, [edgeVectorM[3 * e]!, edgeVectorM[3 * e + 1]!, edgeVectorM[3 * e + 2]!]),
    );
  }
  return { edges, elements: collector.finish() };
}
