import { describe, expect, it } from 'vitest';
import type { CrossSection } from '../../app/lines/cross-section.ts';
import { lineOf } from '../../app/lines/line.ts';
import { ETA0_OHM } from '../../app/units/constants.ts';
import { expectClose } from '../support/expect-close.ts';

const microstrip = (u: number, epsilonR: number, extra: object = {}): CrossSection => ({
  kind: 'microstrip',
  widthM: u * 0.8e-3,
  thicknessM: 0,
  heightM: 0.8e-3,
  epsilonR,
  tanDelta: 0,
  ...extra,
});
const stripline = (widthM: number, heightBelowM: number, heightAboveM: number, thicknessM = 0): CrossSection => ({
  kind: 'stripline',
  widthM,
  thicknessM,
  heightAboveM,
  heightBelowM,
  epsilonR: 3.3,
  tanDelta: 0,
});

describe('thin microstrip against published figures', () => {
  // Hammerstad–Jensen evaluated by hand-coded formula elsewhere, rounded to 0.01 Ω and 0.001 (derived).
  it.each([
    [1, 1, 126.42, 1],
    [1, 4.3, 71.75, 3.105],
    [1, 9.8, 49.29, 6.579],
    [0.5, 4.3, 96.4, 2.99],
    [2, 4.3, 49.19, 3.275],
  ])('w/h %f, ε %f: Hammerstad–Jensen %f Ω, ε_eff %f', (u, epsilonR, z0Ohm, epsilonEff) => {
    const line = lineOf(microstrip(u, epsilonR));
    expectClose(line.z0Ohm, z0Ohm, { rel: 2e-4, because: 'figure rounded to 0.01 Ω' });
    expectClose(line.epsilonEff, epsilonEff, { rel: 3e-4, because: 'figure rounded to 0.001' });
  });

  // D. M. Pozar, Microwave Engineering, examples of section 3.8 (from memory); his formulas are good to 1 %.
  it.each([
    [3.081, 2.2, 1.87],
    [0.9654, 9.9, 6.665],
  ])('w/h %f, ε %f: 50 Ω, ε_eff %f (Pozar)', (u, epsilonR, epsilonEff) => {
    const line = lineOf(microstrip(u, epsilonR));
    expectClose(line.z0Ohm, 50, { rel: 0.01, because: 'Pozar’s closed form is stated good to 1 %' });
    expectClose(line.epsilonEff, epsilonEff, { rel: 0.01, because: 'Pozar’s closed form is stated good to 1 %' });
  });

  // Hammerstad’s synthesis (S39 of the facts; A from memory), stated good to about 1 %.
  it.each([
    [50, 4.3],
    [75, 4.3],
    [50, 2.2],
    [30, 9.8],
    [100, 3],
  ])('%f Ω on ε %f: the published synthesis gives the width', (z0Ohm, epsilonR) => {
    expectClose(lineOf(microstrip(synthesisedU(z0Ohm, epsilonR), epsilonR)).z0Ohm, z0Ohm, {
      rel: 0.012,
      because: 'synthesis formulas good to about 1 %',
    });
  });

  // IPC-2141, common practice: 87/√(ε + 1.41) · ln(5.98 h/(0.8 w + t)).
  it.each([1, 2])('w/h %f, ε 4.3: within 3 %% of the rule of IPC-2141', (u) => {
    const rule = (87 / Math.sqrt(4.3 + 1.41)) * Math.log(5.98 / (0.8 * u));
    expectClose(lineOf(microstrip(u, 4.3)).z0Ohm, rule, { rel: 0.03, because: 'rule of thumb' });
  });
});

function synthesisedU(z0Ohm: number, epsilonR: number): number {
  const a = (z0Ohm / 60) * Math.sqrt((epsilonR + 1) / 2) + ((epsilonR - 1) / (epsilonR + 1)) * (0.23 + 0.11 / epsilonR);
  const narrow = (8 * Math.exp(a)) / (Math.exp(2 * a) - 2);
  if (narrow < 2) return narrow;
  const b = (60 * Math.PI ** 2) / (z0Ohm * Math.sqrt(epsilonR));
  const tail = ((epsilonR - 1) / (2 * epsilonR)) * (Math.log(b - 1) + 0.39 - 0.61 / epsilonR);
  return (2 / Math.PI) * (b - 1 - Math.log(2 * b - 1) + tail);
}

