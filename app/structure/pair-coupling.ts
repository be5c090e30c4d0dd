import { EPSILON0_F_PER_M, MU0_H_PER_M } from '../units/constants.ts';
import { profileRatio } from './edge-profile.ts';
import { endCharge, extraM, type PieceEnd } from './end-charge.ts';
import { walkGrid } from './grid-walk.ts';
import type { Incident } from './incident.ts';
import { currentAt, currentIntegral, type LineWave } from './line-wave.ts';
import { filamentSource, type PairFilament, pairFilaments } from './pair-filaments.ts';
import { checkPiece, type PairPiece, pieceLengthM } from './pair-piece.ts';
import { RegularField } from './regular-field.ts';
import { findReturnGaps, type ReturnGap } from './return-gaps.ts';
import { addEdgeShares, cellShares, pointShares, type SheetLookup } from './sheet-lookup.ts';

/** Part (0–1) of a stretch of a piece, or of a place on it, that is to act. */
type ShareOf = (piece: number, fromM: number, toM: number) => number;
const ALL: ShareOf = () => 1;

/** What one short stretch of a piece acts on. */
interface Stretch {
  readonly piece: number;
  readonly fromM: number;
  readonly toM: number;
  /** Edge and its factor of jωµ0/2 · ∫I ds (dimensionless: h/a times shares). */
  readonly edges: readonly number[];
  readonly edgeFactors: readonly number[];
  /** Cell and its factor of −1/(2ε0) · ∫q ds, 1/m. */
  readonly cells: readonly number[];
  readonly cellFactors: readonly number[];
}

/** Charge at a piece's end: cells and their factors of −1/(2ε0) · q, 1/m. */
interface EndSource {
  readonly piece: number;
  readonly end: PieceEnd;
  readonly cells: readonly number[];
  readonly cellFactors: readonly number[];
}

interface Injection {
  readonly piece: number;
  readonly atM: number;
  /** −1 where the filament stops, +1 where it starts again; times the share of the cell. */
  readonly cells: readonly number[];
  readonly shares: readonly number[];
}

/**
 * How the pairs of one net act on the sheet, prepared once for all frequencies.
 *
 * By reciprocity: next to a flat sheet its own currents make the tangential field J/2 only, its charges the normal field
 * ρ/(2ε0). So a pair of height h puts on an edge of width a under it the e.m.f. jωµ0 (h/2) ∫I ds / a and on a cell the potential
 * −(h/2ε0) ∫q ds / a², q = −(1/jω)(dI/ds)/ε_r. The sheet's density under the trace is taken linearly between the two
 * nearest rows of cells (a trace between two rows acts on both by half) with the crowding towards edges (`profileRatio`),
 * which also makes the result smooth in h and in position.
 * Over an opening the return filament is missing: it injects −I where it stops, +I where it starts again (`ReturnGap`), and
 * the trace above, alone there, acts with its regular field on the whole sheet. (Without that part the return would not
 * seek the trace's neighbourhood: on an intact plane a filament left out and injected would read 3–9 dB high, with it 0.0 dB.)
 */
export class PairCoupling {
  readonly pieces: readonly PairPiece[];
  readonly gaps: readonly ReturnGap[];
  /** Ends of traces off the copper, where the return was kept as drawn. */
  readonly terminalsOffCopper: number;
  readonly #stretches: readonly Stretch[];
  readonly #ends: readonly EndSource[];
  readonly #injections: readonly Injection[];
  readonly #bareTraces: readonly PairFilament[];
  readonly #bareField: RegularField | null;

