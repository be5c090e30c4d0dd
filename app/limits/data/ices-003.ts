import type { LimitLine } from '../limit-line.ts';
import { steps } from './steps.ts';

/** ICES-003, Canada: in each band the more lenient of the FCC and the CISPR line. */

const family = {
  standard: 'ICES-003',
  aliases: ['ICES 3', 'ISED ICES-003', 'CAN ICES-003'],
  edition: 'ICES-003 issue 7',
  source: 'ICES-003, radiated emission limits',
  sourceStatus: 'from memory',
} as const;

const below = { ...family, detector: 'quasi-peak', siteKind: 'ground-plane' } as const;
/** As in the FCC rules, quasi-peak counts at 1000 MHz exactly and the range ends at 40 GHz. */
const above = { ...family, distanceM: 3, siteKind: 'free-space', startsAboveFirst: true } as const;

const bands = (a: number, b: number, c: number, d: number, e: number): LimitLine['points'] =>
  steps([30, 88, a], [88, 216, b], [216, 230, c], [230, 960, d], [960, 1000, e]);

export const ICES_003_LINES: readonly LimitLine[] = [
  { ...below, class: 'A', distanceM: 10, points: bands(40, 43.5, 46.4, 47, 49.5) },
  { ...below, class: 'A', distanceM: 3, points: bands(50, 54, 56.9, 57, 60) },
  { ...below, class: 'B', distanceM: 10, points: bands(30, 33.1, 35.6, 37, 43.5) },
  { ...below, class: 'B', distanceM: 3, points: bands(40, 43.5, 46, 47, 54) },
  { ...above, class: 'A', detector: 'average', points: steps([1000, 40_000, 60]) },
  { ...above, class: 'A', detector: 'peak', points: steps([1000, 40_000, 80]) },
  { ...above, class: 'B', detector: 'average', points: steps([1000, 40_000, 54]) },
  { ...above, class: 'B', detector: 'peak', points: steps([1000, 40_000, 74]) },
];
