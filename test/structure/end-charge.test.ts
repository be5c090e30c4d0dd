import { describe, expect, it } from 'vitest';
import { endCharge } from '../../app/structure/end-charge.ts';
import { emptyIncident } from '../../app/structure/incident.ts';
import { currentAt, type LineWave } from '../../app/structure/line-wave.ts';
import { buildMesh } from '../../app/structure/mesh.ts';
import { PairCoupling } from '../../app/structure/pair-coupling.ts';
import { filamentSource, pairFilaments } from '../../app/structure/pair-filaments.ts';
import type { PairPiece } from '../../app/structure/pair-piece.ts';
import { SheetLookup } from '../../app/structure/sheet-lookup.ts';
import { EPSILON0_F_PER_M } from '../../app/units/constants.ts';
import { expectClose } from '../support/expect-close.ts';
import { rectangle, sheetOf } from './support.ts';

const FREQUENCY_HZ = 300e6;
const OMEGA = 2 * Math.PI * FREQUENCY_HZ;
const WAVE: LineWave = {
  gammaRePerM: 0.7,
  gammaImPerM: 11,
  forwardReA: 0.8,
  forwardImA: -0.3,
  backwardReA: 0.2,
  backwardImA: 0.5,
};
const ENDS_M = [0.7e-3, 1.1e-3] as const;
const PIECE: PairPiece = {
  fromM: [0.0213, 0.0213],
  toM: [0.0587, 0.0187],
  heightM: 1e-3,
  side: 1,
  epsilonR: 4,
  endsM: ENDS_M,
};
const LENGTH_M = Math.hypot(0.0374, 0.0026);

const at = (sM: number): [number, number] => {
  const out = new Float64Array(2);
  currentAt(WAVE, sM, out);
  return [out[0]!, out[1]!];
};
const chargeOf = (end: 'start' | 'end'): [number, number] => {
  const out = new Float64Array(2);
  endCharge(PIECE, WAVE, OMEGA, end, out);
  return [out[0]!, out[1]!];
};

describe('charge at the ends of a pair', () => {
  it('is that of so much line: continuity, jωq = −Δl (dI/ds)/ε_r', () => {
    for (const [end, sM, lengthM] of [
      ['start', 0, ENDS_M[0]],
      ['end', LENGTH_M, ENDS_M[1]],
    ] as const) {
      const step = 1e-5;
      const [before, after] = [at(sM - step), at(sM + step)];
      const slope = [0, 1].map((part) => (after[part]! - before[part]!) / (2 * step));
      const [re, im] = chargeOf(end);
      const because = 'difference quotient over 20 µm';
      const floor = (Math.hypot(...slope) * lengthM) / 4;
      expectClose(-OMEGA * im, (-slope[0]! * lengthM) / 4, { rel: 1e-6, floor, because });
      expectClose(OMEGA * re, (-slope[1]! * lengthM) / 4, { rel: 1e-6, floor, because });
    }
  });

  it('the trace’s filaments keep charge: what flows in by the posts and out into the dielectric is jω times what they hold', () => {
    const source = new Float64Array(4);
    const inflow = [0, 0];
    const held = { trace: [0, 0], return: [0, 0] };
    for (const part of pairFilaments([PIECE], [], 0, 2e-3)) {
      filamentSource(part, PIECE, WAVE, OMEGA, source);
      const sign = part.kind === 'start' ? 1 : part.kind === 'end' || part.kind === 'polarization' ? -1 : 0;
      inflow[0]! += sign * source[0]!;
      inflow[1]! += sign * source[1]!;
      if (part.kind !== 'trace' && part.kind !== 'return') continue;
      held[part.kind][0]! += source[2]!;
      held[part.kind][1]! += source[3]!;
    }
    const size = Math.hypot(...inflow);
    expect(size).toBeGreaterThan(0.1);
    expectClose(-OMEGA * held.trace[1]!, inflow[0]!, { rel: 1e-9, floor: size, because: 'law: continuity' });
    expectClose(OMEGA * held.trace[0]!, inflow[1]!, { rel: 1e-9, floor: size, because: 'law: continuity' });
    for (const part of [0, 1]) {
      expectClose(held.return[part]!, -held.trace[part]!, { rel: 1e-9, because: 'the return holds the opposite' });
    }
    // The ends' share of what is held is not nothing.
    const [[r1, i1], [r2, i2]] = [chargeOf('start'), chargeOf('end')];
    expect(Math.hypot(r1 + r2, i1 + i2)).toBeGreaterThan(0.01 * Math.hypot(...held.trace));
  });

  it('acts on the sheet with the flux of a charge over it: ∫φ dA = −q h/(2ε0)', () => {
    const cellM = 5e-3;
    const mesh = buildMesh(sheetOf([rectangle(0.08, 0.04)], 0.08, 0.04, cellM), [], null);
    const flux = (piece: PairPiece): [number, number] => {
      const incident = emptyIncident(mesh);
      new PairCoupling(new SheetLookup(mesh), [piece], 'pieces').addTo(incident, FREQUENCY_HZ, [WAVE]);
      const sum = (part: Float64Array) => part.reduce((total, value) => total + value, 0) * cellM ** 2;
      return [sum(incident.potentialRe), sum(incident.potentialIm)];
    };
    const withEnds = flux(PIECE);
    const without = flux({ ...PIECE, endsM: [0, 0] });
    const [one, other] = [chargeOf('start'), chargeOf('end')];
    for (const part of [0, 1] as const) {
      // Gauss: ∫ (q/4πε0)(1/√(r² + h²) − 1/r) 2πr dr = −q h/(2ε0) over the whole plane.
      const expected = (-(one[part] + other[part]) * PIECE.heightM) / (2 * EPSILON0_F_PER_M);
      const because = 'the sheet’s own charge crowds towards its edges, 8 cells away: 1.5 % seen';
      expectClose(withEnds[part] - without[part], expected, { rel: 0.02, because });
    }
  });
});
