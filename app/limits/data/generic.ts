import { type LimitLine, NO_CLASS } from '../limit-line.ts';
import { steps } from './steps.ts';

/** Generic emission standards, enclosure port. They have no classes: the place of use picks the standard. */

const residential = {
  standard: 'IEC 61000-6-3',
  aliases: ['EN 61000-6-3', 'EN IEC 61000-6-3', 'BS EN 61000-6-3'],
  class: NO_CLASS,
  edition: 'IEC 61000-6-3:2020',
  source: 'IEC 61000-6-3, enclosure port',
  sourceStatus: 'from memory',
} as const;
const industrial = {
  standard: 'IEC 61000-6-4',
  aliases: ['EN 61000-6-4', 'EN IEC 61000-6-4', 'BS EN 61000-6-4'],
  class: NO_CLASS,
  edition: 'IEC 61000-6-4:2018',
  source: 'IEC 61000-6-4, enclosure port',
  sourceStatus: 'from memory',
} as const;

const below = { detector: 'quasi-peak', siteKind: 'ground-plane', threeToTenMetresDb: 10 } as const;
const above = { distanceM: 3, siteKind: 'free-space' } as const;

export const GENERIC_LINES: readonly LimitLine[] = [
  { ...residential, ...below, distanceM: 10, points: steps([30, 230, 30], [230, 1000, 37]) },
  { ...residential, ...below, distanceM: 3, points: steps([30, 230, 40], [230, 1000, 47]) },
  { ...residential, ...above, detector: 'average', points: steps([1000, 3000, 50], [3000, 6000, 54]) },
  { ...residential, ...above, detector: 'peak', points: steps([1000, 3000, 70], [3000, 6000, 74]) },
  { ...industrial, ...below, distanceM: 10, points: steps([30, 230, 40], [230, 1000, 47]) },
  { ...industrial, ...below, distanceM: 3, points: steps([30, 230, 50], [230, 1000, 57]) },
  { ...industrial, ...above, detector: 'average', points: steps([1000, 3000, 56], [3000, 6000, 60]) },
  { ...industrial, ...above, detector: 'peak', points: steps([1000, 3000, 76], [3000, 6000, 80]) },
];
