import type { FieldTerms } from '../fields/element-field.ts';
import { ETA0_OHM } from '../units/constants.ts';
import type { SourceGroup } from './source-groups.ts';

/** Floats per sample: φ component and z component, each re then im. */
export const SAMPLE_STRIDE = 4;

const QUARTERS_PER_RAD = 2 / Math.PI;
/** π/2 in two parts: the first has 33 bits, so its multiples by whole numbers are exact. */
const QUARTER_HIGH_RAD = 1.5707963267341256;
const QUARTER_LOW_RAD = 6.077100506506192e-11;
const [S3, S5, S7, S9, S11] = [-1 / 6, 1 / 120, -1 / 5040, 1 / 362880, -1 / 39916800];
const [C2, C4, C6, C8, C10, C12] = [-1 / 2, 1 / 24, -1 / 720, 1 / 40320, -1 / 3628800, 1 / 479001600];

/** Where one sample is taken. */
export interface SamplePlace {
  readonly kPerM: number;
  readonly radiusM: number;
  /** Of the angle about the turntable axis. */
  readonly cosAngle: number;
  readonly sinAngle: number;
  readonly zM: number;
  /** The field is multiplied by `factor`·e^(+jk·referenceM): R0 and R0 take e^(−jkR0)/R0 out, 0 and 1 leave it. */
  readonly referenceM: number;
  readonly factor: number;
  readonly terms: FieldTerms;
}

/** The place at an angle and height (of the mirrored part: negative); the field as it is. */
export const antennaAt = (
  { kPerM, radiusM }: Pick<SamplePlace, 'kPerM' | 'radiusM'>,
  angleRad: number,
  zM: number,
  terms: FieldTerms,
): SamplePlace => ({
  kPerM,
  radiusM,
  cosAngle: Math.cos(angleRad),
  sinAngle: Math.sin(angleRad),
  zM,
  referenceM: 0,
  factor: 1,
  terms,
});

/**
 * Adds the φ and z components (re, im each) of sources at one place to every sharing domain's array at `at`; all terms of
 * `addElementField`, arranged for many sources: E = P n (n·m) − Q m, P = far + 3 near, Q = far + near.
 */
export function addSample(
  { positionsM, shares }: SourceGroup,
  place: SamplePlace,
  out: readonly Float64Array[],
  at: number,
): void {
  const { kPerM, radiusM, cosAngle: cosA, sinAngle: sinA, zM, referenceM } = place;
  const ox = radiusM * cosA;
  const oy = radiusM * sinA;
  const strength = (ETA0_OHM / (4 * Math.PI)) * place.factor;
  const isAll = place.terms === 'all';
  const shareCount = shares.length;
  const pointCount = positionsM.length / 3;
  for (let p = 0; p < pointCount; p++) {
    const rx = ox - positionsM[3 * p]!;
    const ry = oy - positionsM[3 * p + 1]!;
    const rz = zM - positionsM[3 * p + 2]!;
    const rM = Math.sqrt(rx * rx + ry * ry + rz * rz);
    const inverse = 1 / rM;
    const nx = rx * inverse;
    const ny = ry * inverse;
    const nz = rz * inverse;
    const nPhi = ny * cosA - nx * sinA;
    const phase = kPerM * (rM - referenceM);
    const scale = strength * inverse;
    // sin and cos of the phase together, to 1e-11: quarter turns taken out, then their series (A&S 4.3.65–66)
    const turns = Math.round(phase * QUARTERS_PER_RAD);
    const r = phase - turns * QUARTER_HIGH_RAD - turns * QUARTER_LOW_RAD;
    const r2 = r * r;
    const sinR = r * (1 + r2 * (S3 + r2 * (S5 + r2 * (S7 + r2 * (S9 + r2 * S11)))));
    const cosR = 1 + r2 * (C2 + r2 * (C4 + r2 * (C6 + r2 * (C8 + r2 * (C10 + r2 * C12)))));
    const quarter = turns & 3;
    const cosPhase = quarter === 0 ? cosR : quarter === 1 ? -sinR : quarter === 2 ? -cosR : sinR;
    const sinPhase = quarter === 0 ? sinR : quarter === 1 ? cosR : quarter === 2 ? -sinR : -cosR;
    const gRe = scale * cosPhase;
    const gIm = -scale * sinPhase;
    // far = g·jk, near = g·(1/R − j/(kR²))
    const farRe = -gIm * kPerM;
    const farIm = gRe * kPerM;
    let nearRe = 0;
    let nearIm = 0;
    if (isAll) {
      const second = (inverse * inverse) / kPerM;
      nearRe = gRe * inverse + gIm * second;
      nearIm = gIm * inverse - gRe * second;
    }
    const pRe = farRe + 3 * nearRe;
    const pIm = farIm + 3 * nearIm;
    const qRe = farRe + nearRe;
    const qIm = farIm + nearIm;
    for (let share = 0; share < shareCount; share++) {
      const { domain, moments } = shares[share]!;
      const m = 6 * p;
      const xRe = moments[m]!;
      const xIm = moments[m + 1]!;
      const yRe = moments[m + 2]!;
      const yIm = moments[m + 3]!;
      const zRe = moments[m + 4]!;
      const zIm = moments[m + 5]!;
      const dotRe = nx * xRe + ny * yRe + nz * zRe;
      const dotIm = nx * xIm + ny * yIm + nz * zIm;
      const lRe = pRe * dotRe - pIm * dotIm;
      const lIm = pRe * dotIm + pIm * dotRe;
      const phiRe = yRe * cosA - xRe * sinA;
      const phiIm = yIm * cosA - xIm * sinA;
      const target = out[domain]!;
      target[at]! += nPhi * lRe - (qRe * phiRe - qIm * phiIm);
      target[at + 1]! += nPhi * lIm - (qRe * phiIm + qIm * phiRe);
      target[at + 2]! += nz * lRe - (qRe * zRe - qIm * zIm);
      target[at + 3]! += nz * lIm - (qRe * zIm + qIm * zRe);
    }
  }
}
