import { describe, expect, it } from 'vitest';
import { pairEnd, pairEndSection } from '../../app/emitters/pair-end.ts';
import { ETA0_OHM, MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { solveDense } from '../support/dense-solve.ts';
import { itNeedsNec2c } from '../support/it-needs-nec2c.ts';
import { runNec2c } from '../support/nec2c.ts';

const z0Of = (spacingM: number, radiusM: number): number => (ETA0_OHM / Math.PI) * Math.acosh(spacingM / (2 * radiusM));

/** Rectangle of round wire without internal inductance, H. F. W. Grover, Inductance Calculations, chapter 8 (from memory). */
function rectangleInductanceH(l: number, w: number, a: number): number {
  const d = Math.hypot(l, w);
  const sides = l * Math.log((2 * l) / a) + w * Math.log((2 * w) / a);
  return (MU0_H_PER_M / Math.PI) * (sides + 2 * d - l * Math.asinh(l / w) - w * Math.asinh(w / l) - 2 * (l + w));
}

describe('pair end', () => {
  it.each([
    [0.01, 0.00025],
    [0.003, 0.00015],
    [0.02, 0.00007],
  ])('spacing %f m, radius %f m: both ends make a line into a rectangle', (spacingM, radiusM) => {
    const lengthM = 40 * spacingM;
    const z0Ohm = z0Of(spacingM, radiusM);
    // Thin-wire line, as the rectangle is: acosh(D/2a) → ln(D/a).
    const lineH = (MU0_H_PER_M / Math.PI) * Math.log(spacingM / radiusM) * lengthM;
    const extraH = rectangleInductanceH(lengthM, spacingM, radiusM) - lineH;
    const { inductanceH } = pairEnd(spacingM, z0Ohm, 1);
    // The rectangle's next term is D/2l = 1/80 against ln(2D/a) − 2 ≥ 1.7.
    expect(Math.abs((2 * inductanceH) / extraH - 1)).toBeLessThan(0.01);
  });

  it.each([15, 20, 40, 80, 200, 1000])(
    'D/a = %i: the electric moment of a charged pair beyond that of the line',
    (ratio) => {
      const { momentPerVoltage, lengthM } = chargedPair(ratio);
      const lineFPerM = Math.PI / Math.acosh(ratio / 2); // C'/ε0
      const beyond = (momentPerVoltage / lineFPerM - lengthM) / 2; // D = 1
      const z0Ohm = z0Of(1, 1 / ratio);
      const predicted = pairEnd(1, z0Ohm, 1).capacitanceF * z0Ohm * SPEED_OF_LIGHT_M_PER_S;
      // The fit holds 2 % of D: 0.02 dB on a line of 10 D. Without the piece (¼) or the fringe (0.04 … 0.1) it fails.
      expect(Math.abs(predicted - beyond)).toBeLessThan(0.02);
    },
  );

  itNeedsNec2c('a shorted pair has the reactance of line and ends', async () => {
    const spacingM = 0.01;
    const radiusM = 0.00025;
    const lengthM = 0.12;
    const frequencyHz = 60e6;
    const corners = [
      [0, 0, 0],
      [lengthM, 0, 0],
      [lengthM, spacingM, 0],
      [0, spacingM, 0],
    ] as const;
    const [result] = await runNec2c({
      wires: corners.map((fromM, i) => ({
        tag: i + 1,
        segments: i % 2 === 0 ? 120 : 9,
        fromM,
        toM: corners[(i + 1) % 4]!,
        radiusM,
      })),
      ground: 'none',
      sources: [{ tag: 4, segment: 5, voltageRe: 1 }],
      frequenciesHz: [frequencyHz],
    });
    const omega = 2 * Math.PI * frequencyHz;
    const z0Ohm = z0Of(spacingM, radiusM);
    const endOhm = omega * pairEnd(spacingM, z0Ohm, 1).inductanceH;
    const electrical = (omega * lengthM) / SPEED_OF_LIGHT_M_PER_S + Math.atan(endOhm / z0Ohm);
    const expected = z0Ohm * Math.tan(electrical) + endOhm;
    const actual = result!.sources[0]!.impedanceOhm.im;
    // Thin-wire kernel on 4-radius segments and the ends' capacitance: 0.5 %; without the ends 6 % would be missing.
    expect(Math.abs(actual / expected - 1)).toBeLessThan(0.006);
    expect(z0Ohm * Math.tan((omega * lengthM) / SPEED_OF_LIGHT_M_PER_S)).toBeLessThan(0.95 * actual);
  });

  it('as a section of line it is that inductance and capacitance', () => {
    const end = pairEnd(0.008, 300, 1.7);
    // A quarter of the spacing's worth of the line's own capacitance, √ε_eff/(Z0 c).
    expect(
      Math.abs(end.gapCapacitanceF / ((0.002 * Math.sqrt(1.7)) / (300 * SPEED_OF_LIGHT_M_PER_S)) - 1),
    ).toBeLessThan(1e-12);
    const { z0Ohm, lengthM } = pairEndSection(end);
    const phase = (2 * Math.PI * 30e6 * lengthM) / SPEED_OF_LIGHT_M_PER_S;
    // tan x against x: x²/3 = 1e-6.
    expect(Math.abs((z0Ohm * Math.tan(phase)) / (2 * Math.PI * 30e6 * end.inductanceH) - 1)).toBeLessThan(1e-5);
    expect(Math.abs(Math.tan(phase) / z0Ohm / (2 * Math.PI * 30e6 * end.capacitanceF) - 1)).toBeLessThan(1e-5);
    // Conductors nearly touching: the end stays a passive section.
    expect(pairEndSection(pairEnd(0.001, 20, 1)).lengthM).toBeGreaterThan(0);
  });

  it('refuses what is no pair', () => {
    expect(() => pairEnd(0, 300, 1)).toThrow(/spacingM must be a positive finite number/);
    expect(() => pairEnd(0.01, Number.NaN, 1)).toThrow(/z0Ohm/);
  });
});

/**
 * Electric moment across (over ε0) of two wires of length 20 D at ±½ V, each with half of the end pieces: charges constant
 * on segments, potentials on the wire's surface, the other half by antisymmetry. `gap`: bare middle of the end pieces. Lengths in units of D.
 */
function chargedPair(ratio: number, gap = 0): { momentPerVoltage: number; chargePerVoltage: number; lengthM: number } {
  const a = 1 / ratio;
  const lengthM = 20;
  const pieces: { x: number; y: number; tx: number; ty: number; l: number }[] = [];
  const endPieces = Math.max(4, Math.min(20, Math.floor(ratio / 4)));
  const cuts = [0];
  for (let step = 0.5 / endPieces; cuts.at(-1)! < lengthM / 2; step = Math.min(0.5, step * 1.15))
    cuts.push(cuts.at(-1)! + step);
  const scale = lengthM / 2 / cuts.at(-1)!;
  for (let i = 1; i < cuts.length; i++) {
    const middle = (scale * (cuts[i - 1]! + cuts[i]!)) / 2;
    const l = scale * (cuts[i]! - cuts[i - 1]!);
    pieces.push({ x: middle, y: 0.5, tx: 1, ty: 0, l }, { x: lengthM - middle, y: 0.5, tx: 1, ty: 0, l });
  }
  for (let i = 0; i < endPieces; i++) {
    const y = gap / 2 + ((i + 0.5) * (0.5 - gap / 2)) / endPieces;
    for (const x of [0, lengthM]) pieces.push({ x, y, tx: 0, ty: 1, l: (0.5 - gap / 2) / endPieces });
  }
  const n = pieces.length;
  const matrix = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      for (const sign of [1, -1]) {
        const source = pieces[j]!;
        const dx = pieces[i]!.x - source.x;
        const dy = pieces[i]!.y - sign * source.y;
        const along = dx * source.tx + dy * source.ty * sign;
        const rho = Math.sqrt(Math.max(0, dx * dx + dy * dy - along * along) + a * a);
        const mean = (Math.asinh((along + source.l / 2) / rho) - Math.asinh((along - source.l / 2) / rho)) / source.l;
        matrix[i * n + j]! += (sign * mean) / (4 * Math.PI);
      }
    }
  }
  const charges = new Float64Array(n).fill(0.5);
  solveDense(matrix, charges);
  let momentPerVoltage = 0;
  for (let i = 0; i < n; i++) momentPerVoltage += 2 * charges[i]! * pieces[i]!.y;
  return { momentPerVoltage, chargePerVoltage: charges.reduce((sum, charge) => sum + charge, 0), lengthM };
}
