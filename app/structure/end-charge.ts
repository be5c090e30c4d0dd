import type { LineWave } from './line-wave.ts';
import { type PairPiece, pieceLengthM } from './pair-piece.ts';

export type PieceEnd = 'start' | 'end';

/** Places on a piece closer than this part of its length are one. */
const SAME_PART = 1e-9;

/** Length of line whose charge the end holds besides the line's own, m. */
export const extraM = ({ endsM }: PairPiece, end: PieceEnd): number => endsM?.[end === 'start' ? 0 : 1] ?? 0;

/** Does an arc length of a piece (m from its start) lie at its end? */
export function isAtEnd(piece: PairPiece, atM: number, end: PieceEnd): boolean {
  const lengthM = pieceLengthM(piece);
  return Math.abs(atM - (end === 'start' ? 0 : lengthM)) < SAME_PART * lengthM;
}

/**
 * Charge that a piece's end holds besides the line's own (C): re, im into `out`. It is that of Δl = `extraM` of line,
 *   q = −(1/jω)(dI/ds) Δl/ε_r,   dI/ds = γ(I⁻e^(γs) − I⁺e^(−γs)) at the end.
 */
export function endCharge(piece: PairPiece, wave: LineWave, omega: number, end: PieceEnd, out: Float64Array): void {
  const sM = end === 'start' ? 0 : pieceLengthM(piece);
  const { gammaRePerM, gammaImPerM, forwardReA, forwardImA, backwardReA, backwardImA } = wave;
  const decay = Math.exp(-gammaRePerM * sM);
  const cos = Math.cos(gammaImPerM * sM);
  const sin = Math.sin(gammaImPerM * sM);
  const differenceRe = (backwardReA * cos - backwardImA * sin) / decay - decay * (forwardReA * cos + forwardImA * sin);
  const differenceIm = (backwardImA * cos + backwardReA * sin) / decay - decay * (forwardImA * cos - forwardReA * sin);
  const slopeRe = gammaRePerM * differenceRe - gammaImPerM * differenceIm;
  const slopeIm = gammaRePerM * differenceIm + gammaImPerM * differenceRe;
  // −1/(jω) = j/ω
  const scale = extraM(piece, end) / (omega * piece.epsilonR);
  out[0] = -scale * slopeIm;
  out[1] = scale * slopeRe;
}