  constructor(lookup: SheetLookup, pieces: readonly PairPiece[], path: string) {
    for (const [index, piece] of pieces.entries()) checkPiece(piece, `${path}[${index}]`);
    this.pieces = pieces;
    const { gaps, terminals } = findReturnGaps(lookup.mesh.sheet, pieces);
    this.gaps = gaps;
    this.terminalsOffCopper = terminals;
    this.#stretches = pieces.flatMap((piece, index) =>
      stretchesOf(
        lookup,
        piece,
        index,
        gaps.filter((gap) => gap.piece === index),
      ),
    );
    this.#ends = pieces.flatMap((piece, index) => endSourcesOf(lookup, piece, index));
    this.#injections = gaps.flatMap((gap) => injectionsOf(lookup, pieces[gap.piece]!, gap));
    const { mesh } = lookup;
    this.#bareTraces = gaps.length === 0 ? [] : bareTraces(pieces, gaps, mesh.sheet.zM, mesh.sheet.grid.cellM / 2);
    this.#bareField =
      this.#bareTraces.length === 0
        ? null
        : new RegularField(
            mesh,
            this.#bareTraces.map(({ filament }) => filament),
            Array.from({ length: mesh.xEdgeCount + mesh.yEdgeCount }, (_, edge) => edge),
            Array.from({ length: mesh.sheet.cellCount }, (_, cell) => cell),
          );
  }

  /** Adds what the currents (one wave a piece, A) do at one frequency, or of every stretch the share asked for. */
  addTo(incident: Incident, frequencyHz: number, waves: readonly LineWave[], shareOf: ShareOf = ALL): void {
    const omega = 2 * Math.PI * frequencyHz;
    const emfScale = (omega * MU0_H_PER_M) / 2;
    const start = new Float64Array(2);
    const end = new Float64Array(2);
    const integral = new Float64Array(2);
    for (const { piece, fromM, toM, edges, edgeFactors, cells, cellFactors } of this.#stretches) {
      const share = shareOf(piece, fromM, toM);
      if (share === 0) continue;
      const wave = waves[piece]!;
      currentIntegral(wave, fromM, toM, integral);
      currentAt(wave, fromM, start);
      currentAt(wave, toM, end);
      // jω(…): re −= im, im += re
      const emfRe = -share * emfScale * integral[1]!;
      const emfIm = share * emfScale * integral[0]!;
      for (let i = 0; i < edges.length; i++) {
        incident.emfRe[edges[i]!]! += edgeFactors[i]! * emfRe;
        incident.emfIm[edges[i]!]! += edgeFactors[i]! * emfIm;
      }
      // −(1/2ε0) ∫q ds with ∫q ds = −ΔI/(jω ε_r) = j ΔI/(ω ε_r)
      const chargeScale = share / (2 * EPSILON0_F_PER_M * omega * this.pieces[piece]!.epsilonR);
      const potentialRe = chargeScale * (end[1]! - start[1]!);
      const potentialIm = -chargeScale * (end[0]! - start[0]!);
      for (let i = 0; i < cells.length; i++) {
        incident.potentialRe[cells[i]!]! += cellFactors[i]! * potentialRe;
        incident.potentialIm[cells[i]!]! += cellFactors[i]! * potentialIm;
      }
    }
    for (const { piece, end: which, cells, cellFactors } of this.#ends) {
      const endM = which === 'start' ? 0 : pieceLengthM(this.pieces[piece]!);
      const share = shareOf(piece, endM, endM);
      if (share === 0) continue;
      endCharge(this.pieces[piece]!, waves[piece]!, omega, which, start);
      for (let i = 0; i < cells.length; i++) {
        incident.potentialRe[cells[i]!]! -= (share * cellFactors[i]! * start[0]!) / (2 * EPSILON0_F_PER_M);
        incident.potentialIm[cells[i]!]! -= (share * cellFactors[i]! * start[1]!) / (2 * EPSILON0_F_PER_M);
      }
    }
    for (const { piece, atM, cells, shares } of this.#injections) {
      const share = shareOf(piece, atM, atM);
      currentAt(waves[piece]!, atM, start);
      for (let i = 0; i < cells.length; i++) {
        incident.injectedRe[cells[i]!]! += share * shares[i]! * start[0]!;
        incident.injectedIm[cells[i]!]! += share * shares[i]! * start[1]!;
      }
    }
    this.#bareField?.addTo(incident, frequencyHz, (index, out) => {
      const trace = this.#bareTraces[index]!;
      filamentSource(trace, this.pieces[trace.piece]!, waves[trace.piece]!, omega, out);
      const share = shareOf(trace.piece, trace.fromM, trace.toM);
      for (let i = 0; i < out.length; i++) out[i]! *= share;
    });
  }
}

/** The trace over the gaps. */
function bareTraces(
  pieces: readonly PairPiece[],
  gaps: readonly ReturnGap[],
  sheetZM: number,
  longestM: number,
): PairFilament[] {
  return pairFilaments(pieces, gaps, sheetZM, longestM).filter(
    (filament) => filament.kind === 'trace' && filament.isOverGap,
  );
}

