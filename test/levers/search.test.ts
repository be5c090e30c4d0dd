import fc from 'fast-check';
import { expect, test } from 'vitest';
import { AngleProfile } from '../../app/levers/angle-profile.ts';
import { ascend, type Jet } from '../../app/levers/ascend.ts';
import { isEqual, isSameShape } from '../../app/levers/domain.ts';
import { HeightProfile } from '../../app/levers/height-profile.ts';
import { COMPONENTS, KeptField } from '../../app/levers/kept-field.ts';
import { keptMaximum } from '../../app/levers/kept-maximum.ts';
import type { Component } from '../../app/site/power-map.ts';
import { fieldsAtAntenna, type ScanRequest, scanMaxima } from '../../app/site/scan.ts';
import { expectClose } from '../support/expect-close.ts';

/** Two unit excitations: a few elements of a table-top thing each, with a cable's worth of height. */
const setOf = (seed: number) => {
  const places = Array.from({ length: 7 }, (_, i) => [0, 1, 2].map((axis) => Math.sin(seed + 3 * i + axis)));
  return {
    elements: {
      count: places.length,
      positionsM: Float64Array.from(places.flatMap(([x, y, z]) => [0.15 * x!, 0.15 * y!, 0.8 + 0.35 * z!])),
      vectorsM: Float64Array.from(places.flatMap(([x, y, z]) => [0.02 * y!, 0.02 * z!, 0.02 * x!])),
    },
    currentsA: Float64Array.from({ length: 14 }, (_, i) => Math.cos(seed * i + i * i)),
  };
};
const units = [[setOf(1)], [setOf(2)]];
const requestAt = (hz: number, site: ScanRequest['site']): ScanRequest => ({
  kPerM: (2 * Math.PI * hz) / 299792458,
  scanRadiusM: 3.2,
  site,
  box: null,
});
/** Two domains: one of both units, one of the second alone. */
const domains = [Float64Array.of(1, 0.5, -0.7, 0.2), Float64Array.of(0, 0, 0.3, -1.1)];
const mixed = domains.map((amplitudes) =>
  units.flatMap((unit, u) =>
    unit.map(({ elements, currentsA }) => ({
      elements,
      currentsA: Float64Array.from(currentsA, (_, i) => {
        const [re, im] = [amplitudes[2 * u]!, amplitudes[2 * u + 1]!];
        const [cRe, cIm] = [currentsA[i - (i % 2)]!, currentsA[i - (i % 2) + 1]!];
        return i % 2 === 0 ? re * cRe - im * cIm : re * cIm + im * cRe;
      }),
    })),
  ),
);

const CASES: readonly [hz: number, site: ScanRequest['site']][] = [
  [60e6, 'ground-plane'],
  [480e6, 'ground-plane'],
  [930e6, 'ground-plane'],
  [1700e6, 'free-space'],
];

test.each(CASES)('power on the grid is the plain sum’s at %d Hz, %s', (hz, site) => {
  const request = requestAt(hz, site);
  const field = new KeptField(units, request);
  for (const component of COMPONENTS) {
    const powers = field.powerOnGrid(component, domains);
    const most = Math.max(...powers);
    const { angleCount, heightCount, stepRad, stepM } = field.grid;
    expect(1 + (heightCount - 1) * stepM).toBeCloseTo(4, 12);
    for (let at = 0; at < powers.length; at += 17) {
      const angle = (at % angleCount) * stepRad;
      const height = 1 + Math.floor(at / angleCount) * stepM;
      const plain = fieldsAtAntenna(mixed, component, angle, height, request).flat();
      // The sampling of the scan promises about a thousandth of the largest field.
      expect(Math.abs(powers[at]! - plain.reduce((sum, v) => sum + v * v, 0)) / most).toBeLessThan(2e-3);
    }
  }
});

test.each(CASES)('the maximum is where the scan finds it, at %d Hz, %s', (hz, site) => {
  const request = requestAt(hz, site);
  const field = new KeptField(units, request);
  const scanned = scanMaxima(mixed, request);
  for (const component of COMPONENTS) {
    const found = keptMaximum(field, component, domains);
    const powerAt = ({ angleRad, heightM }: { angleRad: number; heightM: number }) =>
      fieldsAtAntenna(mixed, component, angleRad, heightM, request)
        .flat()
        .reduce((sum, value) => sum + value * value, 0);
    const because = 'two searches of one interpolant: equal but for the flat top, whichever of two equal tops is taken';
    expectClose(powerAt(found), powerAt(scanned[component]), { rel: 1e-6, because });
  }
});

/** Value and derivatives against difference quotients of the value. */
function expectDerivatives(jetAt: (at: number, out: Jet) => void, at: number): void {
  const step = 1e-4;
  const [low, here, high] = [at - step, at, at + step].map((place) => {
    const jet = new Float64Array(3);
    jetAt(place, jet);
    return jet;
  }) as [Jet, Jet, Jet];
  const size = Math.abs(here[0]!) + Math.abs(here[1]!) + Math.abs(here[2]!);
  expect(Math.abs((high[0]! - low[0]!) / (2 * step) - here[1]!) / size).toBeLessThan(1e-5);
  expect(Math.abs((high[1]! - low[1]!) / (2 * step) - here[2]!) / size).toBeLessThan(1e-4);
}

