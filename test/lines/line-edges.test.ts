import { describe, expect, it } from 'vitest';
import { AppError } from '../../app/errors.ts';
import type { CrossSection } from '../../app/lines/cross-section.ts';
import { effectiveDielectric } from '../../app/lines/dielectric.ts';
import { edgeCoupledPair } from '../../app/lines/edge-coupled-pair.ts';
import { lineOf } from '../../app/lines/line.ts';
import { lineNotTemCaveat, quasiTemLimitHz } from '../../app/lines/validity.ts';
import { expectClose } from '../support/expect-close.ts';

const microstrip: CrossSection = {
  kind: 'microstrip',
  widthM: 0.3e-3,
  thicknessM: 0,
  heightM: 0.2e-3,
  epsilonR: 4.2,
  tanDelta: 0,
};
const stripline: CrossSection = {
  kind: 'stripline',
  widthM: 0.15e-3,
  thicknessM: 0,
  heightAboveM: 0.3e-3,
  heightBelowM: 0.15e-3,
  epsilonR: 4.2,
  tanDelta: 0,
};
const coplanar: CrossSection = {
  kind: 'coplanar-strips',
  widthM: 0.3e-3,
  thicknessM: 0,
  centreDistanceM: 1.1e-3,
  substrateM: 1.5e-3,
  epsilonR: 4.2,
  tanDelta: 0,
};

describe('range of a line model', () => {
  it.each<[string, CrossSection]>([
    ['too narrow', { ...microstrip, widthM: 1e-6 }],
    ['too wide', { ...microstrip, widthM: 0.05 }],
    ['copper thicker than its dielectric', { ...microstrip, thicknessM: 0.25e-3 }],
    ['copper on edge', { ...stripline, thicknessM: 0.4e-3 }],
    ['one plane far away', { ...stripline, heightAboveM: 20e-3 }],
    ['gap closed by thick copper', { ...coplanar, centreDistanceM: 0.31e-3, thicknessM: 35e-6 }],
    ['strips very far apart', { ...coplanar, centreDistanceM: 0.5 }],
    ['permittivity beyond the formula', { ...microstrip, epsilonR: 200 }],
    ['cover much denser than the substrate', { ...microstrip, cover: { thicknessM: 1e-3, epsilonR: 9, tanDelta: 0 } }],
  ])('%s: a caveat, and finite numbers', (_, section) => {
    const line = lineOf(section);
    expect(line.caveats.map(({ code }) => code)).toContain('line-outside-validity');
    expect(line.z0Ohm).toBeGreaterThan(0);
    expect(line.z0Ohm).toBeLessThan(2000);
    expect(line.epsilonEff).toBeGreaterThanOrEqual(1);
    expect(line.alphaNpPerM(1e9)).toBeGreaterThanOrEqual(0);
    expect(line.alphaNpPerM(1e9)).toBeLessThan(1000);
  });

  it.each([microstrip, stripline, coplanar])('ordinary sections carry none ($kind)', (section) => {
    expect(lineOf(section).caveats).toEqual([]);
  });

  it('a cross-section is small up to a tenth of the wavelength on the line', () => {
    const line = lineOf(stripline);
    const limitHz = quasiTemLimitHz(stripline, line);
    expectClose(299_792_458 / (limitHz * Math.sqrt(4.2)), 10 * 0.45e-3, { rel: 1e-12, because: 'λ = 10 b' });
    expect(lineNotTemCaveat(stripline, line, 0.99 * limitHz)).toBeUndefined();
    const maxHz = 2 * limitHz;
    expect(lineNotTemCaveat(stripline, line, maxHz)).toMatchObject({
      code: 'line-not-tem',
      fromHz: limitHz,
      toHz: maxHz,
    });
  });

  it('the distance to the return counts, not the copper alone', () => {
    const near = quasiTemLimitHz(coplanar, { epsilonEff: 2 });
    const far = quasiTemLimitHz({ ...coplanar, centreDistanceM: 2.5e-3 }, { epsilonEff: 2 });
    expectClose(near / far, 2.8 / 1.4, { rel: 1e-12, because: 'outer edges 1.4 mm and 2.8 mm apart' });
  });

  it.each<[string, CrossSection, string]>([
    ['zero width', { ...microstrip, widthM: 0 }, 'section.widthM'],
    ['no number', { ...microstrip, heightM: Number.NaN }, 'section.heightM'],
    ['negative copper', { ...stripline, thicknessM: -1e-6 }, 'section.thicknessM'],
    ['infinite height', { ...stripline, heightAboveM: Infinity }, 'section.heightAboveM'],
    ['permittivity below 1', { ...stripline, epsilonR: 0.5 }, 'section.epsilonR'],
    ['negative loss', { ...microstrip, tanDelta: -0.1 }, 'section.tanDelta'],
    ['overlapping strips', { ...coplanar, centreDistanceM: 0.3e-3 }, 'section.centreDistanceM'],
    ['bad cover', { ...microstrip, cover: { thicknessM: 1e-5, epsilonR: 0, tanDelta: 0 } }, 'section.cover.epsilonR'],
  ])('refuses %s by name', (_, section, path) => {
    expect(() => lineOf(section)).toThrow(AppError);
    expect(() => lineOf(section)).toThrow(path);
  });
});

