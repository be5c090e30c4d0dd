import type { LimitLine } from '../limit-line.ts';
import { steps } from './steps.ts';

/**
 * CISPR 11 group 1, industrial, scientific and medical equipment. 3 m is only for equipment that fits, with its cables, a
 * cylinder of 1.2 m diameter and 1.5 m height. The lines above 1 GHz of CISPR 11:2024 are not held here.
 */

const family = {
  standard: 'CISPR 11',
  aliases: ['EN 55011', 'BS EN 55011', 'DIN EN 55011', 'CISPR 11 group 1', 'EN 55011 group 1'],
  detector: 'quasi-peak',
  siteKind: 'ground-plane',
  threeToTenMetresDb: 10,
  edition: 'CISPR 11:2015 + A1:2016 + A2:2019, group 1 (lines to 1 GHz)',
  source: 'CISPR 11, radiated limits of group 1 on a test site',
  sourceStatus: 'from memory',
} as const;

/** Rated power decides between the two class A lines; the plain "A" is the usual, stricter one. */
const upTo20Kva = { ...family, class: 'A up to 20 kVA', classAliases: ['A', 'A ≤ 20 kVA', 'A <= 20 kVA'] } as const;
const over20Kva = { ...family, class: 'A over 20 kVA', classAliases: ['A > 20 kVA'] } as const;
const classB = { ...family, class: 'B' } as const;

export const CISPR_11_LINES: readonly LimitLine[] = [
  { ...upTo20Kva, distanceM: 10, points: steps([30, 230, 40], [230, 1000, 47]) },
  { ...upTo20Kva, distanceM: 3, points: steps([30, 230, 50], [230, 1000, 57]) },
  { ...over20Kva, distanceM: 10, points: steps([30, 1000, 50]) },
  { ...over20Kva, distanceM: 3, points: steps([30, 1000, 60]) },
  { ...classB, distanceM: 10, points: steps([30, 230, 30], [230, 1000, 37]) },
  { ...classB, distanceM: 3, points: steps([30, 230, 40], [230, 1000, 47]) },
];
