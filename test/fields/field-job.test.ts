import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addElementField, FIELD_STRIDE } from '../../app/fields/element-field.ts';
import { type FieldJob, parseFieldJob } from '../../app/fields/field-job.ts';
import { runFieldJob } from '../../app/fields/run-field-job.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';

type Vector = readonly [number, number, number];

/** The same element as 20 000 short pieces, each with its middle current (midpoint rule, formula 2.1 per piece). */
function finelySplit(job: FieldJob, observerM: Vector): { e: Float64Array; h: Float64Array } {
  const e = new Float64Array(FIELD_STRIDE);
  const h = new Float64Array(FIELD_STRIDE);
  const kPerM = (2 * Math.PI * job.frequenciesHz[0]!) / SPEED_OF_LIGHT_M_PER_S;
  const pieces = 20_000;
  for (const { fromM, toM, currentA, currentEndA = currentA } of job.elements) {
    for (let i = 0; i < pieces; i++) {
      const s = (i + 0.5) / pieces;
      const at = [0, 1, 2].map((axis) => fromM[axis]! + s * (toM[axis]! - fromM[axis]!));
      const re = (currentA[0] + s * (currentEndA[0] - currentA[0])) / pieces;
      const im = (currentA[1] + s * (currentEndA[1] - currentA[1])) / pieces;
      const dl = [0, 1, 2].map((axis) => toM[axis]! - fromM[axis]!);
      for (const isImage of job.ground === 'perfect' ? [false, true] : [false]) {
        const sign = isImage ? -1 : 1;
        const v: Vector = [sign * dl[0]!, sign * dl[1]!, dl[2]!];
        addElementField(
          e,
          h,
          0,
          kPerM,
          observerM[0] - at[0]!,
          observerM[1] - at[1]!,
          observerM[2] - sign * at[2]!,
          [re * v[0], re * v[1], re * v[2]],
          [im * v[0], im * v[1], im * v[2]],
        );
      }
    }
  }
  return { e, h };
}

const flat = (vector: readonly (readonly [number, number])[]) => vector.flat();

function relativeError(actual: readonly number[], expected: Float64Array): number {
  let difference = 0;
  let size = 0;
  for (const [i, value] of actual.entries()) {
    difference += (value - expected[i]!) ** 2;
    size += expected[i]! ** 2;
  }
  return Math.sqrt(difference / size);
}

describe('field job', () => {
  it('agrees with the finely split sum within 1e-4, from a tenth of the length away to 30 m, with and without ground', () => {
    // The split sum's own error is (piece/distance)² ≈ (L/20000 / 0.05 L)² = 1e-6; the adaptive rule allows about 1e-5.
    fc.assert(
      fc.property(
        fc.double({ min: Math.log(1e6), max: Math.log(3e9), noNaN: true }),
        fc.double({ min: Math.log(0.06), max: Math.log(30), noNaN: true }),
        fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.constantFrom('perfect' as const, 'none' as const),
        (logHz, logDistance, angle, along, ground) => {
          const fromM: Vector = [0.013, -0.02, 0.81];
          const toM: Vector = [0.113, 0.035, 0.87];
          const lengthM = Math.hypot(0.1, 0.055, 0.06);
          const distanceM = Math.exp(logDistance) * lengthM;
          const u = [0.1 / lengthM, 0.055 / lengthM, 0.06 / lengthM];
          const p = [-u[1]!, u[0]!, 0].map((value) => value / Math.hypot(u[0]!, u[1]!));
          const q = [u[1]! * p[2]! - u[2]! * p[1]!, u[2]! * p[0]! - u[0]! * p[2]!, u[0]! * p[1]! - u[1]! * p[0]!];
          const observer = [0, 1, 2].map(
            (axis) =>
              fromM[axis]! +
              along * (toM[axis]! - fromM[axis]!) +
              distanceM * (Math.cos(angle) * p[axis]! + Math.sin(angle) * q[axis]!),
          );
          const observerM: Vector = [observer[0]!, observer[1]!, Math.abs(observer[2]!)];
          const job: FieldJob = {
            format: 'quietboard-field',
            version: 1,
            frequenciesHz: [Math.exp(logHz)],
            ground,
            elements: [{ fromM: [...fromM], toM: [...toM], currentA: [0.7, -0.2], currentEndA: [-0.1, 0.4] }],
            observersM: [[...observerM]],
          };
          const field = runFieldJob(job).fields[0]!.observers[0]!;
          const { e, h } = finelySplit(job, observerM);
          expect(relativeError(flat(field.electricVPerM), e)).toBeLessThan(1e-4);
          expect(relativeError(flat(field.magneticAPerM), h)).toBeLessThan(1e-4);
        },
      ),
      { numRuns: 30, seed: 20261202 },
    );
  });

  it('two halves in line give the whole: the joint leaves no charge', () => {
    const whole = { fromM: [0, 0, 1], toM: [0.2, 0, 1], currentA: [1, 0], currentEndA: [0, 1] };
    const halves = [
      { fromM: [0, 0, 1], toM: [0.1, 0, 1], currentA: [1, 0], currentEndA: [0.5, 0.5] },
      { fromM: [0.1, 0, 1], toM: [0.2, 0, 1], currentA: [0.5, 0.5], currentEndA: [0, 1] },
    ];
    const base = {
      format: 'quietboard-field',
      version: 1,
      frequenciesHz: [50e6],
      ground: 'none',
      observersM: [[0.1, 0.02, 1.01]],
    };
    const one = runFieldJob(parseFieldJob({ ...base, elements: [whole] })).fields[0]!.observers[0]!;
    const two = runFieldJob(parseFieldJob({ ...base, elements: halves })).fields[0]!.observers[0]!;
    expect(relativeError(flat(one.electricVPerM), Float64Array.from(flat(two.electricVPerM)))).toBeLessThan(1e-5);
  });

  it('refuses a point on an element by name', () => {
    const job = parseFieldJob({
      format: 'quietboard-field',
      version: 1,
      frequenciesHz: [1e8],
      ground: 'none',
      elements: [{ fromM: [0, 0, 0], toM: [1, 0, 0], currentA: [1, 0] }],
      observersM: [[0.3, 0, 0]],
    });
    expect(() => runFieldJob(job)).toThrow(/observersM\[0\].*elements\[0\]/);
  });
});
