import { describe, expect, it } from 'vitest';
import { skinDepthM, surfaceResistanceOhm } from '../../app/lines/conductor-loss.ts';
import type { CrossSection, Microstrip } from '../../app/lines/cross-section.ts';
import { lineOf } from '../../app/lines/line.ts';
import { ETA0_OHM, SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { expectClose } from '../support/expect-close.ts';
import { solveLine } from '../support/line-field-solution.ts';

const microstrip: Microstrip = {
  kind: 'microstrip',
  widthM: 0.3e-3,
  thicknessM: 35e-6,
  heightM: 0.2e-3,
  epsilonR: 4.2,
  tanDelta: 0,
};
const stripline = {
  kind: 'stripline',
  widthM: 0.15e-3,
  thicknessM: 18e-6,
  heightAboveM: 0.3e-3,
  heightBelowM: 0.15e-3,
  epsilonR: 4.2,
  tanDelta: 0,
} as const;
const coplanar = {
  kind: 'coplanar-strips',
  widthM: 0.3e-3,
  thicknessM: 35e-6,
  centreDistanceM: 1.1e-3,
  substrateM: 0,
  epsilonR: 1,
  tanDelta: 0,
} as const;

/** Series resistance from α_c = R/(2 Z0). */
const resistanceOhmPerM = (section: CrossSection, frequencyHz: number): number => {
  const line = lineOf({ ...section, tanDelta: 0 });
  return 2 * line.z0Ohm * line.alphaNpPerM(frequencyHz);
};

describe('copper', () => {
  it.each([
    [1e6, 66.1e-6],
    [30e6, 12.1e-6],
    [100e6, 6.61e-6],
    [1e9, 2.09e-6],
  ])('skin depth at %f Hz: %f m (derived from 5.8e7 S/m)', (frequencyHz, depthM) => {
    expectClose(skinDepthM(frequencyHz), depthM, { rel: 4e-3, because: 'figure of three digits' });
  });

  it.each([
    [1e6, 0.261e-3],
    [100e6, 2.61e-3],
    [1e9, 8.25e-3],
  ])('surface resistance at %f Hz: %f Ω (derived)', (frequencyHz, resistanceOhm) => {
    expectClose(surfaceResistanceOhm(frequencyHz), resistanceOhm, { rel: 2e-3, because: 'figure of three digits' });
  });
});

describe('conductor loss', () => {
  it('stripline of Pozar’s example: α_c 0.122 Np/m and α_d 0.155 Np/m at 10 GHz (from memory)', () => {
    const section = { ...stripline, widthM: 2.66e-3, thicknessM: 1e-5, heightAboveM: 1.595e-3, heightBelowM: 1.595e-3 };
    const lossy = { ...section, epsilonR: 2.2, tanDelta: 0.001 };
    const conductor = lineOf({ ...lossy, tanDelta: 0 }).alphaNpPerM(10e9);
    expectClose(conductor, 0.122, { rel: 0.03, because: 'his closed form of the same rule, width rounded' });
    const dielectric = lineOf(lossy).alphaNpPerM(10e9) - conductor;
    expectClose(dielectric, 0.1553, { rel: 1e-3, because: 'π f √ε tan δ / c' });
    expectClose(SPEED_OF_LIGHT_M_PER_S / (10e9 * Math.sqrt(lineOf(lossy).epsilonEff)), 2.023e-2, {
      rel: 1e-3,
      because: 'wavelength, figure rounded',
    });
  });

  it.each<[string, CrossSection]>([
    ['microstrip', microstrip],
    ['off-centre stripline', stripline],
    ['coplanar strips', coplanar],
  ])('%s: the incremental inductance of the field solver gives the same resistance', (_, section) => {
    const byM = 0.02 * section.thicknessM;
    const recede = (sign: number): CrossSection => {
      const d = 2 * sign * byM;
      const trace = { widthM: section.widthM - d, thicknessM: section.thicknessM - d };
      if (section.kind === 'microstrip') return { ...section, ...trace, heightM: section.heightM + d };
      if (section.kind === 'coplanar-strips') return { ...section, ...trace };
      return { ...section, ...trace, heightAboveM: section.heightAboveM + d, heightBelowM: section.heightBelowM + d };
    };
    const slope = (solveLine(recede(1), 64).airOhm - solveLine(recede(-1), 64).airOhm) / (2 * byM);
    const frequencyHz = 20e9; // skin effect only: δ = 0.5 µm
    expectClose(resistanceOhmPerM(section, frequencyHz), (surfaceResistanceOhm(frequencyHz) / ETA0_OHM) * slope, {
      rel: 0.06,
      because: 'derivatives of formulas good to 1 %; direct current 1 % of it',
    });
  });

  it('a wide microstrip has two plates: R = 2 R_s/w', () => {
    const wide = { ...microstrip, widthM: 40e-3, heightM: 0.2e-3 };
    expectClose(resistanceOhmPerM(wide, 5e9), (2 * surfaceResistanceOhm(5e9)) / 40e-3, {
      rel: 0.05,
      because: 'fringing makes it about 5 h wider, both plates: 2 · 5 h/w',
    });
  });

  it('tends to direct current below the skin effect and rises as √f above', () => {
    expectClose(resistanceOhmPerM(microstrip, 1), 1 / (5.8e7 * 0.3e-3 * 35e-6), { rel: 1e-3, because: '1/(σ w t)' });
    expectClose(resistanceOhmPerM(coplanar, 1), 2 / (5.8e7 * 0.3e-3 * 35e-6), { rel: 1e-3, because: 'there and back' });
    expectClose(resistanceOhmPerM(microstrip, 16e9) / resistanceOhmPerM(microstrip, 4e9), 2, {
      rel: 1e-3,
      because: 'direct current adds (0.02)²/2',
    });
    for (let frequencyHz = 1e4; frequencyHz < 1e10; frequencyHz *= 2) {
      expect(resistanceOhmPerM(microstrip, 2 * frequencyHz)).toBeGreaterThan(
        resistanceOhmPerM(microstrip, frequencyHz),
      );
    }
  });

  it('copper of no thickness is lossless and says nothing about skin depth', () => {
    const line = lineOf({ ...microstrip, thicknessM: 0 });
    expect(line.alphaNpPerM(1e9)).toBe(0);
    expect(line.caveats).toEqual([]);
  });

  it('says up to which frequency the copper is thinner than two skin depths', () => {
    const [caveat] = lineOf(microstrip).caveats;
    expect(caveat).toMatchObject({ code: 'thin-conductor', fromHz: 0 });
    expectClose(66.1e-6 / Math.sqrt(caveat!.toHz / 1e6), 35e-6 / 2, {
      rel: 2e-3,
      because: '66.1 µm at 1 MHz, as 1/√f',
    });
  });
});

describe('dielectric loss', () => {
  const alphaNpPerM = (section: CrossSection) => lineOf({ ...section, thicknessM: 0 }).alphaNpPerM(3e9);
  const uniform = (epsilonEff: number, tanDelta: number) =>
    ((Math.PI * 3e9) / SPEED_OF_LIGHT_M_PER_S) * Math.sqrt(epsilonEff) * tanDelta;

  it('fills a stripline wholly', () => {
    expectClose(alphaNpPerM({ ...stripline, tanDelta: 0.02 }), uniform(4.2, 0.02), { rel: 1e-9, because: 'uniform' });
  });

  it('fills a microstrip by the usual factor', () => {
    // D. M. Pozar, Microwave Engineering, 4th ed., eq. 3.198: k0 ε_r (ε_eff − 1) tan δ / (2 √ε_eff (ε_r − 1)).
    const { epsilonEff } = lineOf({ ...microstrip, thicknessM: 0 });
    const filling = (4.2 * (epsilonEff - 1)) / (epsilonEff * 3.2);
    expectClose(alphaNpPerM({ ...microstrip, tanDelta: 0.02 }), uniform(epsilonEff, 0.02) * filling, {
      rel: 0.02,
      because: 'Pozar takes ε_eff linear in ε_r; it is so within 1–2 %',
    });
  });

  it('counts a cover by its share; cover and substrate together fill a deeply buried trace', () => {
    const cover = { thicknessM: 20e-6, epsilonR: 3.5, tanDelta: 0.03 };
    const maskOnly = alphaNpPerM({ ...microstrip, cover });
    expect(maskOnly).toBeGreaterThan(0.02 * uniform(3.2, 0.03));
    expect(maskOnly).toBeLessThan(0.2 * uniform(3.2, 0.03));
    const buried = { ...microstrip, tanDelta: 0.02, cover: { thicknessM: 0.1, epsilonR: 4.2, tanDelta: 0.02 } };
    expectClose(alphaNpPerM(buried), uniform(4.2, 0.02), { rel: 5e-3, because: 'ε_eff of Hammerstad–Jensen 0.2 %' });
  });

  it('gives coplanar strips on a thick slab half of the field', () => {
    const section = { ...coplanar, substrateM: 1, epsilonR: 4.2, tanDelta: 0.02 };
    expectClose(alphaNpPerM(section), uniform(2.6, 0.02) * (4.2 / 5.2), { rel: 2e-3, because: 'ε_eff = (ε_r + 1)/2' });
  });
});
