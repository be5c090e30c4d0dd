import type { Board, Net } from '../board/board.ts';
import { buildLoop, type LoopModel } from '../emitters/current-loop.ts';
import { buildNetModel, type NetModel } from '../emitters/net-model.ts';
import { buildStatedCable, type StatedCable } from '../emitters/stated-cable.ts';
import { StitchIndex } from '../emitters/transitions.ts';
import { inputError } from '../errors.ts';
import type { ElementSet } from '../fields/element-set.ts';
import { PlaneIndex } from '../returns/reference.ts';
import { type Box, boxOf } from '../site/moment-grid.ts';
import { boundaryRadiusM, type SiteRequest, scanRadiusM, siteFrame } from '../site/site.ts';
import { StructureModel } from '../structure/structure-model.ts';

/** Planes and cables are solved up to here; above, trace pairs only (physics 11, range). */
export const SOLVED_TO_HZ = 1e9;

/** Everything that can radiate, placed on the site, ready for any frequency up to `maxHz`. */
export interface Scene {
  readonly board: Board;
  readonly site: SiteRequest;
  readonly boundaryRadiusM: number;
  readonly scanRadiusM: number;
  readonly nets: ReadonlyMap<string, NetModel>;
  readonly loops: ReadonlyMap<string, LoopModel>;
  readonly cables: readonly StatedCable[];
  /** Planes and cables to be solved; null: trace pairs only. */
  readonly structure: StructureModel | null;
  /** Box of nets and loops in site axes: gathered on one grid for the scan. */
  readonly box: Box | null;
}

export function buildScene(board: Board, site: SiteRequest, maxHz: number, mode: 'solved' | 'pair-only'): Scene {
  const frame = siteFrame(board, site.orientation);
  const open = board.cables.filter((cable) => cable.commonModeRms === undefined);
  const structure =
    mode === 'solved' && board.planes.length + open.length > 0
      ? new StructureModel(board, frame, site.kind, open, Math.min(maxHz, SOLVED_TO_HZ))
      : null;
  const context = { board, frame, planes: new PlaneIndex(board), stitches: new StitchIndex(board), structure, maxHz };
  const nets = new Map<string, NetModel>();
  for (const net of drivenNets(board)) nets.set(net.name, buildNetModel(context, net));
  const loops = new Map(board.loops.map((loop) => [loop.name, buildLoop(loop, frame, maxHz, structure)]));
  const cables = board.cables
    .filter((cable) => cable.commonModeRms !== undefined)
    .map((cable) => buildStatedCable(cable, frame, site.kind, maxHz));
  const radiusM = boundaryRadiusM(board, frame, board.cables);
  const antennaM = scanRadiusM(site, radiusM);
  if (antennaM <= radiusM) {
    throw inputError('distance', `more than the board's and cables' own radius of ${radiusM.toFixed(2)} m`, antennaM);
  }
  const named: (readonly [path: string, elements: ElementSet])[] = [
    ...[...nets.values()].map(({ name, pair }) => [`net ${name}`, pair.elements] as const),
    ...[...loops.values()].map(({ name, elements }) => [`loop ${name}`, elements] as const),
  ];
  for (const [path, elements] of named) requireOnSite(path, elements, site, antennaM);
  const boardElements = [...named.map(([, elements]) => elements), ...(structure ? [structure.boardElements] : [])];
  return {
    board,
    site,
    boundaryRadiusM: radiusM,
    scanRadiusM: antennaM,
    nets,
    loops,
    cables,
    structure,
    box: boxOf(boardElements.map((elements) => ({ elements, currentsA: new Float64Array(0) }))),
  };
}

/** Nets that are modelled: driven and drawn. A driven net without a trace radiates nothing by itself. */
export function drivenNets(board: Board): Net[] {
  const driven = new Set(board.drives.map(({ net }) => net));
  return board.nets.filter(({ name, traces }) => traces.length > 0 && driven.has(name));
}

/** Throws `input` for a source under the ground plane, or as far from the turntable's axis as the antenna. */
function requireOnSite(path: string, { positionsM }: ElementSet, { kind }: SiteRequest, antennaM: number): void {
  let lowestM = Infinity;
  let farthestM = 0;
  for (let i = 0; i < positionsM.length; i += 3) {
    lowestM = Math.min(lowestM, positionsM[i + 2]!);
    farthestM = Math.max(farthestM, Math.hypot(positionsM[i]!, positionsM[i + 1]!));
  }
  if (kind === 'ground-plane' && lowestM < 0) {
    throw inputError(path, 'above the ground plane', `a place ${(-lowestM * 1e3).toFixed(1)} mm below it`);
  }
  if (farthestM >= antennaM) {
    const must = `within ${antennaM.toFixed(2)} m of the turntable axis, where the antenna stands`;
    throw inputError(path, must, `${farthestM.toFixed(2)} m`);
  }
}
