import { ETA0_OHM } from '../../app/units/constants.ts';

/** Complex helpers and vectors for oracles, written apart from the program's own. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}
export type Vector = readonly [number, number, number];

export const times = (a: Complex, b: Complex): Complex => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
});
export const plus = (...terms: readonly Complex[]): Complex => ({
  re: terms.reduce((sum, { re }) => sum + re, 0),
  im: terms.reduce((sum, { im }) => sum + im, 0),
});
const real = (re: number): Complex => ({ re, im: 0 });
export const imaginary = (im: number): Complex => ({ re: 0, im });
/** e^(−jx)/d. */
export const wave = (phaseRad: number, distanceM: number): Complex => ({
  re: Math.cos(phaseRad) / distanceM,
  im: -Math.sin(phaseRad) / distanceM,
});
export const cross = (a: Vector, b: Vector): Vector => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];
export const unit = (a: Vector): Vector => {
  const length = Math.hypot(...a);
  return [a[0] / length, a[1] / length, a[2] / length];
};

/** Component along `direction` of a phasor vector [x, y, z][re, im]. */
export const along = (field: Float64Array, direction: Vector): Complex => ({
  re: field[0]! * direction[0] + field[2]! * direction[1] + field[4]! * direction[2],
  im: field[1]! * direction[0] + field[3]! * direction[1] + field[5]! * direction[2],
});

export const size = ({ re, im }: Complex): number => Math.hypot(re, im);
export const distance = (a: Complex, b: Complex): number => Math.hypot(a.re - b.re, a.im - b.im);

/**
 * Hertzian dipole along z, spherical components (C. A. Balanis, Antenna Theory, 3rd ed., eq. 4-8 and 4-10, from memory):
 *   H_φ = jk m sinθ e^(−jkr)/(4πr) [1 + 1/(jkr)]
 *   E_r = η0 m cosθ e^(−jkr)/(2πr²) [1 + 1/(jkr)]
 *   E_θ = jη0 k m sinθ e^(−jkr)/(4πr) [1 + 1/(jkr) − 1/(kr)²]
 */
export function hertzianDipole(momentAm: number, kPerM: number, rM: number, thetaRad: number) {
  const kr = kPerM * rM;
  const bracket = { re: 1, im: -1 / kr };
  const electricBracket = { re: 1 - 1 / kr ** 2, im: -1 / kr };
  const spherical = wave(kr, rM);
  const transverse = (kPerM * momentAm * Math.sin(thetaRad)) / (4 * Math.PI);
  return {
    hPhi: times(times(imaginary(transverse), spherical), bracket),
    eR: times(times(real((ETA0_OHM * momentAm * Math.cos(thetaRad)) / (2 * Math.PI * rM)), spherical), bracket),
    eTheta: times(times(imaginary(ETA0_OHM * transverse), spherical), electricBracket),
  };
}

/**
 * Small loop in the xy plane, counter-clockwise current (Balanis, eq. 5-18 and 5-19 with πa² = A, from memory):
 *   E_φ = η0 k² I A sinθ e^(−jkr)/(4πr) [1 + 1/(jkr)]
 *   H_r = jk I A cosθ e^(−jkr)/(2πr²) [1 + 1/(jkr)]
 *   H_θ = −k² I A sinθ e^(−jkr)/(4πr) [1 + 1/(jkr) − 1/(kr)²]
 */
export function smallLoop(currentA: number, areaM2: number, kPerM: number, rM: number, thetaRad: number) {
  const kr = kPerM * rM;
  const bracket = { re: 1, im: -1 / kr };
  const magneticBracket = { re: 1 - 1 / kr ** 2, im: -1 / kr };
  const spherical = wave(kr, rM);
  const transverse = (kPerM ** 2 * currentA * areaM2 * Math.sin(thetaRad)) / (4 * Math.PI);
  const radial = (kPerM * currentA * areaM2 * Math.cos(thetaRad)) / (2 * Math.PI * rM);
  return {
    ePhi: times(times(real(ETA0_OHM * transverse), spherical), bracket),
    hR: times(times(imaginary(radial), spherical), bracket),
    hTheta: times(times(real(-transverse), spherical), magneticBracket),
  };
}
