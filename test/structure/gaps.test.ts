import { describe, expect, it } from 'vitest';
import type { PointM } from '../../app/board/board.ts';
import { currentAt, currentIntegral, type LineWave } from '../../app/structure/line-wave.ts';
import { filamentSource, pairFilaments } from '../../app/structure/pair-filaments.ts';
import type { PairPiece } from '../../app/structure/pair-piece.ts';
import { findReturnGaps } from '../../app/structure/return-gaps.ts';
import { cellAtIndex } from '../../app/structure/sheet.ts';
import { pointShares } from '../../app/structure/sheet-lookup.ts';
import { slotCorrection } from '../../app/structure/slot-kernel.ts';
import { edgeCorrection } from '../../app/structure/strip-density.ts';
import { expectClose } from '../support/expect-close.ts';
import { rectangle, rectangleRing, sheetOf } from './support.ts';

const CELL_M = 5e-3;
/** 60 × 40 mm; a slot across x = 30 mm from y = 10 to 30 mm, an opening of 10 mm at x = 45 to 55 mm, y = 5 to 15 mm. */
const sheet = sheetOf(
  [rectangle(0.06, 0.04, [rectangleRing(0.0299, 0.01, 0.0301, 0.03), rectangleRing(0.045, 0.005, 0.055, 0.015)])],
  0.06,
  0.04,
  CELL_M,
);
const piece = (from: PointM, to: PointM): PairPiece => ({ fromM: from, toM: to, heightM: 1e-3, side: 1, epsilonR: 4 });
const gapsOf = (...pieces: PairPiece[]) => findReturnGaps(sheet, pieces);

describe('openings under a trace', () => {
  it('plain copper has none, nor has a slot passed beside its end', () => {
    expect(gapsOf(piece([0.01, 0.0325], [0.05, 0.0325]))).toEqual({ gaps: [], terminals: 0 });
    expect(gapsOf(piece([0.01, 0.034], [0.036, 0.0081])).gaps).toHaveLength(1);
    expect(gapsOf(piece([0.01, 0.0061], [0.04, 0.0061])).gaps).toHaveLength(0);
  });

  it('a slot: from the centre of the last cell to the centre of the first behind it', () => {
    const { gaps, terminals } = gapsOf(piece([0.01, 0.0213], [0.05, 0.0213]));
    expect(terminals).toBe(0);
    expect(gaps).toHaveLength(1);
    expect(gaps[0]!.fromM).toBeCloseTo(0.0175, 12);
    expect(gaps[0]!.toM).toBeCloseTo(0.0225, 12);
    expect([gaps[0]!.fromCell, gaps[0]!.toCell]).toEqual([cellAtIndex(sheet, 5, 4), cellAtIndex(sheet, 6, 4)]);
  });

  it('drawn the other way round, or in pieces that meet in the opening, it is the same opening', () => {
    const [back] = gapsOf(piece([0.05, 0.0213], [0.01, 0.0213])).gaps;
    expect(back!.fromM).toBeCloseTo(0.0175, 12);
    const met = gapsOf(piece([0.039, 0.0113], [0.0508, 0.0113]), piece([0.0508, 0.0113], [0.0595, 0.0113]));
    expect(met.terminals).toBe(0);
    expect(met.gaps.map(({ fromCell, toCell }) => [fromCell, toCell])).toEqual([
      [cellAtIndex(sheet, 8, 2), -1],
      [-1, cellAtIndex(sheet, 11, 2)],
    ]);
  });

  it('a bend exactly on the slot’s line is the same opening, on either side of the joint', () => {
    for (const yM of [0.0213, 0.0225]) {
      const { gaps, terminals } = gapsOf(piece([0.01, yM], [0.03, yM]), piece([0.03, yM], [0.05, 0.027]));
      expect(terminals).toBe(0);
      expect(gaps.map(({ piece: of, fromCell, toCell }) => [of, fromCell, toCell])).toEqual([
        [0, cellAtIndex(sheet, 5, 4), -1],
        [1, -1, cellAtIndex(sheet, 6, 4)],
      ]);
      expect(gaps[0]!.fromM).toBeCloseTo(0.0175, 12);
      expect(gaps[0]!.toM).toBeCloseTo(0.02, 12);
      expect(gaps[1]!.fromM).toBe(0);
    }
    // Three traces that meet on it, drawn either way: each stops at its own cell.
    const three = gapsOf(
      piece([0.03, 0.0213], [0.01, 0.0213]),
      piece([0.03, 0.0213], [0.05, 0.0213]),
      piece([0.05, 0.0263], [0.03, 0.0213]),
    );
    expect(three.gaps.map(({ fromCell, toCell }) => Math.max(fromCell, toCell))).toEqual([
      cellAtIndex(sheet, 5, 4),
      cellAtIndex(sheet, 6, 4),
      cellAtIndex(sheet, 6, 4),
    ]);
    // Beside the slot's end, or where a trace only begins on its line, there is none.
    expect(gapsOf(piece([0.01, 0.0325], [0.03, 0.0325]), piece([0.03, 0.0325], [0.05, 0.0363])).gaps).toEqual([]);
    expect(gapsOf(piece([0.03, 0.0213], [0.05, 0.0213]))).toEqual({ gaps: [], terminals: 0 });
  });

  it('a bend on the far border of a wide opening: no terminal', () => {
    const { gaps, terminals } = gapsOf(
      piece([0.039, 0.0113], [0.055, 0.0113]),
      piece([0.055, 0.0113], [0.0595, 0.0163]),
    );
    expect(terminals).toBe(0);
    expect(gaps.map(({ fromCell, toCell }) => [fromCell, toCell])).toEqual([
      [cellAtIndex(sheet, 8, 2), -1],
      [-1, cellAtIndex(sheet, 11, 2)],
    ]);
  });

  it('an opening at a terminal keeps its return and is counted', () => {
    const { gaps, terminals } = gapsOf(piece([0.01, 0.0113], [0.0508, 0.0113]));
    expect(terminals).toBe(1);
    // The slot on the way is still one.
    expect(gaps).toHaveLength(1);
    expect(gaps[0]!.fromM).toBeCloseTo(0.0175, 12);
  });
});

