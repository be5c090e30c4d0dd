import type { Board, Cable, Point3M } from '../board/board.ts';

export type SiteKind = 'ground-plane' | 'free-space';
export type Orientation = 'flat' | 'upright';

/** Height of the table top over the ground plane, m (CISPR 16-2-3 / ANSI C63.4: 0.8 m, non-conducting). */
export const TABLE_HEIGHT_M = 0.8;
/** Antenna travel, m (30–1000 MHz at 3 m and 10 m). */
export const ANTENNA_LOWEST_M = 1;
export const ANTENNA_HIGHEST_M = 4;

export interface SiteRequest {
  readonly kind: SiteKind;
  readonly distanceM: number;
  readonly measuredFrom: 'boundary' | 'center';
  readonly orientation: Orientation;
}

/**
 * Where the board stands. Site axes: z up, z = 0 the ground plane, the turntable axis at x = y = 0, azimuth
 * counter-clockwise from the board's +x seen from above.
 */
export interface SiteFrame {
  readonly orientation: Orientation;
  /** Board point that lies on the turntable axis: centre of the outline's bounding box. */
  readonly centreXM: number;
  readonly centreYM: number;
  /** Board z that lies on the turntable axis when upright: half the board's thickness. */
  readonly centreZM: number;
  /** Lowest y of the outline: on the table when upright. */
  readonly lowestYM: number;
}

export function siteFrame(board: Board, orientation: Orientation): SiteFrame {
  let lowX = Infinity;
  let highX = -Infinity;
  let lowY = Infinity;
  let highY = -Infinity;
  for (const ring of board.outlineM) {
    for (const [xM, yM] of ring) {
      lowX = Math.min(lowX, xM);
      highX = Math.max(highX, xM);
      lowY = Math.min(lowY, yM);
      highY = Math.max(highY, yM);
    }
  }
  return {
    orientation,
    centreXM: (lowX + highX) / 2,
    centreYM: (lowY + highY) / 2,
    centreZM: (board.stackup[0]?.zTopM ?? 0) / 2,
    lowestYM: lowY,
  };
}

/** Board axes → site axes. Flat: underside at the table height. Upright: −y edge down on the table, +x horizontal. */
export function toSitePoint(frame: SiteFrame, [xM, yM, zM]: Point3M): Point3M {
  if (frame.orientation === 'flat') return [xM - frame.centreXM, yM - frame.centreYM, zM + TABLE_HEIGHT_M];
  return [xM - frame.centreXM, frame.centreZM - zM, yM - frame.lowestYM + TABLE_HEIGHT_M];
}

/** Direction in board axes → site axes (the rotation of `toSitePoint`). */
export function toSiteVector(orientation: Orientation, [x, y, z]: Point3M): Point3M {
  return orientation === 'flat' ? [x, y, z] : [x, -z, y];
}

/** Radius of the smallest circle about the turntable axis that encloses outline and cables, m. */
export function boundaryRadiusM(board: Board, frame: SiteFrame, cables: readonly Cable[]): number {
  let radiusM = 0;
  const include = (pointM: Point3M) => {
    const [xM, yM] = toSitePoint(frame, pointM);
    radiusM = Math.max(radiusM, Math.hypot(xM, yM));
  };
  const topM = board.stackup[0]?.zTopM ?? 0;
  for (const ring of board.outlineM) {
    for (const [xM, yM] of ring) {
      include([xM, yM, 0]);
      include([xM, yM, topM]);
    }
  }
  for (const cable of cables) for (const pointM of cable.pointsM) include(pointM);
  return radiusM;
}

/** Radius of the antenna's cylinder about the turntable axis, m. */
export function scanRadiusM(request: SiteRequest, boundaryM: number): number {
  return request.measuredFrom === 'boundary' ? request.distanceM + boundaryM : request.distanceM;
}

/** Site axes → board axes: the inverse of `toSitePoint`. */
export function toBoardPoint(frame: SiteFrame, [xM, yM, zM]: Point3M): Point3M {
  if (frame.orientation === 'flat') return [xM + frame.centreXM, yM + frame.centreYM, zM - TABLE_HEIGHT_M];
  return [xM + frame.centreXM, zM + frame.lowestYM - TABLE_HEIGHT_M, frame.centreZM - yM];
}
