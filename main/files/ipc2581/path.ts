import { type Affine, isMirrored } from './affine.ts';

/** x, y in millimetres. */
export type PointMm = [xMm: number, yMm: number];

/**
 * A line of straight and curved pieces, five numbers each: x and y of its end, x and y of the arc's centre, and the
 * turn (0 straight, +1 counter-clockwise, −1 clockwise). The first five are the start. One flat array, because a board
 * of 60 MB holds nearly a million pieces.
 */
export type Path = number[];
const STRIDE = 5;

/** Radii at both ends of an arc may differ by rounding; beyond this it is worth a word. */
export const RADIUS_MISMATCH_MM = 0.05;
/** Finest division of a full circle: 1 µm holds up to a radius of 2.6 m. */
const MOST_CHORDS = 3600;

export const beginPath = (xMm: number, yMm: number): Path => [xMm, yMm, 0, 0, 0];

export const addSegment = (path: Path, xMm: number, yMm: number): void => {
  path.push(xMm, yMm, 0, 0, 0);
};

export const addCurve = (
  path: Path,
  xMm: number,
  yMm: number,
  cxMm: number,
  cyMm: number,
  clockwise: boolean,
): void => {
  path.push(xMm, yMm, cxMm, cyMm, clockwise ? -1 : 1);
};

/** Number of straight and of curved pieces. */
export function countPieces(path: Path): { segments: number; arcs: number } {
  let arcs = 0;
  for (let i = STRIDE; i < path.length; i += STRIDE) if (path[i + 4] !== 0) arcs++;
  return { segments: path.length / STRIDE - 1 - arcs, arcs };
}

export function transformPath(path: Path, m: Affine): Path {
  const flip = isMirrored(m) ? -1 : 1;
  const out: Path = [];
  for (let i = 0; i < path.length; i += STRIDE) {
    const [x, y, cx, cy] = [path[i]!, path[i + 1]!, path[i + 2]!, path[i + 3]!];
    out.push(m.a * x + m.c * y + m.e, m.b * x + m.d * y + m.f);
    out.push(m.a * cx + m.c * cy + m.e, m.b * cx + m.d * cy + m.f, path[i + 4]! * flip);
  }
  return out;
}

interface Arc {
  readonly startRad: number;
  /** Signed: positive counter-clockwise. */
  readonly sweepRad: number;
  readonly startRadiusMm: number;
  readonly endRadiusMm: number;
}

/** The arc that ends the piece at `i`; equal ends mean a full circle. */
function arcAt(path: Path, i: number): Arc {
  const [x0, y0, x1, y1] = [path[i - STRIDE]!, path[i - STRIDE + 1]!, path[i]!, path[i + 1]!];
  const [cx, cy, turn] = [path[i + 2]!, path[i + 3]!, path[i + 4]!];
  const startRad = Math.atan2(y0 - cy, x0 - cx);
  const full = 2 * Math.PI;
  let sweepRad = full;
  if (Math.hypot(x1 - x0, y1 - y0) > 1e-9) {
    sweepRad = (turn * (Math.atan2(y1 - cy, x1 - cx) - startRad)) % full;
    if (sweepRad < 0) sweepRad += full;
  }
  return {
    startRad,
    sweepRad: turn * sweepRad,
    startRadiusMm: Math.hypot(x0 - cx, y0 - cy),
    endRadiusMm: Math.hypot(x1 - cx, y1 - cy),
  };
}

/** Length along the true arcs (radius: the mean of both ends), not along chords. */
export function pathLengthMm(path: Path): number {
  let lengthMm = 0;
  for (let i = STRIDE; i < path.length; i += STRIDE) {
    if (path[i + 4] === 0) {
      lengthMm += Math.hypot(path[i]! - path[i - STRIDE]!, path[i + 1]! - path[i - STRIDE + 1]!);
    } else {
      const arc = arcAt(path, i);
      lengthMm += (Math.abs(arc.sweepRad) * (arc.startRadiusMm + arc.endRadiusMm)) / 2;
    }
  }
  return lengthMm;
}

/** Number of arcs whose centre does not fit both ends. */
export function countRadiusMismatches(path: Path): number {
  let count = 0;
  for (let i = STRIDE; i < path.length; i += STRIDE) {
    if (path[i + 4] === 0) continue;
    const arc = arcAt(path, i);
    if (Math.abs(arc.startRadiusMm - arc.endRadiusMm) > RADIUS_MISMATCH_MM) count++;
  }
  return count;
}

/** The given vertices, without the points between on arcs. */
export function pathVertices(path: Path): PointMm[] {
  const points: PointMm[] = [];
  for (let i = 0; i < path.length; i += STRIDE) points.push([path[i]!, path[i + 1]!]);
  return points;
}

/**
 * The path as a polyline. A chord of angle δ lies r(1 − cos δ/2) inside its arc, so arcs are divided until that is at
 * most `toleranceMm`; the radius goes linearly from one end to the other, so both ends are kept exactly.
 */
export function flattenPath(path: Path, toleranceMm: number): PointMm[] {
  const points: PointMm[] = [[path[0]!, path[1]!]];
  for (let i = STRIDE; i < path.length; i += STRIDE) {
    if (path[i + 4] !== 0) {
      const arc = arcAt(path, i);
      const chords = chordCount(arc, toleranceMm);
      for (let k = 1; k < chords; k++) {
        const angleRad = arc.startRad + (arc.sweepRad * k) / chords;
        const radiusMm = arc.startRadiusMm + ((arc.endRadiusMm - arc.startRadiusMm) * k) / chords;
        points.push([path[i + 2]! + radiusMm * Math.cos(angleRad), path[i + 3]! + radiusMm * Math.sin(angleRad)]);
      }
    }
    points.push([path[i]!, path[i + 1]!]);
  }
  return points;
}

function chordCount(arc: Arc, toleranceMm: number): number {
  const radiusMm = Math.max(arc.startRadiusMm, arc.endRadiusMm);
  if (radiusMm === 0) return 1;
  const widestRad = toleranceMm >= radiusMm ? Math.PI / 2 : 2 * Math.acos(1 - toleranceMm / radiusMm);
  const most = Math.ceil((MOST_CHORDS * Math.abs(arc.sweepRad)) / (2 * Math.PI));
  return Math.max(1, Math.min(most, Math.ceil(Math.abs(arc.sweepRad) / widestRad)));
}
