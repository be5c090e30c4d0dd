import { describe, expect, it } from 'vitest';
import { EPSILON0_F_PER_M } from '../../app/units/constants.ts';
import {
  ANTENNA_RADIUS_M,
  dipoleOhm,
  JOINT_CELL_M,
  monopoleOhm,
  plateCapacitanceF,
} from '../../app/validate/structure-laws.ts';
import { expectClose } from '../support/expect-close.ts';
import { itNeedsNec2c } from '../support/it-needs-nec2c.ts';
import { runNec2c } from '../support/nec2c.ts';

describe('plate', () => {
  it('square: capacitance of the handbooks', () => {
    const sideM = 0.07;
    // C = 0.3667·4πε0·a (W. R. Smythe's and later numerical values; from memory, and in the design document).
    const expectedF = 0.3667 * 4 * Math.PI * EPSILON0_F_PER_M * sideM;
    const because = 'ten cells across; with plain squares (no crowding at edges) 1.5 % low';
    expectClose(plateCapacitanceF(sideM, sideM, 10), expectedF, { rel: 0.01, because });
  });

  it('near-disk: 8·ε0·√(A/π) for a compact plate, to a few per cent', () => {
    // Disk C = 8ε0·a (J. D. Jackson, Classical Electrodynamics, section 3.13); compact shapes of equal area are within a few per cent.
    const expectedF = 8 * EPSILON0_F_PER_M * Math.sqrt((0.09 * 0.07) / Math.PI);
    expectClose(plateCapacitanceF(0.09, 0.07, 7), expectedF, { rel: 0.05, because: 'a rectangle is no disk' });
  });
});

const ARM_M = 0.25;
const dipole = (frequencyHz: number) => dipoleOhm(ARM_M, frequencyHz);
const monopole = (frequencyHz: number) => monopoleOhm(ARM_M, frequencyHz);

describe('thin-wire antennas made of cables', () => {
  it('dipole: resonant at 0.47–0.48 wavelengths with about 72 Ω', () => {
    // Handbook values for length/radius of about 1000, from memory (C. A. Balanis, Antenna Theory, section 9.3).
    const [low, high] = [0.47, 0.483].map((part) => dipole((part * 299_792_458) / (2 * ARM_M)));
    expect(low!.im).toBeLessThan(0);
    expect(high!.im).toBeGreaterThan(0);
    expectClose((low!.re + high!.re) / 2, 72, { rel: 0.05, because: 'handbooks give 70 to 73 Ω' });
  });

  it('monopole on the ground: half the dipole', () => {
    const frequencyHz = 295e6;
    const whole = dipole(frequencyHz);
    const half = monopole(frequencyHz);
    const because = 'law: image; the copper cell sits at the tip of one and in the middle of the other';
    expectClose(half.re, whole.re / 2, { rel: 0.05, because });
    expectClose(half.im, whole.im / 2, { rel: 0.05, floor: 40, because });
  });

  itNeedsNec2c('both agree with a thin-wire moment method', async () => {
    const frequenciesHz = [250e6, 285e6, 300e6, 330e6];
    const wires = (toM: number, ground: 'perfect' | 'none', segment: number, segments: number) =>
      runNec2c({
        wires: [{ tag: 1, segments, fromM: [0, 0, 0], toM: [0, 0, toM], radiusM: ANTENNA_RADIUS_M }],
        ground,
        sources: [{ tag: 1, segment, voltageRe: 1 }],
        frequenciesHz,
      });
    const because = 'gap of one segment here, of one piece there; a copper cell of 0.5 mm';
    for (const { frequencyHz, sources } of await wires(2 * ARM_M - JOINT_CELL_M, 'none', 51, 101)) {
      const own = dipole(frequencyHz);
      expectClose(own.re, sources[0]!.impedanceOhm.re, { rel: 0.03, because });
      expectClose(own.im, sources[0]!.impedanceOhm.im, { rel: 0.03, floor: 100, because });
    }
    for (const { frequencyHz, sources } of await wires(ARM_M, 'perfect', 1, 51)) {
      const own = monopole(frequencyHz);
      expectClose(own.re, sources[0]!.impedanceOhm.re, { rel: 0.03, because });
      expectClose(own.im, sources[0]!.impedanceOhm.im, { rel: 0.03, floor: 50, because });
    }
  });
});
