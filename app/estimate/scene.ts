import type { Board } from '../board/board.ts';
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
  for (const net of board.nets) {
    if (board.drives.some((drive) => drive.net === net.name)) nets.set(net.name, buildNetModel(context, net));
  }
  const loops = new Map(board.loops.map((loop) => [loop.name, buildLoop(loop, frame, maxHz, structure)]));
  const cables = board.cables
    .filter((cable) => cable.commonModeRms !== undefined)
    .map((cable) => buildStatedCable(cable, frame, site.kind, maxHz));
  const radiusM = boundaryRadiusM(board, frame, board.cables);
  const antennaM = scanRadiusM(site, radiusM);
  if (antennaM <= radiusM) {
    throw inputError('distance', `more than the board's and cables' own radius of ${radiusM.toFixed(2)} m`, antennaM);
  }
  const boardElements: ElementSet[] = [
    ...[...nets.values()].map(({ pair }) => pair.elements),
    ...[...loops.values()].map(({ elements }) => elements),
    ...(structure ? [structure.parts[0]!.elements] : []),
  ];
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
