import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { imageOf, type LinearElement } from '../../app/fields/linear-element.ts';
import { ETA0_OHM, MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { fieldOf, radiatedPowerW } from '../../app/validate/radiator.ts';
import { along, cross, distance, plus, size, unit, type Vector } from './fields.ts';

const RUNS = { seed: 20_240_917, numRuns: 40 };
const coordinate = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true });
const point = (low: number, high: number) =>
  fc.tuple(coordinate(low, high), coordinate(low, high), coordinate(low, high));
const frequency = coordinate(30e6, 1e9);
/** Elements of 5–90 mm with different phasors at their ends, within `low`–`high` of the origin. */
const element = (low: number, high: number): fc.Arbitrary<LinearElement> =>
  fc
    .tuple(
      point(low, high),
      point(-0.05, 0.05),
      coordinate(-1, 1),
      coordinate(-1, 1),
      coordinate(-1, 1),
      coordinate(-1, 1),
    )
    .filter(([, step, re, im]) => Math.hypot(...step) > 0.005 && Math.hypot(re, im) > 0.1)
    .map(([fromM, step, startRe, startIm, endRe, endIm]) => ({
      fromM,
      toM: [fromM[0] + step[0], fromM[1] + step[1], fromM[2] + step[2]],
      startRe,
      startIm,
      endRe,
      endIm,
    }));

describe('laws the element field obeys', () => {
  it('reciprocity: ∫E₁·I₂dl = ∫E₂·I₁dl', () => {
    fc.assert(
      fc.property(element(-0.2, 0.2), element(0.5, 0.9), frequency, (one, other, frequencyHz) => {
        const forth = reaction(one, other, frequencyHz);
        const back = reaction(other, one, frequencyHz);
        // Both sides are integrals by the same order of quadrature; cancellation in the scalar product is left a scale.
        expect(distance(forth.value, back.value)).toBeLessThan(1e-4 * Math.max(forth.scale, back.scale));
      }),
      RUNS,
    );
  });

  it('Faraday and Ampère: curl E = −jωµ0 H and curl H = jωε0 E off the sources', () => {
    fc.assert(
      fc.property(element(-0.05, 0.05), point(0.25, 0.8), frequency, (source, observerM, frequencyHz) => {
        const omega = 2 * Math.PI * frequencyHz;
        const here = fieldOf([source], frequencyHz, observerM);
        const epsilon0 = 1 / (MU0_H_PER_M * SPEED_OF_LIGHT_M_PER_S ** 2);
        const curls = curl(source, frequencyHz, observerM);
        for (let axis = 0; axis < 3; axis++) {
          const [re, im] = [2 * axis, 2 * axis + 1];
          const h = { re: omega * MU0_H_PER_M * here.magnetic[im]!, im: -omega * MU0_H_PER_M * here.magnetic[re]! };
          const e = { re: -omega * epsilon0 * here.electric[im]!, im: omega * epsilon0 * here.electric[re]! };
          // Central differences of 1e-4 m: (δ/R)² = 1e-7 and (kδ)²; rounding 1e-12/1e-4. Scaled to all components.
          const electricScale = omega * MU0_H_PER_M * Math.hypot(...here.magnetic) + Math.hypot(...here.electric) / 0.3;
          const magneticScale = omega * epsilon0 * Math.hypot(...here.electric) + Math.hypot(...here.magnetic) / 0.3;
          expect(distance({ re: curls.electric[re]!, im: curls.electric[im]! }, h)).toBeLessThan(3e-5 * electricScale);
          expect(distance({ re: curls.magnetic[re]!, im: curls.magnetic[im]! }, e)).toBeLessThan(3e-5 * magneticScale);
        }
      }),
      RUNS,
    );
  });

  it('far away E ⊥ H ⊥ n and E/H = η0', () => {
    fc.assert(
      fc.property(element(-0.05, 0.05), point(-1, 1), frequency, (source, towards, frequencyHz) => {
        fc.pre(Math.hypot(...towards) > 0.2);
        const n = unit(towards);
        const dipole = unit([
          source.toM[0] - source.fromM[0],
          source.toM[1] - source.fromM[1],
          source.toM[2] - source.fromM[2],
        ]);
        fc.pre(Math.hypot(...cross(n, dipole)) > 0.2);
        fc.pre(Math.hypot(source.startRe + source.endRe, source.startIm + source.endIm) > 0.1);
        const rM = 2000;
        const { electric, magnetic } = fieldOf([source], frequencyHz, [rM * n[0], rM * n[1], rM * n[2]]);
        const e = Math.hypot(...electric);
        const h = Math.hypot(...magnetic);
        // 1/(kR) = 8e-4 at 30 MHz enters squared; the source's offset 0.1 m/2000 m turns n by 5e-5.
        expect(Math.abs(e / h / ETA0_OHM - 1)).toBeLessThan(1e-5);
        expect(size(along(electric, n))).toBeLessThan(0.02 * e);
        expect(size(along(magnetic, n))).toBeLessThan(2e-3 * h);
        const right = cross(n, [1, 0, 0]);
        const up = Math.hypot(...right) > 0.1 ? unit(right) : unit(cross(n, [0, 1, 0]));
        // H = n × E / η0, component by component: the sign and phase too.
        const expected = along(electric, cross(up, n));
        const actual = along(magnetic, up);
        expect(distance({ re: actual.re * ETA0_OHM, im: actual.im * ETA0_OHM }, expected)).toBeLessThan(2e-3 * e);
      }),
      RUNS,
    );
  });

  it('power through a sphere does not depend on its radius', () => {
    fc.assert(
      fc.property(fc.array(element(-0.1, 0.1), { minLength: 1, maxLength: 3 }), frequency, (sources, frequencyHz) => {
        const nearW = radiatedPowerW(sources, frequencyHz, 0.6);
        const midW = radiatedPowerW(sources, frequencyHz, 1.7);
        const farW = radiatedPowerW(sources, frequencyHz, 40);
        // Three sources may cancel; the reactive power near by is at most some hundred times the radiated one.
        expect(Math.abs(midW / farW - 1)).toBeLessThan(1e-4);
        expect(Math.abs(nearW / farW - 1)).toBeLessThan(2e-3);
      }),
      { ...RUNS, numRuns: 12 },
    );
  });

  it('with its image it has no tangential E and no normal H on the ground plane', () => {
    fc.assert(
      fc.property(element(0.2, 1.2), point(-3, 3), frequency, (source, place, frequencyHz) => {
        const on: Vector = [place[0], place[1], 0];
        const own = fieldOf([source], frequencyHz, on);
        const both = fieldOf([source, imageOf(source)], frequencyHz, on);
        const e = Math.hypot(...own.electric);
        const h = Math.hypot(...own.magnetic);
        expect(size(along(both.electric, [1, 0, 0])) + size(along(both.electric, [0, 1, 0]))).toBeLessThan(1e-10 * e);
        expect(size(along(both.magnetic, [0, 0, 1]))).toBeLessThan(1e-10 * h);
        // And the other components are doubled, not lost.
        expect(distance(along(both.electric, [0, 0, 1]), twice(along(own.electric, [0, 0, 1])))).toBeLessThan(
          1e-10 * e,
        );
        expect(distance(along(both.magnetic, [1, 0, 0]), twice(along(own.magnetic, [1, 0, 0])))).toBeLessThan(
          1e-10 * h,
        );
      }),
      RUNS,
    );
  });
});

