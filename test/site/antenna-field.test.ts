import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addElementField, FIELD_STRIDE } from '../../app/fields/element-field.ts';
import { ElementCollector, type Radiator } from '../../app/fields/element-set.ts';
import { addLinearElementField, imageOf, type LinearElement } from '../../app/fields/linear-element.ts';
import { fieldAtAntenna, unitFieldsAtAntenna } from '../../app/site/scan.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';

type Vector = [number, number, number];

const radiatorOf = (
  places: readonly Vector[],
  vectors: readonly Vector[],
  currents: readonly [number, number][],
): Radiator => {
  const collector = new ElementCollector();
  for (const [i, place] of places.entries()) collector.add(place, vectors[i]!);
  return { elements: collector.finish(), currentsA: Float64Array.from(currents.flat()) };
};

const within = (size: number) => fc.double({ min: -size, max: size, noNaN: true });
const place = fc.tuple(within(1.2), within(1.2), fc.double({ min: 0.01, max: 2, noNaN: true }));
const vector = fc.tuple(within(0.02), within(0.02), within(0.02));
const setups = fc.record({
  frequencyHz: fc.double({ min: 30e6, max: 6e9, noNaN: true }),
  angleRad: fc.double({ min: 0, max: 6.28, noNaN: true }),
  heightM: fc.double({ min: 1, max: 4, noNaN: true }),
  site: fc.constantFrom('ground-plane' as const, 'free-space' as const),
  at: place,
  along: vector,
  current: fc.tuple(within(1), within(1)),
});
const SCAN_RADIUS_M = 3.7;

describe('field at the antenna', () => {
  it('is φ and z of the element field, plus that of the image element on the ground-plane site', () => {
    fc.assert(
      fc.property(setups, ({ frequencyHz, angleRad, heightM, site, at, along, current }) => {
        const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
        const observerM: Vector = [SCAN_RADIUS_M * Math.cos(angleRad), SCAN_RADIUS_M * Math.sin(angleRad), heightM];
        const field = new Float64Array(FIELD_STRIDE);
        const add = (p: Vector, v: Vector) => {
          const re = v.map((part) => part * current[0]) as Vector;
          const im = v.map((part) => part * current[1]) as Vector;
          addElementField(field, null, 0, kPerM, observerM[0] - p[0], observerM[1] - p[1], observerM[2] - p[2], re, im);
        };
        add(at, along);
        // Horizontal current reversed, vertical kept (physics 7).
        if (site === 'ground-plane') add([at[0], at[1], -at[2]], [-along[0], -along[1], along[2]]);
        const request = { kPerM, scanRadiusM: SCAN_RADIUS_M, site, box: null };
        const radiator = radiatorOf([at], [along], [current]);
        const [phiRe, phiIm] = fieldAtAntenna([radiator], 'horizontal', angleRad, heightM, request);
        const [zRe, zIm] = fieldAtAntenna([radiator], 'vertical', angleRad, heightM, request);
        const size = Math.hypot(...field) + 1e-30;
        const expected = [
          field[2]! * Math.cos(angleRad) - field[0]! * Math.sin(angleRad),
          field[3]! * Math.cos(angleRad) - field[1]! * Math.sin(angleRad),
          field[4]!,
          field[5]!,
        ];
        // sin and cos of the kernel hold 1e-11; kR up to 700 rad costs two digits.
        for (const [i, actual] of [phiRe, phiIm, zRe, zIm].entries()) {
          expect(Math.abs(actual - expected[i]!)).toBeLessThan(1e-8 * size);
        }
      }),
      { numRuns: 300, seed: 20261205 },
    );
  });

  it('reciprocity: a short dipole at the antenna makes the same field along the source', () => {
    fc.assert(
      fc.property(setups, ({ frequencyHz, angleRad, heightM, site, at, along }) => {
        const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
        const request = { kPerM, scanRadiusM: SCAN_RADIUS_M, site, box: null };
        for (const component of ['horizontal', 'vertical'] as const) {
          const [re, im] = fieldAtAntenna([radiatorOf([at], [along], [[1, 0]])], component, angleRad, heightM, request);
          const unit: Vector = component === 'vertical' ? [0, 0, 1] : [-Math.sin(angleRad), Math.cos(angleRad), 0];
          const there: Vector = [SCAN_RADIUS_M * Math.cos(angleRad), SCAN_RADIUS_M * Math.sin(angleRad), heightM];
          const shortM = 1e-5;
          const dipole: LinearElement = {
            fromM: there.map((c, i) => c - (unit[i]! * shortM) / 2) as Vector,
            toM: there.map((c, i) => c + (unit[i]! * shortM) / 2) as Vector,
            startRe: 1 / shortM,
            startIm: 0,
            endRe: 1 / shortM,
            endIm: 0,
          };
          const field = new Float64Array(FIELD_STRIDE);
          for (const source of site === 'ground-plane' ? [dipole, imageOf(dipole)] : [dipole]) {
            addLinearElementField(field, null, 0, kPerM, at, source);
          }
          const dot = (offset: number) => along.reduce((sum, part, i) => sum + part * field[2 * i + offset]!, 0);
          const size = Math.hypot(...field) * Math.max(1e-9, Math.hypot(...along));
          // (kL)²/24 = 7e-8 at 6 GHz.
          expect(Math.hypot(re - dot(0), im - dot(1))).toBeLessThan(1e-6 * size);
        }
      }),
      { numRuns: 100, seed: 20261206 },
    );
  });

  it('of a set is the sum of its elements’ fields for 1 A, weighed with their currents', () => {
    const places: Vector[] = [
      [0.1, -0.2, 0.8],
      [-0.3, 0.05, 0.81],
      [0.02, 0.4, 0.3],
    ];
    const vectors: Vector[] = [
      [0.01, 0, 0.002],
      [0, -0.02, 0],
      [0.003, 0.004, 0.03],
    ];
    const currents: [number, number][] = [
      [0.3, -0.1],
      [-0.2, 0.5],
      [0.7, 0.4],
    ];
    const request = { kPerM: 7.3, scanRadiusM: 3.2, site: 'ground-plane', box: null } as const;
    const radiator = radiatorOf(places, vectors, currents);
    for (const component of ['horizontal', 'vertical'] as const) {
      const units = unitFieldsAtAntenna(radiator.elements, component, 1.1, 2.3, request);
      let [re, im] = [0, 0];
      for (const [i, [cRe, cIm]] of currents.entries()) {
        re += units[2 * i]! * cRe - units[2 * i + 1]! * cIm;
        im += units[2 * i]! * cIm + units[2 * i + 1]! * cRe;
      }
      const field = fieldAtAntenna([radiator], component, 1.1, 2.3, request);
      expect(Math.hypot(field[0] - re, field[1] - im)).toBeLessThan(1e-12 * Math.hypot(re, im));
    }
  });
});
