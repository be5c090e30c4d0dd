import type { Cable, Point3M } from '../board/board.ts';
import { inputError } from '../errors.ts';
import type { Filament } from './filament-kernel.ts';
import { cellCentreXM, cellCentreYM, type Sheet } from './sheet.ts';

/** A conducting plane perpendicular to a board axis: 1 = y (board upright), 2 = z (board flat), at that coordinate. */
export interface GroundPlane {
  readonly axis: 1 | 2;
  readonly positionM: number;
}

/** Charge lies on one or two straight halves of pieces, evenly along them. */
export interface WireNode {
  readonly halves: readonly Filament[];
  /** Point that stands for the node in the retarded part of the kernel. */
  readonly centreM: Point3M;
}

/** Current flows along one straight piece, from one node to the next. */
export interface WirePiece {
  readonly filament: Filament;
  /** Index into the wire's nodes; the last piece of a grounded wire ends on no node (−1): the ground has no potential. */
  readonly fromNode: number;
  readonly toNode: number;
}

/** A cable as a thin wire joined to the sheet. Node 0 is the joint. */
export interface Wire {
  readonly name: string;
  readonly radiusM: number;
  readonly nodes: readonly WireNode[];
  readonly pieces: readonly WirePiece[];
  /** Cells linked to node 0 without impedance. */
  readonly jointCells: readonly number[];
  readonly jointM: Point3M;
  /** Resistance at the far end, in series with the last piece; 0 for open and for grounded ends. */
  readonly endOhm: number;
}

/** Largest distance (in cells) from the joint to a cell it is linked to. */
const JOINT_REACH_CELLS = 0.75;
/** Largest distance (in cells) at which a cable still finds its cell. */
const JOINT_SEARCH_CELLS = 2;
const GROUND_TOLERANCE_M = 1e-3;
/** Growth of the pieces away from the joint. */
const GROWTH = 1.4;

/**
 * Cuts a cable into pieces: about one cell long at the joint, growing to `longestM`, corners kept.
 *
 * The first point is brought to the sheet's height. Throws `input` when no cell lies within two cells of it, when a piece has no
 * length, or when an end that is meant for the ground does not reach it.
 */
export function wireFromCable(
  cable: Cable,
  path: string,
  sheet: Sheet,
  ground: GroundPlane | null,
  longestM: number,
): Wire {
  const corners = [...cable.pointsM];
  const first = corners[0]!;
  const jointM: Point3M = [first[0], first[1], sheet.zM];
  corners[0] = jointM;
  const isEndBound = cable.farEnd !== 'open';
  if (isEndBound) corners[corners.length - 1] = groundedEnd(corners.at(-1)!, `${path}.pointsM`, ground);
  const points = cutPolyline(corners, `${path}.pointsM`, sheet.grid.cellM, longestM);
  const nodes: WireNode[] = [];
  const pieces: WirePiece[] = [];
  const last = points.length - 1;
  for (let i = 0; i <= last; i++) {
    if (i < last) {
      const toNode = isEndBound && i === last - 1 ? -1 : i + 1;
      pieces.push({ filament: { from: points[i]!, to: points[i + 1]! }, fromNode: i, toNode });
    }
    if (i === last && isEndBound) continue;
    const before = i > 0 ? midpoint(points[i - 1]!, points[i]!) : points[i]!;
    const after = i < last ? midpoint(points[i]!, points[i + 1]!) : points[i]!;
    nodes.push(wireNode(before, points[i]!, after));
  }
  return {
    name: cable.name,
    radiusM: cable.radiusM,
    nodes,
    pieces,
    jointCells: jointCells(jointM, `${path}.pointsM[0]`, sheet),
    jointM,
    endOhm: typeof cable.farEnd === 'object' ? cable.farEnd.resistanceOhm : 0,
  };
}

function groundedEnd(end: Point3M, path: string, ground: GroundPlane | null): Point3M {
  if (ground === null) throw inputError(path, 'open at the far end on a site without ground plane', 'a grounded end');
  const offM = end[ground.axis] - ground.positionM;
  if (Math.abs(offM) > GROUND_TOLERANCE_M) {
    throw inputError(path, 'within 1 mm of the ground plane at the last point', `${offM} m above it`);
  }
  return ground.axis === 1 ? [end[0], ground.positionM, end[2]] : [end[0], end[1], ground.positionM];
}

/** Points of the pieces, corners included. */
function cutPolyline(corners: readonly Point3M[], path: string, firstM: number, longestM: number): Point3M[] {
  const points: Point3M[] = [corners[0]!];
  let targetM = Math.min(firstM, longestM);
  for (let c = 1; c < corners.length; c++) {
    const from = corners[c - 1]!;
    const to = corners[c]!;
    const lengthM = Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);
    if (!(lengthM > 0)) throw inputError(`${path}[${c}]`, 'apart from the point before it', 'the same point');
    const ends: number[] = [];
    let atM = 0;
    while (atM < lengthM * (1 - 1e-9)) {
      atM += targetM;
      ends.push(atM);
      targetM = Math.min(longestM, targetM * GROWTH);
    }
    for (const endM of ends) points.push(lerp(from, to, endM / atM));
  }
  return points;
}

const lerp = (a: Point3M, b: Point3M, t: number): Point3M => [
  a[0] + t * (b[0] - a[0]),
  a[1] + t * (b[1] - a[1]),
  a[2] + t * (b[2] - a[2]),
];
const midpoint = (a: Point3M, b: Point3M): Point3M => lerp(a, b, 0.5);

/** Halves on both sides of a point; one filament when they are in line or one of them is empty. */
function wireNode(before: Point3M, at: Point3M, after: Point3M): WireNode {
  const u = [at[0] - before[0], at[1] - before[1], at[2] - before[2]] as const;
  const v = [after[0] - at[0], after[1] - at[1], after[2] - at[2]] as const;
  const lengthU = Math.hypot(...u);
  const lengthV = Math.hypot(...v);
  const dot = u[0] * v[0] + u[1] * v[1] + u[2] * v[2];
  if (lengthU === 0 || lengthV === 0 || dot >= (1 - 1e-12) * lengthU * lengthV) {
    return { halves: [{ from: before, to: after }], centreM: midpoint(before, after) };
  }
  return {
    halves: [
      { from: before, to: at },
      { from: at, to: after },
    ],
    centreM: at,
  };
}

function jointCells([xM, yM]: Point3M, path: string, sheet: Sheet): number[] {
  const { cellM } = sheet.grid;
  const within: number[] = [];
  let nearest = -1;
  let nearestM = JOINT_SEARCH_CELLS * cellM * (1 + 1e-9);
  for (let cell = 0; cell < sheet.cellCount; cell++) {
    const awayM = Math.hypot(cellCentreXM(sheet, cell) - xM, cellCentreYM(sheet, cell) - yM);
    if (awayM <= JOINT_REACH_CELLS * cellM) within.push(cell);
    if (awayM < nearestM - 1e-9 * cellM) {
      nearest = cell;
      nearestM = awayM;
    }
  }
  if (within.length > 0) return within;
  if (nearest < 0) throw inputError(path, 'within two cells of a copper plane', `(${xM} m, ${yM} m)`);
  return [nearest];
}