describe('injected charge', () => {
  it('sums to one and keeps its centre, towards a neighbour or away from a missing one', () => {
    for (const [column, row, x, y] of [
      [3, 3, 3.8, 3.1],
      [5, 4, 5.5, 4.26],
      [5, 4, 5.7, 4.9],
      [0, 0, 0.2, 0.4],
    ] as const) {
      const shares = pointShares(sheet, cellAtIndex(sheet, column, row), x, y);
      const mean = (of: Int32Array): number =>
        shares.reduce((sum, { cell, share }) => sum + share * (of[cell]! + 0.5), 0);
      expectClose(
        shares.reduce((sum, { share }) => sum + share, 0),
        1,
        { rel: 1e-12, because: 'charge conserved' },
      );
      expectClose(mean(sheet.columnOf), x, { rel: 1e-12, because: 'centre kept' });
      expectClose(mean(sheet.rowOf), y, { rel: 1e-12, because: 'centre kept' });
    }
    // Not across the slot: column 6 gets nothing.
    for (const { cell } of pointShares(sheet, cellAtIndex(sheet, 5, 4), 5.7, 4.9))
      expect(sheet.columnOf[cell]).toBeLessThan(6);
  });
});

const WAVE: LineWave = {
  gammaRePerM: 0.7,
  gammaImPerM: 31,
  forwardReA: 0.8,
  forwardImA: -0.3,
  backwardReA: 0.2,
  backwardImA: 0.5,
};

describe('current along a piece', () => {
  it('its integral is the sum over short parts, also where γΔ is tiny', () => {
    const out = new Float64Array(2);
    for (const [from, to] of [
      [0.002, 0.051],
      [0.0101, 0.0103],
    ] as const) {
      const count = 4000;
      const sum = [0, 0];
      for (let i = 0; i < count; i++) {
        currentAt(WAVE, from + ((to - from) * (i + 0.5)) / count, out);
        sum[0]! += (out[0]! * (to - from)) / count;
        sum[1]! += (out[1]! * (to - from)) / count;
      }
      currentIntegral(WAVE, from, to, out);
      expectClose(out[0]!, sum[0]!, { rel: 1e-6, because: 'midpoint rule, 4000 parts' });
      expectClose(out[1]!, sum[1]!, { rel: 1e-6, because: 'midpoint rule, 4000 parts' });
    }
  });

  it('the filaments of a pair carry charge that balances their currents at every joint', () => {
    const omega = 2 * Math.PI * 300e6;
    const pieces = [piece([0.01, 0.0213], [0.05, 0.0213])];
    const { gaps } = findReturnGaps(sheet, pieces);
    const parts = pairFilaments(pieces, gaps, 0, 2e-3);
    const source = new Float64Array(4);
    const totals = { trace: [0, 0], return: [0, 0], polarization: [0, 0] };
    for (const part of parts) {
      filamentSource(part, pieces[0]!, WAVE, omega, source);
      if (part.kind === 'start' || part.kind === 'end') continue;
      totals[part.kind][0]! += part.kind === 'polarization' ? source[0]! : source[2]!;
      totals[part.kind][1]! += part.kind === 'polarization' ? source[1]! : source[3]!;
    }
    const at = (sM: number): Float64Array => {
      const out = new Float64Array(2);
      currentAt(WAVE, sM, out);
      return out;
    };
    const change = [at(0.04)[0]! - at(0)[0]!, at(0.04)[1]! - at(0)[1]!];
    // jωq = −ΔI/ε_r: q = j ΔI/(ω ε_r).
    expectClose(totals.trace[0]!, -change[1]! / (omega * 4), { rel: 1e-9, because: 'continuity' });
    expectClose(totals.trace[1]!, change[0]! / (omega * 4), { rel: 1e-9, because: 'continuity' });
    // Over the gap neither return charge nor polarisation.
    const gap = [at(0.0225)[0]! - at(0.0175)[0]!, at(0.0225)[1]! - at(0.0175)[1]!];
    expectClose(totals.return[0]!, (change[1]! - gap[1]!) / (omega * 4), { rel: 1e-9, because: 'continuity' });
    expectClose(totals.polarization[0]!, -0.75 * (change[0]! - gap[0]!), {
      rel: 1e-9,
      because: '1 − 1/ε_r of the charge',
    });
  });
});

describe('corrections of the cells', () => {
  it('cut links alone are a slot 0.28 cell wide, edges lie 0.14 cell inside', () => {
    // Same conformal problem from both sides: each bank of the slot retreats like an edge.
    expect(Math.abs(slotCorrection(0, 0.29))).toBeLessThan(0.01);
    expect(slotCorrection(0, 0.1)).toBeGreaterThan(0.3);
    expect(slotCorrection(0, 0.6)).toBeLessThan(-0.3);
    expect(Math.abs(slotCorrection(1, 1.29))).toBeLessThan(0.01);
    expectClose(edgeCorrection(400), 0.242, {
      rel: 0.01,
      because: 'limit of wide strips, found by a separate program',
    });
  });

  it('a strip of one cell gets the potential of a strip, −ln(1/4)', () => {
    // Mean of −ln|x − x'| over a unit cell is 3/2 exactly; both of its edges are open.
    expectClose(1.5 - 2 * edgeCorrection(1), Math.log(4), { rel: 1e-9, because: 'definition by the conformal map' });
  });
});