const twice = ({ re, im }: { re: number; im: number }) => ({ re: 2 * re, im: 2 * im });

/** ∫ E of `source` · I dl over `receiver`, with Simpson's rule on 20 intervals, and the scale of its summands. */
function reaction(source: LinearElement, receiver: LinearElement, frequencyHz: number) {
  const intervals = 20;
  let value = { re: 0, im: 0 };
  let scale = 0;
  const step: Vector = [
    receiver.toM[0] - receiver.fromM[0],
    receiver.toM[1] - receiver.fromM[1],
    receiver.toM[2] - receiver.fromM[2],
  ];
  for (let i = 0; i <= intervals; i++) {
    const s = i / intervals;
    const weight = (i === 0 || i === intervals ? 1 : i % 2 === 1 ? 4 : 2) / (3 * intervals);
    const at: Vector = [
      receiver.fromM[0] + s * step[0],
      receiver.fromM[1] + s * step[1],
      receiver.fromM[2] + s * step[2],
    ];
    const { electric } = fieldOf([source], frequencyHz, at);
    const e = along(electric, step);
    const re = receiver.startRe + s * (receiver.endRe - receiver.startRe);
    const im = receiver.startIm + s * (receiver.endIm - receiver.startIm);
    value = plus(value, { re: weight * (e.re * re - e.im * im), im: weight * (e.re * im + e.im * re) });
    scale += weight * Math.hypot(...electric) * Math.hypot(...step) * Math.hypot(re, im);
  }
  return { value, scale };
}

/** Curl of E and H by central differences, [x, y, z][re, im]. */
function curl(source: LinearElement, frequencyHz: number, observerM: Vector) {
  const deltaM = 1e-4;
  const shifted = (axis: number, sign: number) =>
    fieldOf([source], frequencyHz, observerM.map((v, i) => v + (i === axis ? sign * deltaM : 0)) as unknown as Vector);
  const sides = [0, 1, 2].map((axis) => ({ plus: shifted(axis, 1), minus: shifted(axis, -1) }));
  const curlOf = (kind: 'electric' | 'magnetic') =>
    Float64Array.from({ length: 6 }, (_, index) => {
      const axis = index >> 1;
      const [b, c] = [(axis + 1) % 3, (axis + 2) % 3];
      const derivative = (by: number, component: number) => {
        const at = 2 * component + (index & 1);
        return (sides[by]!.plus[kind][at]! - sides[by]!.minus[kind][at]!) / (2 * deltaM);
      };
      return derivative(b, c) - derivative(c, b);
    });
  return { electric: curlOf('electric'), magnetic: curlOf('magnetic') };
}
