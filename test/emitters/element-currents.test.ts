import fc from 'fast-check';
import { describe, it } from 'vitest';
import { addElementCurrents, type CurrentRule, packRules } from '../../app/emitters/element-currents.ts';
import type { NetworkResponse } from '../../app/network/network.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { expectClose } from '../support/expect-close.ts';

const Z0_OHM = 60;
const LENGTH_M = 0.12;
const ATTENUATION_NP_PER_M = 0.8;

type Pair = readonly [re: number, im: number];
const times = (a: Pair, b: Pair): Pair => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
const plus = (a: Pair, b: Pair): Pair => [a[0] + b[0], a[1] + b[1]];
/** e^(∓γ s). */
const turn = (gamma: Pair, s: number): Pair => [
  Math.exp(gamma[0] * s) * Math.cos(gamma[1] * s),
  Math.exp(gamma[0] * s) * Math.sin(gamma[1] * s),
];

const part = fc.double({ min: -1, max: 1, noNaN: true });
const wave = fc.tuple(part, part);

function response(gamma: Pair, forward: Pair, backward: Pair): NetworkResponse {
  const empty = new Float64Array(0);
  return {
    nodeVoltages: empty,
    forward: Float64Array.from([9, 9, ...forward]),
    backward: Float64Array.from([9, 9, ...backward]),
    branchCurrents: empty,
    driveCurrents: empty,
    loadCurrents: empty,
    gamma: Float64Array.from([0, 0, ...gamma]),
  };
}

/** Current of one element that follows one rule; section 1 of two. */
function currentOf(rule: CurrentRule, answer: NetworkResponse, frequencyHz: number, phasor: Pair): Pair {
  const sections = [
    { lengthM: 0.01, z0Ohm: 7 },
    { lengthM: LENGTH_M, z0Ohm: Z0_OHM },
  ];
  const out = new Float64Array(2).fill(0.25);
  addElementCurrents(packRules([rule]), answer, sections, frequencyHz, phasor[0], phasor[1], out);
  return [out[0]! - 0.25, out[1]! - 0.25];
}

const close = (actual: Pair, expected: Pair, because: string) => {
  for (const axis of [0, 1] as const) expectClose(actual[axis], expected[axis], { rel: 1e-11, floor: 1, because });
};

describe('currents of elements from the waves of their section', () => {
  it('along, shunt and ends: I = I⁺e^(−γs) + I⁻e^(γs), jωC′V, and what leaves a node', () => {
    fc.assert(
      fc.property(
        wave,
        wave,
        wave,
        fc.double({ min: 0, max: LENGTH_M, noNaN: true }),
        (forward, backward, phasor, atM) => {
          const frequencyHz = 350e6;
          const omega = 2 * Math.PI * frequencyHz;
          const gamma: Pair = [ATTENUATION_NP_PER_M, (omega * Math.sqrt(3.1)) / SPEED_OF_LIGHT_M_PER_S];
          const answer = response(gamma, forward, backward);
          const minusGamma: Pair = [-gamma[0], -gamma[1]];
          const there = (s: number) => times(forward, turn(minusGamma, s));
          const back = (s: number) => times(backward, turn(gamma, s));
          const current = (s: number) => plus(there(s), back(s));

          const along = currentOf({ kind: 'along', section: 1, atM, factor: -0.6 }, answer, frequencyHz, phasor);
          close(along, times(times(current(atM), phasor), [-0.6, 0]), 'rounding');

          const farads = 4e-12;
          const voltage = times(plus(there(atM), times(back(atM), [-1, 0])), [Z0_OHM, 0]);
          const shunt = currentOf({ kind: 'shunt', section: 1, atM, factor: farads }, answer, frequencyHz, phasor);
          close(shunt, times(times(voltage, phasor), [0, omega * farads]), 'rounding');

          const ends = currentOf(
            {
              kind: 'ends',
              terms: [
                { section: 1, isAtB: false, factor: 2 },
                { section: 1, isAtB: true, factor: 3 },
              ],
            },
            answer,
            frequencyHz,
            phasor,
          );
          // Into the section at A is I(0); into it at B is −I(L).
          close(ends, times(plus(times(current(0), [2, 0]), times(current(LENGTH_M), [-3, 0])), phasor), 'rounding');
        },
      ),
      { numRuns: 100, seed: 20261211 },
    );
  });

  it('charge is kept: −dI/ds = jω C′ V along a lossless line', () => {
    // γ I⁺ terms: dI/ds = −γ (I⁺e^(−γs) − I⁻e^(γs)) = −(γ/Z0) V; lossless γ/Z0 = jωC′ with C′ = √ε_eff/(Z0 c).
    const frequencyHz = 250e6;
    const k = (2 * Math.PI * frequencyHz * Math.sqrt(2.7)) / SPEED_OF_LIGHT_M_PER_S;
    const answer = response([0, k], [0.3, -0.2], [-0.4, 0.9]);
    const stepM = 1e-5;
    const at = (s: number) => currentOf({ kind: 'along', section: 1, atM: s, factor: 1 }, answer, frequencyHz, [1, 0]);
    const [low, high] = [at(0.05 - stepM), at(0.05 + stepM)];
    const capacitanceFPerM = Math.sqrt(2.7) / (Z0_OHM * SPEED_OF_LIGHT_M_PER_S);
    const shunt = currentOf(
      { kind: 'shunt', section: 1, atM: 0.05, factor: capacitanceFPerM },
      answer,
      frequencyHz,
      [1, 0],
    );
    for (const axis of [0, 1] as const) {
      expectClose(-(high[axis] - low[axis]) / (2 * stepM), shunt[axis], {
        rel: 1e-6,
        floor: 1,
        because: '(k·step)²/6 = 1e-9, rounding of the difference 1e-11/step',
      });
    }
  });
});