test('profiles along angle and height: power by the plain sum, derivatives by differences', () => {
  for (const [hz, site] of CASES) {
    const request = requestAt(hz, site);
    const field = new KeptField(units, request);
    const { plan } = field;
    for (const component of COMPONENTS) {
      const samples = field.mixtures(component, domains);
      const byHeight = new HeightProfile(plan, component, domains.length);
      const angles = 2 * plan.order + 1;
      const width = 2 * plan.heightsM.length;
      const columnAt = (all: Float64Array, a: number) =>
        Float64Array.from(
          { length: plan.partCount * width },
          (_, i) => all[(Math.floor(i / width) * angles + a) * width + (i % width)]!,
        );
      const a = 3;
      for (const [d, own] of samples.entries()) byHeight.set(d, columnAt(own, a));
      const jet = new Float64Array(3);
      for (const heightM of [1, 1.7, 2.9, 4]) {
        byHeight.jetAt(heightM, jet);
        const plain = powerOf(component, (2 * Math.PI * a) / angles, heightM, request);
        expect(Math.abs(jet[0]! / plain - 1)).toBeLessThan(0.02);
        expectDerivatives((at, out) => byHeight.jetAt(at, out), heightM);
      }
    }
  }
});

const powerOf = (component: Component, angleRad: number, heightM: number, request: ScanRequest): number =>
  fieldsAtAntenna(mixed, component, angleRad, heightM, request)
    .flat()
    .reduce((sum, value) => sum + value * value, 0);

test('an angle profile is the trigonometric polynomial of its samples', () => {
  // g = 2 + 3e^{jφ} − j e^{−2jφ} and h = e^{2jφ}: P = |g|² + |h|² by hand.
  const order = 2;
  const profile = new AngleProfile(order, 2);
  const g = (phi: number): [number, number] => [
    2 + 3 * Math.cos(phi) - Math.sin(2 * phi),
    3 * Math.sin(phi) - Math.cos(2 * phi),
  ];
  const h = (phi: number): [number, number] => [Math.cos(2 * phi), Math.sin(2 * phi)];
  const nodes = Array.from({ length: 2 * order + 1 }, (_, i) => (2 * Math.PI * i) / (2 * order + 1));
  profile.set(0, Float64Array.from(nodes.flatMap(g)));
  profile.set(1, Float64Array.from(nodes.flatMap(h)));
  const jet = new Float64Array(3);
  for (const phi of [0, 0.3, 2, 5.9, -1]) {
    profile.jetAt(phi, jet);
    expect(jet[0]).toBeCloseTo(g(phi)[0] ** 2 + g(phi)[1] ** 2 + 1, 10);
    expectDerivatives((at, out) => profile.jetAt(at, out), phi);
  }
});

test('ascend finds the top of a hill inside, and the end it rises to', () => {
  const hill = (top: number) => (at: number, out: Jet) => {
    out[0] = Math.cos(at - top);
    out[1] = -Math.sin(at - top);
    out[2] = -Math.cos(at - top);
  };
  fc.assert(
    fc.property(
      fc.double({ min: -1, max: 1, noNaN: true }),
      fc.double({ min: -0.99, max: 0.99, noNaN: true }),
      (top, start) => {
        expect(ascend(hill(top), -1, start, 1, new Float64Array(3))).toBeCloseTo(top, 4);
      },
    ),
    { seed: 20261206, numRuns: 100 },
  );
  expect(ascend(hill(2.5), -1, 0.2, 1, new Float64Array(3))).toBeCloseTo(1, 4);
  expect(ascend(hill(-2.5), -1, 0.2, 1, new Float64Array(3))).toBeCloseTo(-1, 4);
});

test('the same shape: every domain by a factor of one magnitude', () => {
  const one = domains.map((amplitudes, i) => ({ name: `d${i}`, amplitudes, sources: [i] }));
  const times = (factors: readonly [number, number][]) =>
    one.map(({ name, amplitudes, sources }, d) => {
      const [re, im] = factors[d]!;
      const scaled = Float64Array.from(amplitudes, (value, i) =>
        i % 2 === 0 ? re * value - im * amplitudes[i + 1]! : re * value + im * amplitudes[i - 1]!,
      );
      return { name, amplitudes: scaled, sources };
    });
  expect(
    isEqual(
      one,
      times([
        [1, 0],
        [1, 0],
      ]),
    ),
  ).toBe(true);
  expect(
    isEqual(
      one,
      times([
        [1, 0],
        [0, 1],
      ]),
    ),
  ).toBe(false);
  expect(
    isSameShape(
      one,
      times([
        [0.6, 0.8],
        [-1, 0],
      ]),
    ),
  ).toBe(true);
  expect(
    isSameShape(
      one,
      times([
        [0.3, 0.4],
        [0, 0.5],
      ]),
    ),
  ).toBe(true);
  expect(
    isSameShape(
      one,
      times([
        [0.3, 0.4],
        [0, 0.51],
      ]),
    ),
  ).toBe(false);
  expect(isSameShape(one, one.slice(1))).toBe(false);
  const bent = times([
    [1, 0],
    [1, 0],
  ]);
  bent[0]!.amplitudes[2]! += 1e-6;
  expect(isSameShape(one, bent)).toBe(false);
});