describe('thin centred stripline against the exact solution', () => {
  // Cohn by elliptic integrals, rounded to 0.01 Ω (derived; with 30π for η0/4, which is 0.07 % more).
  it.each([
    [0.25, 140.01],
    [0.5, 100.5],
    [1, 65.4],
    [1.5, 48.55],
  ])('w/b %f: %f Ω in air', (part, z0Ohm) => {
    const section = { ...stripline(part * 1.2e-3, 0.6e-3, 0.6e-3), epsilonR: 1 };
    expectClose(lineOf(section).z0Ohm, (z0Ohm * ETA0_OHM) / (120 * Math.PI), {
      rel: 2e-4,
      because: 'figure rounded to 0.01 Ω',
    });
  });

  it('ε 2.20, b 3.2 mm, w 2.66 mm: 50 Ω (Pozar, example of section 3.7, from memory)', () => {
    const section = { ...stripline(2.66e-3, 1.6e-3, 1.6e-3), epsilonR: 2.2 };
    expectClose(lineOf(section).z0Ohm, 50, { rel: 0.01, because: 'Pozar’s closed form is stated good to 1 %' });
  });

  it('a strip as wide as you like: 1/Z = √ε (w + 2b ln2·2/π)/(η0 b/4), and no underflow at w = 1000 b', () => {
    for (const part of [3, 30, 1000]) {
      const expected = ETA0_OHM / 4 / (Math.sqrt(3.3) * (part + (2 * Math.LN2) / Math.PI));
      expectClose(lineOf(stripline(part * 1e-3, 0.5e-3, 0.5e-3)).z0Ohm, expected, {
        rel: 1e-4,
        because: 'fringing 2 ln2/π of a half-infinite strip (Cohn 1954); the edges no longer see each other',
      });
    }
  });
});

