import { solveDense } from './dense-solve.ts';

/** What the ends of the wire meet: nothing; a straight piece to the plane, its lower half at 0 V, its upper at the wire's voltage. */
export type WireEnds = 'open' | 'terminal';

/**
 * Electric moment (over ε0, per volt) of a round wire of radius 1/ratio, 30 long, at height 1 over a plane: charges constant
 * on segments, potentials on the wires' surfaces, the plane by images. `endM`: what it exceeds the moment of the line by, for one
 * end, as a length of line in heights (C'/ε0 = 2π/acosh(h/a)).
 */
export function chargedWire(ratio: number, ends: WireEnds): { endM: number } {
  const a = 1 / ratio;
  const lengthM = 30;
  const endPieces = Math.max(4, Math.min(20, Math.floor(ratio / 3)));
  const cuts = [0];
  for (let step = 1 / endPieces; cuts.at(-1)! < lengthM / 2; step = Math.min(0.7, step * 1.12)) {
    cuts.push(cuts.at(-1)! + step);
  }
  const scale = lengthM / 2 / cuts.at(-1)!;
  const pieces: { x: number; z: number; alongX: boolean; l: number; v: number }[] = [];
  for (let i = 1; i < cuts.length; i++) {
    const middle = (scale * (cuts[i - 1]! + cuts[i]!)) / 2;
    const l = scale * (cuts[i]! - cuts[i - 1]!);
    for (const x of [middle, lengthM - middle]) pieces.push({ x, z: 1, alongX: true, l, v: 1 });
  }
  const upright = ends === 'open' ? 0 : 2 * Math.ceil(endPieces / 2);
  for (let i = 0; i < upright; i++) {
    const z = (i + 0.5) / upright;
    for (const x of [0, lengthM]) pieces.push({ x, z, alongX: false, l: 1 / upright, v: z > 0.5 ? 1 : 0 });
  }
  const n = pieces.length;
  const matrix = new Float64Array(n * n);
  for (const [i, target] of pieces.entries()) {
    for (const [j, source] of pieces.entries()) {
      for (const sign of [1, -1]) {
        const dx = target.x - source.x;
        const dz = target.z - sign * source.z;
        const along = source.alongX ? dx : dz * sign;
        const rho = Math.sqrt(Math.max(0, dx * dx + dz * dz - along * along) + a * a);
        const mean = (Math.asinh((along + source.l / 2) / rho) - Math.asinh((along - source.l / 2) / rho)) / source.l;
        matrix[i * n + j]! += (sign * mean) / (4 * Math.PI);
      }
    }
  }
  const charges = Float64Array.from(pieces, ({ v }) => v);
  solveDense(matrix, charges);
  const moment = pieces.reduce((sum, { z }, i) => sum + charges[i]! * z, 0);
  return { endM: ((moment * Math.acosh(ratio)) / (2 * Math.PI) - lengthM) / 2 };
}
