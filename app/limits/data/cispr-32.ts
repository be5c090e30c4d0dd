import type { LimitLine } from '../limit-line.ts';
import { steps } from './steps.ts';

/** CISPR 32, multimedia equipment: radiated lines below 1 GHz (over a ground plane or in free space) and above. */

const family = {
  standard: 'CISPR 32',
  aliases: ['EN 55032', 'BS EN 55032', 'DIN EN 55032', 'AS/NZS CISPR 32'],
  edition: 'CISPR 32:2012; the same numbers in CISPR 32:2015 + A1:2019 (from memory)',
} as const;

const seenInTables = {
  source: 'CISPR 32:2012 tables A.4 and A.5, as transcribed in IEEE emc-pstc message 64453',
  sourceStatus: 'seen',
} as const;
const seenInReport = {
  source: 'CISPR 32 table A.2, as printed in laboratory report ACWE-F2101012 (2021), clause 6.3',
  sourceStatus: 'seen',
} as const;
const recalled = { source: 'CISPR 32 annex A', sourceStatus: 'from memory' } as const;

const quasiPeak = { ...family, detector: 'quasi-peak', threeToTenMetresDb: 10 } as const;
const belowOneGhz = { ...quasiPeak, siteKind: 'ground-plane' } as const;
const freeSpaceBelowOneGhz = { ...quasiPeak, ...recalled, siteKind: 'free-space' } as const;
const aboveOneGhz = { ...family, distanceM: 3, siteKind: 'free-space' } as const;

/** In a fully anechoic room: a straight line in dB over log frequency from 30 to 230 MHz, then flat. */
const slopeThenFlat = (at30MhzDb: number, at230MhzDb: number, flatDb: number): LimitLine['points'] => [
  [30e6, at30MhzDb],
  [230e6, at230MhzDb],
  [230e6, flatDb],
  [1e9, flatDb],
];

export const CISPR_32_LINES: readonly LimitLine[] = [
  { ...belowOneGhz, ...seenInReport, class: 'A', distanceM: 10, points: steps([30, 230, 40], [230, 1000, 47]) },
  { ...belowOneGhz, ...seenInReport, class: 'A', distanceM: 3, points: steps([30, 230, 50], [230, 1000, 57]) },
  { ...belowOneGhz, ...seenInTables, class: 'B', distanceM: 10, points: steps([30, 230, 30], [230, 1000, 37]) },
  { ...belowOneGhz, ...seenInTables, class: 'B', distanceM: 3, points: steps([30, 230, 40], [230, 1000, 47]) },
  { ...freeSpaceBelowOneGhz, class: 'A', distanceM: 10, points: slopeThenFlat(42, 35, 42) },
  { ...freeSpaceBelowOneGhz, class: 'A', distanceM: 3, points: slopeThenFlat(52, 45, 52) },
  { ...freeSpaceBelowOneGhz, class: 'B', distanceM: 10, points: slopeThenFlat(32, 25, 32) },
  { ...freeSpaceBelowOneGhz, class: 'B', distanceM: 3, points: slopeThenFlat(42, 35, 42) },
  { ...aboveOneGhz, ...recalled, class: 'A', detector: 'average', points: steps([1000, 3000, 56], [3000, 6000, 60]) },
  { ...aboveOneGhz, ...recalled, class: 'A', detector: 'peak', points: steps([1000, 3000, 76], [3000, 6000, 80]) },
  {
    ...aboveOneGhz,
    ...seenInTables,
    class: 'B',
    detector: 'average',
    points: steps([1000, 3000, 50], [3000, 6000, 54]),
  },
  { ...aboveOneGhz, ...seenInTables, class: 'B', detector: 'peak', points: steps([1000, 3000, 70], [3000, 6000, 74]) },
];

/** VCCI-CISPR 32 takes its class A and B lines from CISPR 32. */
export const VCCI_LINES: readonly LimitLine[] = CISPR_32_LINES.map((line) => ({
  ...line,
  standard: 'VCCI-CISPR 32',
  aliases: ['VCCI'],
  edition: 'VCCI-CISPR 32:2016',
  source: 'VCCI rules for voluntary control measures, limits taken from CISPR 32',
  sourceStatus: 'from memory',
}));
