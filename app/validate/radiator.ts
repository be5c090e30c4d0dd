import { FIELD_STRIDE } from '../fields/element-field.ts';
import { addLinearElementField, type LinearElement } from '../fields/linear-element.ts';
import { gaussLegendre } from '../fields/quadrature.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';

type Vector = readonly [number, number, number];

/** E (V/m) and H (A/m) of elements at one point, FIELD_STRIDE floats each, by the program's own element field. */
export function fieldOf(
  elements: readonly LinearElement[],
  frequencyHz: number,
  observerM: Vector,
): { readonly electric: Float64Array; readonly magnetic: Float64Array } {
  const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
  const electric = new Float64Array(FIELD_STRIDE);
  const magnetic = new Float64Array(FIELD_STRIDE);
  for (const element of elements) addLinearElementField(electric, magnetic, 0, kPerM, observerM, element);
  return { electric, magnetic };
}

/** Magnitude of a phasor vector in [x, y, z][re, im]. */
export const magnitude = (vector: Float64Array): number => Math.hypot(...vector);

/** Points of the sphere's rule: exact for sources within about two wavelengths. */
const POLAR_POINTS = 16;
const AZIMUTH_POINTS = 32;

/**
 * Power through a sphere about the origin, W: P = ½ ∮ Re(E × H*)·n dS, Gauss–Legendre in cos θ, equal steps in φ.
 * Sources must lie inside. Valid at any radius outside them: no power is lost on the way.
 */
export function radiatedPowerW(elements: readonly LinearElement[], frequencyHz: number, radiusM: number): number {
  const polar = gaussLegendre(POLAR_POINTS);
  let powerW = 0;
  for (let i = 0; i < POLAR_POINTS; i++) {
    const cosTheta = 2 * polar.nodes[i]! - 1;
    const sinTheta = Math.sqrt(1 - cosTheta * cosTheta);
    for (let j = 0; j < AZIMUTH_POINTS; j++) {
      const phi = (2 * Math.PI * (j + 0.5)) / AZIMUTH_POINTS;
      const n: Vector = [sinTheta * Math.cos(phi), sinTheta * Math.sin(phi), cosTheta];
      const { electric, magnetic } = fieldOf(elements, frequencyHz, [radiusM * n[0], radiusM * n[1], radiusM * n[2]]);
      powerW += polar.weights[i]! * radialFlux(electric, magnetic, n);
    }
  }
  return (powerW * 4 * Math.PI * radiusM * radiusM) / AZIMUTH_POINTS;
}

/** ½ Re(E × H*)·n, W/m². */
function radialFlux(e: Float64Array, h: Float64Array, n: Vector): number {
  let flux = 0;
  for (let axis = 0; axis < 3; axis++) {
    const a = 2 * ((axis + 1) % 3);
    const b = 2 * ((axis + 2) % 3);
    const cross = e[a]! * h[b]! + e[a + 1]! * h[b + 1]! - e[b]! * h[a]! - e[b + 1]! * h[a + 1]!;
    flux += 0.5 * cross * n[axis]!;
  }
  return flux;
}

/** Straight wire along z about `centreM` with the same current (peak, A) all along. */
export const shortWire = (centreM: Vector, lengthM: number, currentA: number): LinearElement => ({
  fromM: [centreM[0], centreM[1], centreM[2] - lengthM / 2],
  toM: [centreM[0], centreM[1], centreM[2] + lengthM / 2],
  startRe: currentA,
  startIm: 0,
  endRe: currentA,
  endIm: 0,
});

/** Closed polygon carrying one current. */
export const closedLoop = (cornersM: readonly Vector[], currentA: number): LinearElement[] =>
  cornersM.map((fromM, i) => ({
    fromM,
    toM: cornersM[(i + 1) % cornersM.length]!,
    startRe: currentA,
    startIm: 0,
    endRe: currentA,
    endIm: 0,
  }));

/** Wire along z about the origin with a real current I(z), joined up from straight pieces. */
export function shapedWire(lengthM: number, pieces: number, currentA: (zM: number) => number): LinearElement[] {
  return Array.from({ length: pieces }, (_, i) => {
    const lowM = (i / pieces - 0.5) * lengthM;
    const highM = ((i + 1) / pieces - 0.5) * lengthM;
    return {
      fromM: [0, 0, lowM],
      toM: [0, 0, highM],
      startRe: currentA(lowM),
      startIm: 0,
      endRe: currentA(highM),
      endIm: 0,
    };
  });
}
