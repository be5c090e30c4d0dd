import { inputError } from '../errors.ts';
import { MU0_H_PER_M } from '../units/constants.ts';

/**
 * Inductance of a via barrel of length h and radius r = drill/2, H:
 *
 *   L = µ0/2π · { h ln[(h + √(r² + h²))/r] + 1.5 [r − √(r² + h²)] }
 *
 * Fitted there to full-wave results and measured on grounded vias in microstrip, 0.2 ≤ 2r/h ≤ 1.5 about. 0 for h = 0.
 * Throws `input` when a dimension is impossible.
 * Source: M. E. Goldfarb, R. A. Pucel, Modeling via hole grounds in microstrip, IEEE Microwave and Guided Wave Letters
 * 1(6), 1991.
 */
export function viaInductanceH(lengthM: number, drillM: number): number {
  if (!(lengthM >= 0 && lengthM < Infinity)) throw inputError('lengthM', 'a finite length of at least 0', lengthM);
  if (!(drillM > 0 && drillM < Infinity)) throw inputError('drillM', 'a positive finite length', drillM);
  const radiusM = drillM / 2;
  const slantM = Math.hypot(radiusM, lengthM);
  return (MU0_H_PER_M / (2 * Math.PI)) * (lengthM * Math.log((lengthM + slantM) / radiusM) + 1.5 * (radiusM - slantM));
}
