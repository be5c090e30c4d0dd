import type { Radiator } from '../../app/fields/element-set.ts';
import { ETA0_OHM } from '../../app/units/constants.ts';

export const DIRECT_ANGLES = 72;
export const DIRECT_HEIGHTS = 31;

/**
 * The plain way: every element, its image and every antenna position, one sin/cos pair each, all field terms; 72 angles ×
 * 31 heights. Returns the largest horizontal and vertical power (V²/m², peak) over the domains.
 */
export function directScan(
  domains: readonly (readonly Radiator[])[],
  kPerM: number,
  scanRadiusM: number,
): { horizontal: number; vertical: number } {
  let horizontal = 0;
  let vertical = 0;
  const sum = new Float64Array(4);
  for (let a = 0; a < DIRECT_ANGLES; a++) {
    const angleRad = (2 * Math.PI * a) / DIRECT_ANGLES;
    const cosA = Math.cos(angleRad);
    const sinA = Math.sin(angleRad);
    for (let h = 0; h < DIRECT_HEIGHTS; h++) {
      const heightM = 1 + (3 * h) / (DIRECT_HEIGHTS - 1);
      let powerH = 0;
      let powerV = 0;
      for (const radiators of domains) {
        sum.fill(0);
        for (const radiator of radiators) {
          addElements(radiator, kPerM, scanRadiusM, cosA, sinA, heightM, 1, sum);
          addElements(radiator, kPerM, scanRadiusM, cosA, sinA, -heightM, -1, sum);
        }
        powerH += sum[0]! ** 2 + sum[1]! ** 2;
        powerV += sum[2]! ** 2 + sum[3]! ** 2;
      }
      horizontal = Math.max(horizontal, powerH);
      vertical = Math.max(vertical, powerV);
    }
  }
  return { horizontal, vertical };
}

function addElements(
  { elements, currentsA }: Radiator,
  kPerM: number,
  scanRadiusM: number,
  cosA: number,
  sinA: number,
  zM: number,
  horizontalSign: number,
  sum: Float64Array,
): void {
  const { positionsM, vectorsM, count } = elements;
  const ox = scanRadiusM * cosA;
  const oy = scanRadiusM * sinA;
  for (let e = 0; e < count; e++) {
    const rx = ox - positionsM[3 * e]!;
    const ry = oy - positionsM[3 * e + 1]!;
    const rz = zM - positionsM[3 * e + 2]!;
    const rM = Math.sqrt(rx * rx + ry * ry + rz * rz);
    const inverse = 1 / rM;
    const vx = vectorsM[3 * e]!;
    const vy = vectorsM[3 * e + 1]!;
    const vz = vectorsM[3 * e + 2]!;
    const along = (rx * vx + ry * vy + rz * vz) * inverse;
    const vPhi = vy * cosA - vx * sinA;
    const nPhi = (ry * cosA - rx * sinA) * inverse;
    const nz = rz * inverse;
    const scale = (ETA0_OHM / (4 * Math.PI)) * inverse;
    const gRe = scale * Math.cos(kPerM * rM);
    const gIm = -scale * Math.sin(kPerM * rM);
    const iRe = currentsA[2 * e]!;
    const iIm = currentsA[2 * e + 1]!;
    const fRe = gRe * iRe - gIm * iIm;
    const fIm = gRe * iIm + gIm * iRe;
    const second = (-inverse * inverse) / kPerM;
    const phiClose = 3 * nPhi * along - vPhi;
    const phiRe = inverse * phiClose;
    const phiIm = kPerM * (nPhi * along - vPhi) + second * phiClose;
    const zClose = 3 * nz * along - vz;
    const zRe = inverse * zClose;
    const zIm = kPerM * (nz * along - vz) + second * zClose;
    sum[0]! += horizontalSign * (fRe * phiRe - fIm * phiIm);
    sum[1]! += horizontalSign * (fRe * phiIm + fIm * phiRe);
    sum[2]! += fRe * zRe - fIm * zIm;
    sum[3]! += fRe * zIm + fIm * zRe;
  }
}
