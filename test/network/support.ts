import { expect } from 'vitest';
import type { Network, NetworkResponse } from '../../app/network/network.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { abs, add, at, type C, exp, gammaOf, mul, sub } from '../support/dense-network.ts';

export const line = (z0Ohm: number, epsilonEff = 1, alphaNpPerM = 0) => ({
  z0Ohm,
  epsilonEff,
  alphaNpPerM: () => alphaNpPerM,
});

/** A network of one or more sections between numbered nodes; what is not given is empty. */
export const net = (nodeCount: number, parts: Partial<Network>): Network => ({
  nodeCount,
  sections: [],
  branches: [],
  drives: [],
  loads: [],
  ...parts,
});

/** Wavelength in a line, m. */
export const wavelengthM = (frequencyHz: number, epsilonEff = 1): number =>
  SPEED_OF_LIGHT_M_PER_S / (frequencyHz * Math.sqrt(epsilonEff));

/** I(s) and V(s) of a section from its waves, s from node A. */
export function lineAt(
  network: Network,
  response: NetworkResponse,
  frequencyHz: number,
  section: number,
  atM: number,
): { current: C; voltage: C } {
  const [a, b] = mul(gammaOf(network.sections[section]!, frequencyHz), [atM, 0]);
  const forward = mul(at(response.forward, section), exp([-a, -b]));
  const backward = mul(at(response.backward, section), exp([a, b]));
  const { z0Ohm } = network.sections[section]!.line;
  return { current: add(forward, backward), voltage: mul([z0Ohm, 0], sub(forward, backward)) };
}

/** Complex closeness relative to the larger of |expected| and `floor`. */
export function expectPhasor(actual: C, expected: C, rel: number, because: string, floor = 0): void {
  const allowed = rel * Math.max(abs(expected), floor);
  expect(allowed, `vacuous tolerance: ${because}`).toBeGreaterThan(0);
  const text = `${actual} vs ${expected}: ${because}`;
  expect(abs(sub(actual, expected)), text).toBeLessThanOrEqual(allowed);
}
