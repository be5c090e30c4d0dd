import { describe, expect } from 'vitest';
import { itNeedsNec2c } from './it-needs-nec2c.ts';
import { type NecDeck, necColumn, necCurrentA, necPoint, runNec2c } from './nec2c.ts';

const ETA0_OHM = 376.730_313_67;
const C_M_PER_S = 299_792_458;

const shortDipole: NecDeck = {
  wires: [{ tag: 7, segments: 21, fromM: [0, 0, -0.05], toM: [0, 0, 0.05], radiusM: 0.0002 }],
  ground: 'none',
  sources: [{ tag: 7, segment: 11, voltageRe: 2 }],
  frequenciesHz: [30e6, 100e6],
  grids: [necPoint([30, 0, 0]), necPoint([0, 4, 3])],
};

describe('nec2c harness', () => {
  itNeedsNec2c('reads a half-wave dipole with its textbook impedance', async () => {
    // C. A. Balanis, Antenna Theory, 3rd ed., section 4.6 (from memory): 73 + j42.5 Ω for λ/2 and a vanishing radius.
    const halfM = C_M_PER_S / 300e6 / 4;
    const [result] = await runNec2c({
      wires: [{ tag: 1, segments: 41, fromM: [0, 0, -halfM], toM: [0, 0, halfM], radiusM: 1e-6 }],
      ground: 'none',
      sources: [{ tag: 1, segment: 21, voltageRe: 1 }],
      frequenciesHz: [300e6],
    });
    const { re, im } = result!.sources[0]!.impedanceOhm;
    // A wire of finite radius (a/λ = 1e-6) is a few per cent above the sinusoidal-current value.
    expect(Math.abs(re / 73.13 - 1)).toBeLessThan(0.08);
    expect(Math.abs(im - 42.5)).toBeLessThan(6);
  });

  itNeedsNec2c(
    'gives peak phasors with e^(+jωt): field of the printed currents as the far field of a short wire',
    async () => {
      const results = await runNec2c(shortDipole);
      for (const [index, frequencyHz] of shortDipole.frequenciesHz.entries()) {
        const result = results[index]!;
        const k = (2 * Math.PI * frequencyHz) / C_M_PER_S;
        // Moment of the printed currents, A·m, and E_z broadside (C. R. Paul, Introduction to EMC, 2nd ed., Hertzian dipole,
        // from memory): −jkη0 m e^(−jkR)/(4πR) · (1 − j/(kR) − 1/(kR)²).
        const segmentM = 0.1 / 21;
        let momentIm = 0;
        let momentRe = 0;
        for (const { currentA } of result.currents) {
          momentRe += currentA.re * segmentM;
          momentIm += currentA.im * segmentM;
        }
        const rM = 30;
        const scale = (k * ETA0_OHM) / (4 * Math.PI * rM);
        // (−j)(a − jb) = −b − ja
        const factor = { re: -1 / (k * rM), im: -(1 - 1 / (k * rM) ** 2) };
        const turn = { re: Math.cos(k * rM), im: -Math.sin(k * rM) };
        const fm = multiply(factor, { re: momentRe, im: momentIm });
        const expected = multiply(fm, turn);
        const actual = result.electricVPerM[0]![0]![2];
        // Length 0.1 m against R = 30 m and λ = 3 m: (kl)²/24 = 0.2 %; the printed digits: 0.05 %.
        const size = scale * Math.hypot(expected.re, expected.im);
        expect(Math.hypot(actual.re - scale * expected.re, actual.im - scale * expected.im)).toBeLessThan(0.004 * size);
        // Peak convention: the input power is half of Re(V I*).
        const source = result.sources[0]!;
        const halfVi = 0.5 * (source.voltageV.re * source.currentA.re + source.voltageV.im * source.currentA.im);
        expect(Math.abs(result.inputPowerW / halfVi - 1)).toBeLessThan(2e-4);
      }
    },
  );

  itNeedsNec2c('orders points, segments and frequencies as documented', async () => {
    const grid = { firstM: [3, 0.5, 1] as const, stepM: [0.7, 0, 0.4] as const, counts: [2, 1, 3] as const };
    const singles = [
      [3, 0.5, 1],
      [3.7, 0.5, 1],
      [3, 0.5, 1.4],
      [3.7, 0.5, 1.4],
      [3, 0.5, 1.8],
      [3.7, 0.5, 1.8],
    ] as const;
    const bent: NecDeck = {
      wires: [
        { tag: 1, segments: 5, fromM: [0, 0, 0.5], toM: [0.1, 0, 0.5], radiusM: 0.0005 },
        { tag: 2, segments: 3, fromM: [0.1, 0, 0.5], toM: [0.1, 0.03, 0.6], radiusM: 0.0005 },
      ],
      ground: 'perfect',
      sources: [{ tag: 1, segment: 3, voltageRe: 1 }],
      loads: [{ tag: 1, segment: 3, resistanceOhm: 25 }],
      frequenciesHz: [200e6, 90e6],
      grids: [grid, ...singles.map((point) => necPoint(point))],
    };
    const results = await runNec2c(bent);
    expect(results.map((result) => result.frequencyHz)).toEqual([200e6, 90e6]);
    for (const result of results) {
      const inGrid = result.electricVPerM[0]!;
      for (const [index, single] of result.electricVPerM.slice(1).entries()) expect(inGrid[index]).toEqual(single[0]);
      // The open end carries least; the source segment's current is the source's own.
      const last = necCurrentA(result, 2, 3);
      const first = necCurrentA(result, 1, 3);
      expect(Math.hypot(last.re, last.im)).toBeLessThan(0.5 * Math.hypot(first.re, first.im));
      expect(result.sources[0]!.currentA).toEqual(first);
    }
    expect(results[0]!.electricVPerM[0]).not.toEqual(results[1]!.electricVPerM[0]);
  });

  itNeedsNec2c('puts a load in series with the source of its segment', async () => {
    const bare = (await runNec2c(shortDipole))[1]!.sources[0]!.impedanceOhm;
    const loads = [{ tag: 7, segment: 11, resistanceOhm: 321, reactanceOhm: 150 }];
    const loaded = (await runNec2c({ ...shortDipole, loads }))[1]!.sources[0]!.impedanceOhm;
    expect(loaded.re - bare.re).toBeCloseTo(321, 0);
    expect(Math.abs(loaded.im - bare.im - 150)).toBeLessThan(0.5);
  });

  itNeedsNec2c('has no tangential field on a perfect ground', async () => {
    const [result] = await runNec2c({
      ...shortDipole,
      wires: [{ tag: 7, segments: 21, fromM: [0, 0, 0.4], toM: [0.06, 0.02, 0.47], radiusM: 0.0002 }],
      ground: 'perfect',
      frequenciesHz: [100e6],
      grids: [necColumn(1.1, 0.6, 1e-6, 0, 1)],
    });
    const [ex, ey, ez] = result!.electricVPerM[0]![0]!;
    expect(Math.hypot(ex.re, ex.im) + Math.hypot(ey.re, ey.im)).toBeLessThan(1e-3 * Math.hypot(ez.re, ez.im));
  });

  itNeedsNec2c('says what the solver refuses', async () => {
    await expect(runNec2c({ ...shortDipole, sources: [{ tag: 8, segment: 1, voltageRe: 1 }] })).rejects.toThrow(
      /nec2c/,
    );
    await expect(runNec2c({ ...shortDipole, frequenciesHz: [30e9] })).rejects.toThrow(/tenth of a wavelength/);
    const wires = [{ ...shortDipole.wires[0]!, radiusM: 0.01 }];
    await expect(runNec2c({ ...shortDipole, wires })).rejects.toThrow(/two radii/);
  });
});

const multiply = (a: { re: number; im: number }, b: { re: number; im: number }): { re: number; im: number } => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
});
