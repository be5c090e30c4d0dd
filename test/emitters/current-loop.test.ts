import { describe, expect, it } from 'vitest';
import type { CurrentLoop, Point3M } from '../../app/board/board.ts';
import { buildLoop } from '../../app/emitters/current-loop.ts';
import type { Radiator } from '../../app/fields/element-set.ts';
import { fieldAtAntenna } from '../../app/site/scan.ts';
import { TABLE_HEIGHT_M } from '../../app/site/site.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { boardFile, estimateOf, pointAt } from '../support/estimates.ts';
import { expectClose } from '../support/expect-close.ts';

const FRAME = { orientation: 'flat', centreXM: 0, centreYM: 0, centreZM: 0, lowestYM: 0 } as const;
/** 8 × 5 mm about the axis; flat, and standing in the x–z plane. */
const FLAT: Point3M[] = [
  [-4, -2.5, 0],
  [4, -2.5, 0],
  [4, 2.5, 0],
  [-4, 2.5, 0],
].map(([x, y, z]) => [x! / 1e3, y! / 1e3, z!]);
const STANDING: Point3M[] = FLAT.map(([x, y]) => [x, 0, y]);
const AREA_M2 = 40e-6;
const CURRENT_A = 25e-3;

function radiatorOf(pointsM: Point3M[], currentA = CURRENT_A): Radiator {
  const loop: CurrentLoop = { name: 'L', pointsM, waveform: 'i', delayS: 0, isInverted: false };
  const { elements } = buildLoop(loop, FRAME, 1e9, null);
  return {
    elements,
    currentsA: Float64Array.from({ length: 2 * elements.count }, (_, i) => (i % 2 === 0 ? currentA : 0)),
  };
}

