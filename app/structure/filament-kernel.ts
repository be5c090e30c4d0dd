import { gaussLegendre } from '../fields/quadrature.ts';
import { meanInverseToSquare } from './square-kernel.ts';

const RULE = gaussLegendre(8);

/** A straight thin piece: ends (m), board axes. */
export interface Filament {
  readonly from: readonly [number, number, number];
  readonly to: readonly [number, number, number];
}

/** Mean of 1/√(R² + offset²) from a point to a straight piece, 1/m. */
export function meanInverseToFilament(
  px: number,
  py: number,
  pz: number,
  { from, to }: Filament,
  offset2: number,
): number {
  const ex = to[0] - from[0];
  const ey = to[1] - from[1];
  const ez = to[2] - from[2];
  const length = Math.sqrt(ex * ex + ey * ey + ez * ez);
  const wx = px - from[0];
  const wy = py - from[1];
  const wz = pz - from[2];
  const along = (wx * ex + wy * ey + wz * ez) / length;
  const rho = Math.sqrt(Math.max(0, wx * wx + wy * wy + wz * wz - along * along) + offset2);
  if (rho === 0) return Math.abs(Math.log(Math.abs(along / (along - length)))) / length;
  return (Math.asinh(along / rho) - Math.asinh((along - length) / rho)) / length;
}

/**
 * Mean of 1/√(R² + offset²) over two straight thin pieces, 1/m; `offset2` is the square of the wire radius (thin-wire
 * kernel: one current on the axis, the other on the surface). Parallel pieces in closed form (F. W. Grover, Inductance
 * Calculations, chapter 5, parallel filaments), others by Gauss–Legendre over the closed form of one line.
 */
export function meanInverseOfFilaments(a: Filament, b: Filament, offset2: number): number {
  const ax = a.to[0] - a.from[0];
  const ay = a.to[1] - a.from[1];
  const az = a.to[2] - a.from[2];
  const bx = b.to[0] - b.from[0];
  const by = b.to[1] - b.from[1];
  const bz = b.to[2] - b.from[2];
  const lengthA = Math.sqrt(ax * ax + ay * ay + az * az);
  const lengthB = Math.sqrt(bx * bx + by * by + bz * bz);
  const cosine = (ax * bx + ay * by + az * bz) / (lengthA * lengthB);
  if (Math.abs(cosine) < 1 - 1e-10) return skewFilaments(a, b, lengthB, offset2);
  const wx = b.from[0] - a.from[0];
  const wy = b.from[1] - a.from[1];
  const wz = b.from[2] - a.from[2];
  const start = (wx * ax + wy * ay + wz * az) / lengthA;
  const rho2 = Math.max(0, wx * wx + wy * wy + wz * wz - start * start) + offset2;
  const end = start + lengthB * Math.sign(cosine);
  const sum =
    lineIntegral(end, rho2) -
    lineIntegral(start, rho2) -
    lineIntegral(end - lengthA, rho2) +
    lineIntegral(start - lengthA, rho2);
  return Math.abs(sum) / (lengthA * lengthB);
}

/** Twice integrated 1/√(z² + ρ²). */
function lineIntegral(z: number, rho2: number): number {
  const root = Math.sqrt(z * z + rho2);
  return (rho2 === 0 ? z * Math.sign(z) * Math.log(Math.abs(z) + 1e-300) : z * Math.asinh(z / Math.sqrt(rho2))) - root;
}

function skewFilaments(a: Filament, b: Filament, lengthB: number, offset2: number): number {
  const lengthA = Math.hypot(a.to[0] - a.from[0], a.to[1] - a.from[1], a.to[2] - a.from[2]);
  // The potential of a line varies over its own distance: pieces of half of it, four points each, hold 1e-4 near a bend.
  const parts = Math.max(1, Math.min(8, Math.ceil((2 * lengthB) / lengthA)));
  let sum = 0;
  for (let part = 0; part < parts; part++) {
    for (let g = 0; g < RULE.nodes.length; g++) {
      const t = (part + RULE.nodes[g]!) / parts;
      const x = b.from[0] + t * (b.to[0] - b.from[0]);
      const y = b.from[1] + t * (b.to[1] - b.from[1]);
      const z = b.from[2] + t * (b.to[2] - b.from[2]);
      sum += RULE.weights[g]! * meanInverseToFilament(x, y, z, a, offset2);
    }
  }
  return sum / parts;
}

/**
 * Mean of 1/√(R² + offset²) over a square (side a, centre at `centre`, in a plane z = const) and a thin piece, 1/m:
 * Gauss–Legendre along the piece over the closed form of the square.
 */
export function meanInverseOfSquareAndFilament(
  centre: readonly [number, number, number],
  a: number,
  piece: Filament,
  offset2: number,
): number {
  const { from, to } = piece;
  const lx = to[0] - from[0];
  const ly = to[1] - from[1];
  const lz = to[2] - from[2];
  const length = Math.sqrt(lx * lx + ly * ly + lz * lz);
  const mx = (from[0] + to[0]) / 2 - centre[0];
  const my = (from[1] + to[1]) / 2 - centre[1];
  const mz = (from[2] + to[2]) / 2 - centre[2];
  const distance2 = mx * mx + my * my + mz * mz;
  const near = 3 * a + 0.6 * length;
  if (distance2 > near * near) return farSquareAndFilament(centre, piece, offset2, a);
  const parts = Math.max(1, Math.ceil(length / (0.75 * a)));
  let sum = 0;
  for (let part = 0; part < parts; part++) {
    for (let g = 0; g < RULE.nodes.length; g++) {
      const t = (part + RULE.nodes[g]!) / parts;
      const z = from[2] + t * lz - centre[2];
      const height = Math.sqrt(z * z + offset2);
      sum +=
        RULE.weights[g]! * meanInverseToSquare(from[0] + t * lx - centre[0], from[1] + t * ly - centre[1], height, a);
    }
  }
  return sum / parts;
}

/** Far apart: the line's closed form at the four Gauss points of the square. */
function farSquareAndFilament(
  centre: readonly [number, number, number],
  piece: Filament,
  offset2: number,
  a: number,
): number {
  const d = a / Math.sqrt(12);
  return (
    (meanInverseToFilament(centre[0] - d, centre[1] - d, centre[2], piece, offset2) +
      meanInverseToFilament(centre[0] + d, centre[1] - d, centre[2], piece, offset2) +
      meanInverseToFilament(centre[0] - d, centre[1] + d, centre[2], piece, offset2) +
      meanInverseToFilament(centre[0] + d, centre[1] + d, centre[2], piece, offset2)) /
    4
  );
}