describe('laws', () => {
  it('ε_r = 1 gives ε_eff = 1, whatever the thickness and the cover in air', () => {
    for (const extra of [{}, { thicknessM: 1e-4 }, { cover: { thicknessM: 1e-3, epsilonR: 1, tanDelta: 0 } }]) {
      expectClose(lineOf(microstrip(0.7, 1, extra)).epsilonEff, 1, { rel: 1e-12, because: 'uniform dielectric' });
    }
  });

  it('a very wide microstrip is a parallel-plate line', () => {
    for (const [u, rel] of [
      [50, 0.06],
      [100, 0.04],
      [400, 0.015],
    ] as const) {
      const line = lineOf(microstrip(u, 4.3));
      expectClose(line.z0Ohm, ETA0_OHM / (Math.sqrt(4.3) * u), { rel, because: 'fringing falls like ln u/u' });
    }
  });

  it('scaling every dimension changes nothing but losses', () => {
    const section = microstrip(1.3, 4.1, {
      thicknessM: 35e-6,
      cover: { thicknessM: 25e-6, epsilonR: 3.4, tanDelta: 0 },
    });
    if (section.kind !== 'microstrip') throw new Error('microstrip expected');
    const times = 7.3;
    const scaled: CrossSection = {
      ...section,
      widthM: section.widthM * times,
      thicknessM: section.thicknessM * times,
      heightM: section.heightM * times,
      cover: { ...section.cover!, thicknessM: section.cover!.thicknessM * times },
    };
    expectClose(lineOf(scaled).z0Ohm, lineOf(section).z0Ohm, { rel: 1e-10, because: 'electrostatics has no scale' });
  });

  it('a cover of no thickness is a surface microstrip; thickness of the cover raises ε_eff steadily to ε_r', () => {
    const cover = (thicknessM: number) => ({ thicknessM: 35e-6, cover: { thicknessM, epsilonR: 4.3, tanDelta: 0 } });
    const at = (thicknessM: number) => lineOf(microstrip(0.9, 4.3, cover(thicknessM)));
    expect(at(0).epsilonEff).toBe(lineOf(microstrip(0.9, 4.3, { thicknessM: 35e-6 })).epsilonEff);
    expectClose(at(1e-9).epsilonEff, at(0).epsilonEff, { rel: 1e-4, because: 'continuous at no cover' });
    const rising = [0, 1e-5, 1e-4, 4e-4, 1e-3, 5e-3, 0.1].map((thicknessM) => at(thicknessM).epsilonEff);
    for (let i = 1; i < rising.length; i++) expect(rising[i]).toBeGreaterThan(rising[i - 1]!);
    expectClose(rising.at(-1)!, 4.3, { rel: 3e-3, because: 'Hammerstad–Jensen ε_eff is good to 0.2 %' });
    expectClose(at(0.1).z0Ohm, lineOf(microstrip(0.9, 1, { thicknessM: 35e-6 })).z0Ohm / Math.sqrt(4.3), {
      rel: 3e-3,
      because: 'uniform dielectric: Z_air/√ε',
    });
  });

  it('a stripline is the same upside down, and thickness 0 is the limit of thin copper', () => {
    const [one, other] = [stripline(2e-4, 1e-4, 3e-4, 3e-5), stripline(2e-4, 3e-4, 1e-4, 3e-5)];
    expectClose(lineOf(one).z0Ohm, lineOf(other).z0Ohm, { rel: 1e-12, because: 'mirror image' });
    expectClose(lineOf(stripline(2e-4, 1e-4, 3e-4, 1e-12)).z0Ohm, lineOf(stripline(2e-4, 1e-4, 3e-4)).z0Ohm, {
      rel: 1e-5,
      because: 't ln(1/t) → 0',
    });
    expectClose(lineOf(microstrip(1, 4.3, { thicknessM: 1e-12 })).z0Ohm, lineOf(microstrip(1, 4.3)).z0Ohm, {
      rel: 1e-5,
      because: 't ln(1/t) → 0',
    });
  });

  it('an off-centre stripline joins the centred one continuously and tends to a microstrip in a uniform dielectric', () => {
    const centred = lineOf(stripline(3e-4, 2e-4, 2e-4, 3e-5)).z0Ohm;
    expectClose(lineOf(stripline(3e-4, 2e-4, 2.00001e-4, 3e-5)).z0Ohm, centred, { rel: 1e-4, because: 'continuous' });
    const far = lineOf(stripline(2e-4, 2e-4, 2e-2)).z0Ohm;
    const open = lineOf(microstrip(1, 1)).z0Ohm / Math.sqrt(3.3);
    expectClose(far, open, { rel: 0.012, because: 'the formula is stated good to 1.2 %; the far plane takes 0.1 %' });
  });

  it('coplanar strips: two narrow strips far apart in air are two wires of a quarter of their width', () => {
    const [widthM, centreDistanceM] = [1e-4, 2e-2];
    const section = { kind: 'coplanar-strips', widthM, thicknessM: 0, centreDistanceM, substrateM: 0 } as const;
    // Two wires, Z = (η0/π) ln(D/a) for a ≪ D (textbook); a strip acts like a wire of radius w/4.
    expectClose(lineOf({ ...section, epsilonR: 4.3, tanDelta: 0 }).z0Ohm, (ETA0_OHM / Math.PI) * Math.log(800), {
      rel: 1e-4,
      because: '(w/D)² corrections',
    });
  });

  it('coplanar strips on a slab: thick substrate ε_eff → (ε + 1)/2, thin → 1', () => {
    const on = (substrateM: number) =>
      lineOf({
        kind: 'coplanar-strips',
        widthM: 2e-4,
        thicknessM: 0,
        centreDistanceM: 6e-4,
        substrateM,
        epsilonR: 4.3,
        tanDelta: 0,
      });
    expectClose(on(0.1).epsilonEff, 2.65, { rel: 1e-3, because: 'half of the field in either half-space' });
    expectClose(on(1e-9).epsilonEff, 1, { rel: 1e-4, because: 'nothing of the field in the slab' });
  });
});
