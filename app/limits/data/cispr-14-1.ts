import { type LimitLine, NO_CLASS } from '../limit-line.ts';
import { steps } from './steps.ts';

/**
 * CISPR 14-1, household appliances and tools: the radiated road (the other one, disturbance power, is no field). The lines
 * to 6 GHz of recent editions are not held here.
 */

const family = {
  standard: 'CISPR 14-1',
  aliases: ['EN 55014-1', 'BS EN 55014-1', 'DIN EN 55014-1'],
  class: NO_CLASS,
  detector: 'quasi-peak',
  threeToTenMetresDb: 10,
  edition: 'CISPR 14-1:2016 (lines to 1 GHz)',
  source: 'CISPR 14-1, radiated disturbance limits 30–1000 MHz',
  sourceStatus: 'from memory',
} as const;

export const CISPR_14_1_LINES: readonly LimitLine[] = [
  { ...family, siteKind: 'ground-plane', distanceM: 10, points: steps([30, 230, 30], [230, 1000, 37]) },
  { ...family, siteKind: 'ground-plane', distanceM: 3, points: steps([30, 230, 40], [230, 1000, 47]) },
  {
    ...family,
    siteKind: 'free-space',
    distanceM: 3,
    points: [
      [30e6, 42],
      [230e6, 35],
      [230e6, 42],
      [1e9, 42],
    ],
  },
];