const field = (
  pointsM: Point3M[],
  component: 'horizontal' | 'vertical',
  angleRad: number,
  frequencyHz: number,
  rM: number,
) =>
  Math.hypot(
    ...fieldAtAntenna([radiatorOf(pointsM)], component, angleRad, TABLE_HEIGHT_M, {
      kPerM: (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
      scanRadiusM: rM,
      site: 'free-space',
      box: null,
    }),
  );

describe('a small loop of current', () => {
  it.each([30e6, 186e6])('far away E = 131.6e-16 f² A I / r (H. W. Ott, from memory), %f Hz', (frequencyHz) => {
    const expected = (131.6e-16 * frequencyHz ** 2 * AREA_M2 * CURRENT_A) / 300;
    // π η0/c² = 131.7e-16; (k·side)²/24 = 1e-5; near term 1/(kr)² = 3e-5.
    const because = 'rounded constant';
    expectClose(field(FLAT, 'horizontal', 0.7, frequencyHz, 300), expected, { rel: 2e-3, because });
    // Standing in the x–z plane: strongest along x, nothing along its axis y.
    expectClose(field(STANDING, 'vertical', 0, frequencyHz, 300), expected, { rel: 2e-3, because });
    expect(field(STANDING, 'vertical', Math.PI / 2, frequencyHz, 300)).toBeLessThan(1e-6 * expected);
  });

  it('has only a horizontal field flat, at its own height, and only a vertical one standing', () => {
    const [flat, standing] = [field(FLAT, 'horizontal', 0.7, 90e6, 3), field(STANDING, 'vertical', 0, 90e6, 3)];
    expect(field(FLAT, 'vertical', 0.7, 90e6, 3)).toBeLessThan(1e-9 * flat);
    // Along x the field of the standing loop's m (along y) has no φ part.
    expect(field(STANDING, 'horizontal', 0, 90e6, 3)).toBeLessThan(1e-9 * standing);
  });

  it('near by it has the 1/r² term: E = η0 k² m/(4πr) · √(1 + 1/(kr)²) (Balanis, Antenna Theory, 5.2)', () => {
    const frequencyHz = 30e6;
    const kr = ((2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S) * 3;
    const far = (131.69e-16 * frequencyHz ** 2 * AREA_M2 * CURRENT_A) / 3;
    expectClose(field(FLAT, 'horizontal', 0.7, frequencyHz, 3), far * Math.hypot(1, 1 / kr), {
      rel: 1e-4,
      because: '(side/r)² = 7e-6',
    });
  });

  it('goes all the way around: its elements close', () => {
    const { elements } = radiatorOf([
      [0, 0, 0],
      [0.3, 0.01, 0.02],
      [0.1, 0.2, -0.05],
    ]);
    for (const axis of [0, 1, 2]) {
      let sum = 0;
      for (let e = 0; e < elements.count; e++) sum += elements.vectorsM[3 * e + axis]!;
      expect(Math.abs(sum)).toBeLessThan(1e-15);
    }
  });
});

describe('a loop in an estimate', () => {
  const loops = (more: object = {}, second?: object) =>
    boardFile({
      waveforms: [{ name: 'i', kind: 'lines', lines: [{ frequencyMhz: 186, amplitudeA: CURRENT_A }] }],
      loops: [
        {
          name: 'L',
          waveform: 'i',
          pointsMm: [
            [31, 19.5, 0],
            [39, 19.5, 0],
            [39, 24.5, 0],
            [31, 24.5, 0],
          ],
          ...more,
        },
        ...(second
          ? [
              {
                name: 'M',
                waveform: 'i',
                pointsMm: [
                  [31, 19.5, 0],
                  [39, 19.5, 0],
                  [39, 24.5, 0],
                  [31, 24.5, 0],
                ] as [number, number, number][],
                ...second,
              },
            ]
          : []),
      ],
    });
  const at = (file: ReturnType<typeof loops>) => pointAt(estimateOf(file, { site: { measuredFrom: 'center' } }), 186e6);
  const one = at(loops());

  it('flat over the ground: Ott’s formula with the two rays by hand', () => {
    // E_φ ∝ ρ/d of each ray (the loop's pattern), the reflected one reversed: |e^(−jkd1)ρ/d1² − e^(−jkd2)ρ/d2²|, maximum over 1–4 m.
    const k = (2 * Math.PI * 186e6) / SPEED_OF_LIGHT_M_PER_S;
    let highest = 0;
    for (let h = 1; h <= 4; h += 0.002) {
      const [d1, d2] = [Math.hypot(3, h - 0.8), Math.hypot(3, h + 0.8)];
      const re = (3 / d1 ** 2) * Math.cos(k * d1) - (3 / d2 ** 2) * Math.cos(k * d2);
      const im = (3 / d1 ** 2) * Math.sin(k * d1) - (3 / d2 ** 2) * Math.sin(k * d2);
      highest = Math.max(highest, Math.hypot(re, im));
    }
    const rms = (131.69e-16 * 186e6 ** 2 * AREA_M2 * CURRENT_A * highest) / Math.SQRT2;
    // Without near terms, 1/(2 (kd)²) = 0.4 %: 0.03 dB.
    expect(Math.abs(one.levelDbuvPerM - 20 * Math.log10(rms / 1e-6))).toBeLessThan(0.05);
    expect(one.polarization).toBe('horizontal');
    expect(one.contributors).toEqual([
      { kind: 'loop', name: 'L', levelDbuvPerM: one.levelDbuvPerM, viaDbuvPerM: { loop: one.levelDbuvPerM } },
    ]);
  });

  it('keeps its level inverted, late, or drawn from another corner; two add or cancel', () => {
    const db = (file: ReturnType<typeof loops>) => at(file).levelDbuvPerM - one.levelDbuvPerM;
    expect(db(loops({ inverted: true }))).toBeCloseTo(0, 6);
    expect(db(loops({ delayNs: 1.234 }))).toBeCloseTo(0, 6);
    expect(
      db(
        loops({
          pointsMm: [
            [39, 24.5, 0],
            [31, 24.5, 0],
            [31, 19.5, 0],
            [39, 19.5, 0],
            [39, 24.5, 0],
          ],
        }),
      ),
    ).toBeCloseTo(0, 6);
    expect(db(loops({}, {}))).toBeCloseTo(20 * Math.log10(2), 6);
    expect(db(loops({}, { inverted: true }))).toBeLessThan(-200);
    expect(
      db(
        loops(
          {},
          {
            pointsMm: [
              [31, 24.5, 0],
              [39, 24.5, 0],
              [39, 19.5, 0],
              [31, 19.5, 0],
            ],
          },
        ),
      ),
    ).toBeLessThan(-200);
    expect(db(loops({}, { delayNs: 0.5e3 / 186 }))).toBeLessThan(-200);
  });
});