/** Half-cell stretches of the parts with a return filament. */
function stretchesOf(lookup: SheetLookup, piece: PairPiece, index: number, gaps: readonly ReturnGap[]): Stretch[] {
  const { originXM, originYM, cellM } = lookup.mesh.sheet.grid;
  const lengthM = pieceLengthM(piece);
  const out: Stretch[] = [];
  for (const { fromM, toM } of walkGrid(piece.fromM, piece.toM, originXM, originYM, cellM / 2)) {
    let atM = fromM;
    for (const gap of gaps) {
      if (gap.toM <= atM || gap.fromM >= toM) continue;
      if (gap.fromM > atM) out.push(stretchOf(lookup, piece, index, atM, gap.fromM, lengthM));
      atM = Math.max(atM, gap.toM);
    }
    if (atM < toM) out.push(stretchOf(lookup, piece, index, atM, toM, lengthM));
  }
  return out;
}

function stretchOf(
  lookup: SheetLookup,
  piece: PairPiece,
  index: number,
  fromM: number,
  toM: number,
  lengthM: number,
): Stretch {
  const { sheet } = lookup.mesh;
  const { originXM, originYM, cellM } = sheet.grid;
  const ux = (piece.toM[0] - piece.fromM[0]) / lengthM;
  const uy = (piece.toM[1] - piece.fromM[1]) / lengthM;
  const middleM = (fromM + toM) / 2;
  // Position in cells: the square of cell (c, r) is [c, c + 1] × [r, r + 1].
  const x = (piece.fromM[0] + ux * middleM - originXM) / cellM;
  const y = (piece.fromM[1] + uy * middleM - originYM) / cellM;
  const h = piece.heightM / cellM;
  const edges: number[] = [];
  const edgeFactors: number[] = [];
  addEdgeShares(lookup, 'x', x, y, h, ux * h, edges, edgeFactors);
  addEdgeShares(lookup, 'y', x, y, h, uy * h, edges, edgeFactors);
  return { piece: index, fromM, toM, edges, edgeFactors, ...chargeFactors(lookup, x, y, h) };
}

/** Cells under a charge at (x, y) and height h (all in cells) with their factors of −1/(2ε0) · q, 1/m. */
function chargeFactors(
  { mesh: { sheet }, runs: { firstColumn, endColumn, firstRow, endRow } }: SheetLookup,
  x: number,
  y: number,
  h: number,
): Pick<Stretch, 'cells' | 'cellFactors'> {
  const cells: number[] = [];
  const cellFactors: number[] = [];
  for (const { cell, share } of cellShares(sheet, x, y)) {
    const ratio =
      profileRatio(x, h, sheet.columnOf[cell]!, firstColumn[cell]!, endColumn[cell]!) *
      profileRatio(y, h, sheet.rowOf[cell]!, firstRow[cell]!, endRow[cell]!);
    cells.push(cell);
    cellFactors.push((share * ratio * h) / sheet.grid.cellM);
  }
  return { cells, cellFactors };
}

function endSourcesOf(lookup: SheetLookup, piece: PairPiece, index: number): EndSource[] {
  const { originXM, originYM, cellM } = lookup.mesh.sheet.grid;
  return (['start', 'end'] as const).flatMap((end) => {
    if (extraM(piece, end) === 0) return [];
    const [xM, yM] = end === 'start' ? piece.fromM : piece.toM;
    const [x, y] = [(xM - originXM) / cellM, (yM - originYM) / cellM];
    return [{ piece: index, end, ...chargeFactors(lookup, x, y, piece.heightM / cellM) }];
  });
}

function injectionsOf({ mesh }: SheetLookup, piece: PairPiece, gap: ReturnGap): Injection[] {
  const { sheet } = mesh;
  const { originXM, originYM, cellM } = sheet.grid;
  const lengthM = pieceLengthM(piece);
  const at = (sM: number, cell: number, sign: 1 | -1): Injection => {
    const x = (piece.fromM[0] + ((piece.toM[0] - piece.fromM[0]) * sM) / lengthM - originXM) / cellM;
    const y = (piece.fromM[1] + ((piece.toM[1] - piece.fromM[1]) * sM) / lengthM - originYM) / cellM;
    const shares = pointShares(sheet, cell, x, y);
    return {
      piece: gap.piece,
      atM: sM,
      cells: shares.map((share) => share.cell),
      shares: shares.map(({ share }) => sign * share),
    };
  };
  const out: Injection[] = [];
  if (gap.fromCell >= 0) out.push(at(gap.fromM, gap.fromCell, -1));
  if (gap.toCell >= 0) out.push(at(gap.toM, gap.toCell, 1));
  return out;
}