describe('several dielectric rows as one', () => {
  it('are capacitors in series', () => {
    const rows = [
      { thicknessM: 0.1e-3, epsilonR: 4, tanDelta: 0.02 },
      { thicknessM: 0.3e-3, epsilonR: 3, tanDelta: 0.005 },
    ];
    const both = effectiveDielectric(rows);
    expectClose(both.epsilonR, 0.4 / (0.1 / 4 + 0.3 / 3), { rel: 1e-12, because: 'h/ε = Σ h_i/ε_i' });
    // Complex permittivities in series, exactly: ε(1 − j tan δ).
    let re = 0;
    let im = 0;
    for (const { thicknessM, epsilonR, tanDelta } of rows) {
      re += thicknessM / (epsilonR * (1 + tanDelta ** 2));
      im += (thicknessM * tanDelta) / (epsilonR * (1 + tanDelta ** 2));
    }
    expectClose(both.tanDelta, im / re, { rel: 1e-3, because: 'first order in tan δ' });
  });

  it('one row, or a row of no thickness beside it, changes nothing', () => {
    const row = { thicknessM: 0.2e-3, epsilonR: 4.4, tanDelta: 0.017 };
    for (const rows of [[row], [row, { thicknessM: 0, epsilonR: 9, tanDelta: 1 }]]) {
      expectClose(effectiveDielectric(rows).epsilonR, 4.4, { rel: 1e-12, because: 'rounding' });
      expectClose(effectiveDielectric(rows).tanDelta, 0.017, { rel: 1e-12, because: 'rounding' });
    }
  });

  it('nothing at all is refused', () => {
    expect(() => effectiveDielectric([])).toThrow('positive total thickness');
    expect(() => effectiveDielectric([{ thicknessM: 0, epsilonR: 4, tanDelta: 0 }])).toThrow(AppError);
  });
});

describe('edge-coupled pair', () => {
  it('far apart: both modes are the single line', () => {
    const pair = { widthM: 1e-4, thicknessM: 0, heightM: 1e-4, gapM: 9.9e-4, epsilonR: 4.3 };
    const single = lineOf({ ...microstrip, widthM: 1e-4, heightM: 1e-4, epsilonR: 4.3 });
    const onSubstrate = edgeCoupledPair({ kind: 'microstrip', ...pair });
    expectClose(onSubstrate.even.z0Ohm, single.z0Ohm, {
      rel: 0.015,
      because: 'coupling at s = 10 h: (h/s)² and the fit',
    });
    expectClose(onSubstrate.odd.z0Ohm, single.z0Ohm, {
      rel: 0.015,
      because: 'coupling at s = 10 h: (h/s)² and the fit',
    });
    const between = edgeCoupledPair({ kind: 'stripline', ...pair });
    const alone = lineOf({ ...stripline, widthM: 1e-4, heightAboveM: 1e-4, heightBelowM: 1e-4, epsilonR: 4.3 });
    expectClose(between.even.z0Ohm, alone.z0Ohm, { rel: 1e-5, because: 'coupling falls as e^(−π s/b)' });
    expectClose(between.odd.z0Ohm, alone.z0Ohm, { rel: 1e-5, because: 'coupling falls as e^(−π s/b)' });
  });

  it('the even mode lies above and the odd mode below the single line, more so as the gap closes', () => {
    let before = 0;
    for (const gapM of [8e-4, 4e-4, 2e-4, 1e-4, 5e-5]) {
      for (const kind of ['microstrip', 'stripline'] as const) {
        const section = { kind, widthM: 2e-4, thicknessM: 18e-6, heightM: 1.5e-4, gapM, epsilonR: 4.3 };
        const { even, odd } = edgeCoupledPair(section);
        expect(even.z0Ohm).toBeGreaterThan(odd.z0Ohm);
        if (kind === 'microstrip') {
          expect(even.z0Ohm / odd.z0Ohm).toBeGreaterThan(before);
          before = even.z0Ohm / odd.z0Ohm;
        }
      }
    }
  });

  it('says when it is outside its formulas, refuses the impossible', () => {
    const section = {
      kind: 'microstrip',
      widthM: 1e-4,
      thicknessM: 0,
      heightM: 1e-4,
      gapM: 2e-4,
      epsilonR: 4.3,
    } as const;
    expect(edgeCoupledPair(section).caveats).toEqual([]);
    expect(edgeCoupledPair({ ...section, gapM: 2e-3 }).caveats[0]!.code).toBe('line-outside-validity');
    expect(edgeCoupledPair({ ...section, kind: 'stripline', widthM: 1e-5 }).caveats[0]!.code).toBe(
      'line-outside-validity',
    );
    expect(() => edgeCoupledPair({ ...section, gapM: 0 })).toThrow('section.gapM');
    expect(() => edgeCoupledPair({ ...section, epsilonR: 0 })).toThrow('section.epsilonR');
  });
});

describe('lines that were asked for before', () => {
  it('are kept, and never mixed up: not even where a NaN or an infinity reads like nothing', () => {
    expect(lineOf({ ...microstrip })).toBe(lineOf(microstrip));
    expect(lineOf({ ...microstrip, thicknessM: 1e-6 })).not.toBe(lineOf(microstrip));
    expect(() => lineOf({ ...microstrip, widthM: Number.NaN })).toThrow('section.widthM');
    expect(() => lineOf({ ...microstrip, widthM: Number.NaN })).toThrow('section.widthM');
  });

  it('thousands of different ones do not pile up wrongly', () => {
    const widths = Array.from({ length: 1200 }, (_, i) => 1e-4 + i * 1e-7);
    const first = widths.map((widthM) => lineOf({ ...microstrip, widthM }).z0Ohm);
    for (const [i, widthM] of widths.entries()) expect(lineOf({ ...microstrip, widthM }).z0Ohm).toBe(first[i]);
    for (let i = 1; i < first.length; i++) expect(first[i]).toBeLessThan(first[i - 1]!);
  });
});
