import type { PointM } from '../board/board.ts';
import { inputError } from '../errors.ts';

/**
 * A straight trace piece over the sheet with its return under it: the pair. Board axes, m.
 * Its current is a `LineWave` from `fromM` to `toM` in the trace; the return carries the opposite at the sheet's height.
 */
export interface PairPiece {
  readonly fromM: PointM;
  readonly toM: PointM;
  /** Distance between trace and sheet (the dielectric's thickness), m, > 0. */
  readonly heightM: number;
  /** +1: the trace lies above the sheet (towards +z), −1: below. */
  readonly side: 1 | -1;
  /** Relative permittivity between trace and sheet: what is left of the trace's charge is C'V/ε_r. */
  readonly epsilonR: number;
  /** Lengths of line whose charge start and end hold besides the line's own (fringe, a terminal's straight piece), m. */
  readonly endsM?: readonly [number, number];
}

export const pieceLengthM = ({ fromM, toM }: PairPiece): number => Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1]);

export function checkPiece(piece: PairPiece, path: string): void {
  if (!(piece.heightM > 0)) throw inputError(`${path}.heightM`, 'above 0', piece.heightM);
  if (!(piece.epsilonR >= 1)) throw inputError(`${path}.epsilonR`, 'at least 1', piece.epsilonR);
  if (!(pieceLengthM(piece) > 0)) throw inputError(path, 'a piece of some length', 'two equal ends');
}
