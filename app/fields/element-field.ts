import { ETA0_OHM } from '../units/constants.ts';

/** Floats per observer in a phasor field: x, y, z, each re then im. */
export const FIELD_STRIDE = 6;

/** 'all': 1/R, 1/R² and 1/R³ terms. 'far': the radiated 1/R term alone (only for tables that assume it). */
export type FieldTerms = 'all' | 'far';

/**
 * Adds the electric and magnetic field of one short current element at one observer, all terms.
 *
 *   E = −j k η0 e^(−jkR)/(4πR) { [1 − j/(kR) − 1/(kR)²] m + [−1 + 3j/(kR) + 3/(kR)²] (n·m) n }
 *   H =  j k    e^(−jkR)/(4πR) [1 + 1/(jkR)] (m × n)
 *
 * with m = I·dl (A·m, peak phasor), k = ω/c (rad/m), n = R/R from the element to the observer, e^(+jωt). The end
 * charges ±I/(jω) are contained, so elements in a chain leave the right charge at every joint.
 *
 * Shapes: `outE` (V/m) and `outH` (A/m) hold FIELD_STRIDE floats at `offset`; `outH` may be null. Positions in m.
 * Valid for elements short against R and the wavelength. R = 0 gives non-finite values: the caller keeps away.
 * Source: C. A. Balanis, Antenna Theory, section 4.2 (infinitesimal dipole), in vector form.
 */
export function addElementField(
  outE: Float64Array,
  outH: Float64Array | null,
  offset: number,
  kPerM: number,
  rxM: number,
  ryM: number,
  rzM: number,
  momentRe: readonly [number, number, number],
  momentIm: readonly [number, number, number],
  terms: FieldTerms = 'all',
): void {
  const rM = Math.sqrt(rxM * rxM + ryM * ryM + rzM * rzM);
  const nx = rxM / rM;
  const ny = ryM / rM;
  const nz = rzM / rM;
  const phaseRad = kPerM * rM;
  const c = Math.cos(phaseRad) / (4 * Math.PI * rM);
  const s = -Math.sin(phaseRad) / (4 * Math.PI * rM);
  const nearRe = terms === 'all' ? 1 / rM : 0;
  const nearIm = terms === 'all' ? -1 / (kPerM * rM * rM) : 0;
  const dotRe = nx * momentRe[0] + ny * momentRe[1] + nz * momentRe[2];
  const dotIm = nx * momentIm[0] + ny * momentIm[1] + nz * momentIm[2];
  for (let axis = 0; axis < 3; axis++) {
    const n = axis === 0 ? nx : axis === 1 ? ny : nz;
    const farRe = n * dotRe - momentRe[axis]!;
    const farIm = n * dotIm - momentIm[axis]!;
    const closeRe = 3 * n * dotRe - momentRe[axis]!;
    const closeIm = 3 * n * dotIm - momentIm[axis]!;
    // j k·far + (1/R − j/(kR²))·close
    const sumRe = -kPerM * farIm + nearRe * closeRe - nearIm * closeIm;
    const sumIm = kPerM * farRe + nearRe * closeIm + nearIm * closeRe;
    outE[offset + 2 * axis]! += ETA0_OHM * (c * sumRe - s * sumIm);
    outE[offset + 2 * axis + 1]! += ETA0_OHM * (c * sumIm + s * sumRe);
  }
  if (outH === null) return;
  // j k + 1/R, or j k alone
  const hRe = c * nearRe - s * kPerM;
  const hIm = c * kPerM + s * nearRe;
  const crossRe = [
    momentRe[1] * nz - momentRe[2] * ny,
    momentRe[2] * nx - momentRe[0] * nz,
    momentRe[0] * ny - momentRe[1] * nx,
  ];
  const crossIm = [
    momentIm[1] * nz - momentIm[2] * ny,
    momentIm[2] * nx - momentIm[0] * nz,
    momentIm[0] * ny - momentIm[1] * nx,
  ];
  for (let axis = 0; axis < 3; axis++) {
    outH[offset + 2 * axis]! += hRe * crossRe[axis]! - hIm * crossIm[axis]!;
    outH[offset + 2 * axis + 1]! += hRe * crossIm[axis]! + hIm * crossRe[axis]!;
  }
}
