import { describe, expect, it } from 'vitest';
import type { Point3M } from '../../app/board/board.ts';
import { elementsAlong } from '../../app/emitters/straight-elements.ts';
import type { Radiator } from '../../app/fields/element-set.ts';
import { cylinderPlan } from '../../app/site/cylinder-field.ts';
import { fieldAtAntenna, type ScanRequest, scanMaxima } from '../../app/site/scan.ts';
import { type SiteKind, TABLE_HEIGHT_M } from '../../app/site/site.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';

const FRAME = { orientation: 'flat', centreXM: 0, centreYM: 0, centreZM: 0, lowestYM: 0 } as const;

/** A wire with a standing wave, sin k(L − s). */
function wire(pointsM: readonly Point3M[], frequencyHz: number): Radiator {
  const { elements, alongM, lengthM } = elementsAlong(FRAME, pointsM, frequencyHz);
  const k = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
  return { elements, currentsA: Float64Array.from([...alongM].flatMap((s) => [Math.sin(k * (lengthM - s)), 0])) };
}

const requestOf = (frequencyHz: number, scanRadiusM: number, site: SiteKind): ScanRequest => ({
  kPerM: (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
  scanRadiusM,
  site,
  box: null,
});

/** Highest power of a plain scan, 2° by 10 cm. */
function plainScan(radiator: Radiator, component: 'horizontal' | 'vertical', request: ScanRequest): number {
  let highest = 0;
  for (let a = 0; a < 180; a++) {
    for (let h = 0; h <= 30; h++) {
      const [re, im] = fieldAtAntenna([radiator], component, (Math.PI * a) / 90, 1 + h / 10, request);
      highest = Math.max(highest, re * re + im * im);
    }
  }
  return highest;
}

const cases: [what: string, pointsM: Point3M[], frequencyHz: number, scanRadiusM: number, site: SiteKind][] = [
  [
    '1.5 m cable',
    [
      [0.03, 0.02, 0],
      [1.5, 0.3, 0],
    ],
    470e6,
    4.53,
    'ground-plane',
  ],
  [
    'cable down to the ground',
    [
      [0.03, 0, 0],
      [0.5, 0.1, 0],
      [0.5, 0.1, -TABLE_HEIGHT_M],
    ],
    220e6,
    3.5,
    'ground-plane',
  ],
  [
    'cable close to the antenna',
    [
      [0, 0, 0],
      [2.3, 0.4, 0],
    ],
    160e6,
    3,
    'ground-plane',
  ],
  [
    'tall wire beside the axis',
    [
      [0.1, 0, 0],
      [0.1, 0, 2.6],
    ],
    310e6,
    3.1,
    'ground-plane',
  ],
  [
    'tall wire in free space',
    [
      [0.2, 0.1, -2],
      [0.2, 0.1, 3],
    ],
    250e6,
    3.2,
    'free-space',
  ],
];

describe('the band-limited scan of large sources', () => {
  it.each(cases)('%s: finds the maximum of the plain scan', (_, pointsM, frequencyHz, scanRadiusM, site) => {
    const radiator = wire(pointsM, frequencyHz);
    const request = requestOf(frequencyHz, scanRadiusM, site);
    const maxima = scanMaxima([[radiator]], request);
    for (const component of ['horizontal', 'vertical'] as const) {
      const found = maxima[component];
      const [re, im] = fieldAtAntenna([radiator], component, found.angleRad, found.heightM, request);
      const exact = re * re + im * im;
      const highest = plainScan(radiator, component, request);
      // A wire along z has no horizontal field: rounding against rounding says nothing.
      if (highest < 1e-20 * (maxima.horizontal.power + maxima.vertical.power)) continue;
      expect(Math.abs(10 * Math.log10(found.power / exact)), `${component} at the maximum`).toBeLessThan(0.01);
      expect(10 * Math.log10(highest / exact), `${component} elsewhere`).toBeLessThan(0.01);
    }
  });

  it('a wire as tall as the antenna is far still needs few angles: they follow its distance from the axis', () => {
    const frequencyHz = 100e6;
    const scanRadiusM = 3.05;
    const radiator = wire(
      [
        [0.05, 0, -3.049],
        [0.05, 0, 3.049],
      ],
      frequencyHz,
    );
    const { kPerM, site } = requestOf(frequencyHz, scanRadiusM, 'free-space');
    // Bucci and Franceschetti: about k times the radius, plus a few; 2.1/m · 0.05 m here.
    expect(cylinderPlan(kPerM, scanRadiusM, [radiator], site).order).toBeLessThan(12);
  });
});

describe('ties', () => {
  it.each([60e6, 700e6])('a wire on the axis looks the same from everywhere: angle 0 (%f Hz)', (frequencyHz) => {
    const radiator = wire(
      [
        [0, 0, 0.1],
        [0, 0, -0.7],
      ],
      frequencyHz,
    );
    const { vertical } = scanMaxima([[radiator]], requestOf(frequencyHz, 3, 'ground-plane'));
    expect(vertical.angleRad).toBe(0);
  });

  it('of two equal maxima the smaller angle', () => {
    // Symmetric about the y axis: what is at φ is at 180° − φ.
    const radiator = wire(
      [
        [-0.2, 0.1, 0],
        [0.2, 0.1, 0],
      ],
      400e6,
    );
    const even: Radiator = {
      elements: radiator.elements,
      currentsA: radiator.currentsA.map((_, i) => (i % 2 === 0 ? 1 : 0)),
    };
    const { vertical, horizontal } = scanMaxima([[even]], requestOf(400e6, 3.3, 'ground-plane'));
    const quarter = Math.PI / 2;
    for (const { angleRad } of [vertical, horizontal])
      expect(angleRad <= quarter + 1e-6 || angleRad >= 3 * quarter - 1e-6).toBe(true);
  });
});
