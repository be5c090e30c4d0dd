import type { Point3M } from '../board/board.ts';
import { endCharge, isAtEnd } from './end-charge.ts';
import type { Filament } from './filament-kernel.ts';
import { currentAt, currentIntegral, type LineWave } from './line-wave.ts';
import { type PairPiece, pieceLengthM } from './pair-piece.ts';
import type { ReturnGap } from './return-gaps.ts';

/**
 * The pair of one net as thin filaments in space: trace, return (but for gaps), the ends' vertical elements and the
 * polarisation current of the dielectric. Its currents: `pairFilamentSources`.
 */
export interface PairFilament {
  readonly piece: number;
  /** What part of the piece's current it carries (see `addSource`). */
  readonly kind: 'trace' | 'return' | 'start' | 'end' | 'polarization';
  readonly filament: Filament;
  /** Stretch of the piece, m. */
  readonly fromM: number;
  readonly toM: number;
  /** A stretch without return filament. */
  readonly isOverGap: boolean;
}

/** Cuts the pieces into filaments no longer than `longestM`, at the sheet's height `sheetZM` and the trace's. */
export function pairFilaments(
  pieces: readonly PairPiece[],
  gaps: readonly ReturnGap[],
  sheetZM: number,
  longestM: number,
): PairFilament[] {
  return pieces.flatMap((piece, index) => {
    const own = gaps.filter((gap) => gap.piece === index);
    const lengthM = pieceLengthM(piece);
    const traceZM = sheetZM + piece.side * piece.heightM;
    const at = (sM: number, zM: number): Point3M => [
      piece.fromM[0] + ((piece.toM[0] - piece.fromM[0]) * sM) / lengthM,
      piece.fromM[1] + ((piece.toM[1] - piece.fromM[1]) * sM) / lengthM,
      zM,
    ];
    const out: PairFilament[] = [];
    let isOverGap = false;
    const add = (kind: PairFilament['kind'], from: Point3M, to: Point3M, fromM: number, toM: number): void => {
      out.push({ piece: index, kind, filament: { from, to }, fromM, toM, isOverGap });
    };
    add('start', at(0, sheetZM), at(0, traceZM), 0, 0);
    add('end', at(lengthM, traceZM), at(lengthM, sheetZM), lengthM, lengthM);
    for (const { fromM, toM, isGap } of cutAtGaps(lengthM, own, longestM)) {
      isOverGap = isGap;
      add('trace', at(fromM, traceZM), at(toM, traceZM), fromM, toM);
      if (!isGap) add('return', at(fromM, sheetZM), at(toM, sheetZM), fromM, toM);
      const middleM = (fromM + toM) / 2;
      if (piece.epsilonR > 1 && !isGap) add('polarization', at(middleM, traceZM), at(middleM, sheetZM), fromM, toM);
    }
    return out;
  });
}

function cutAtGaps(
  lengthM: number,
  gaps: readonly ReturnGap[],
  longestM: number,
): { fromM: number; toM: number; isGap: boolean }[] {
  const bounds: { fromM: number; toM: number; isGap: boolean }[] = [];
  let atM = 0;
  for (const gap of gaps) {
    if (gap.fromM > atM) bounds.push({ fromM: atM, toM: gap.fromM, isGap: false });
    if (gap.toM > gap.fromM) bounds.push({ fromM: gap.fromM, toM: gap.toM, isGap: true });
    atM = gap.toM;
  }
  if (lengthM > atM) bounds.push({ fromM: atM, toM: lengthM, isGap: false });
  return bounds.flatMap(({ fromM, toM, isGap }) => {
    const count = Math.ceil((toM - fromM) / longestM - 1e-9);
    return Array.from({ length: count }, (_, i) => ({
      fromM: fromM + ((toM - fromM) * i) / count,
      toM: fromM + ((toM - fromM) * (i + 1)) / count,
      isGap,
    }));
  });
}

/**
 * Mean current along a filament (A) and charge on it (C) at one frequency: re, im of the current, re, im of the charge.
 * Trace: I and q = −(1/jω)(dI/ds)/ε_r, with the end's own charge (`endCharge`) on the last filament; return: the opposite;
 * ends: I of the piece's end less what charges it; polarisation: from trace to sheet −(1 − 1/ε_r) ΔI, which leaves the
 * trace's charge smaller by ε_r.
 */
export function filamentSource(
  { kind, fromM, toM }: PairFilament,
  piece: PairPiece,
  wave: LineWave,
  omega: number,
  out: Float64Array,
): void {
  const { epsilonR } = piece;
  const charge = new Float64Array(2);
  out[2] = 0;
  out[3] = 0;
  if (kind === 'start' || kind === 'end') {
    currentAt(wave, fromM, out);
    endCharge(piece, wave, omega, kind, charge);
    // ±jωq
    const sign = kind === 'start' ? 1 : -1;
    out[0]! -= sign * omega * charge[1]!;
    out[1]! += sign * omega * charge[0]!;
    return;
  }
  currentAt(wave, fromM, out);
  const startRe = out[0]!;
  const startIm = out[1]!;
  currentAt(wave, toM, out);
  const changeRe = out[0]! - startRe;
  const changeIm = out[1]! - startIm;
  if (kind === 'polarization') {
    out[0] = -(1 - 1 / epsilonR) * changeRe;
    out[1] = -(1 - 1 / epsilonR) * changeIm;
    return;
  }
  currentIntegral(wave, fromM, toM, out);
  const sign = kind === 'trace' ? 1 : -1;
  out[0]! *= sign / (toM - fromM);
  out[1]! *= sign / (toM - fromM);
  // −ΔI/(jω ε_r) = j ΔI/(ω ε_r)
  out[2] = (-sign * changeIm) / (omega * epsilonR);
  out[3] = (sign * changeRe) / (omega * epsilonR);
  for (const end of ['start', 'end'] as const) {
    if (!isAtEnd(piece, end === 'start' ? fromM : toM, end)) continue;
    endCharge(piece, wave, omega, end, charge);
    out[2]! += sign * charge[0]!;
    out[3]! += sign * charge[1]!;
  }
}
