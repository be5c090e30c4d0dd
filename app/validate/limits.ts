import type { Detector } from '../estimate/result.ts';
import { chooseLimits } from '../limits/choose.ts';
import { upperFrequency } from '../limits/upper-frequency.ts';
import { mhzToHz } from '../units/convert.ts';
import { type Check, check } from './check.ts';

interface Group {
  readonly standard: string;
  readonly class: string;
  readonly distanceM: number;
  readonly detector: Detector;
  readonly source: string;
  readonly sourceStatus: 'seen' | 'from memory' | 'derived';
  /** The distance has no line of its own. */
  readonly isConverted?: boolean;
  readonly levels: readonly (readonly [frequencyMhz: number, limitDbuvPerM: number])[];
}

const CISPR = 'CISPR 32 tables A.2 to A.5, laboratory copies';
const FCC = '47 CFR 15.109, µV/m in decibels';

/** Levels typed in from the sources, µV/m of the FCC rule turned into decibels by hand; band edges with the tighter neighbour. */
const GROUPS: readonly Group[] = [
  {
    standard: 'CISPR 32',
    class: 'B',
    distanceM: 3,
    detector: 'quasi-peak',
    source: CISPR,
    sourceStatus: 'seen',
    levels: [
      [30, 40],
      [230, 40],
      [231, 47],
      [1000, 47],
    ],
  },
  {
    standard: 'CISPR 32',
    class: 'B',
    distanceM: 10,
    detector: 'quasi-peak',
    source: CISPR,
    sourceStatus: 'seen',
    levels: [
      [30, 30],
      [230, 30],
      [1000, 37],
    ],
  },
  {
    standard: 'CISPR 32',
    class: 'A',
    distanceM: 3,
    detector: 'quasi-peak',
    source: CISPR,
    sourceStatus: 'seen',
    levels: [
      [30, 50],
      [230, 50],
      [1000, 57],
    ],
  },
  {
    standard: 'CISPR 32',
    class: 'A',
    distanceM: 10,
    detector: 'quasi-peak',
    source: CISPR,
    sourceStatus: 'seen',
    levels: [
      [30, 40],
      [230, 40],
      [1000, 47],
    ],
  },
  {
    standard: 'CISPR 32',
    class: 'B',
    distanceM: 3,
    detector: 'average',
    source: CISPR,
    sourceStatus: 'seen',
    levels: [
      [2000, 50],
      [3000, 50],
      [6000, 54],
    ],
  },
  {
    standard: 'CISPR 32',
    class: 'B',
    distanceM: 3,
    detector: 'peak',
    source: CISPR,
    sourceStatus: 'seen',
    levels: [
      [2000, 70],
      [3000, 70],
      [6000, 74],
    ],
  },
  {
    standard: 'FCC 15.109',
    class: 'B',
    distanceM: 3,
    detector: 'quasi-peak',
    source: FCC,
    sourceStatus: 'seen',
    levels: [
      [88, 40],
      [216, 43.522],
      [960, 46.021],
      [1000, 53.979],
    ],
  },
  {
    standard: 'FCC 15.109',
    class: 'A',
    distanceM: 10,
    detector: 'quasi-peak',
    source: FCC,
    sourceStatus: 'seen',
    levels: [
      [88, 39.085],
      [216, 43.522],
      [960, 46.444],
      [1000, 49.542],
    ],
  },
  {
    standard: 'FCC 15.109',
    class: 'B',
    distanceM: 3,
    detector: 'peak',
    source: '47 CFR 15.35(b): 20 dB above the average limit',
    sourceStatus: 'seen',
    levels: [[2000, 73.979]],
  },
  {
    standard: 'FCC 15.109',
    class: 'A',
    distanceM: 3,
    detector: 'quasi-peak',
    source: '47 CFR 15.109 moved by 20 dB/decade: 300, 500, 700, 1000 µV/m',
    sourceStatus: 'derived',
    isConverted: true,
    levels: [
      [50, 49.542],
      [100, 53.979],
      [500, 56.902],
      [970, 60],
    ],
  },
];

const UPPER: readonly (readonly [standard: string, clockMhz: number, maxMhz: number])[] = [
  ['FCC 15.109', 1, 30],
  ['FCC 15.109', 108, 1000],
  ['FCC 15.109', 250, 2000],
  ['FCC 15.109', 750, 5000],
  ['FCC 15.109', 1500, 7500],
  ['CISPR 32', 108, 1000],
  ['CISPR 32', 250, 2000],
  ['CISPR 32', 750, 5000],
  ['CISPR 32', 1500, 6000],
];

const slug = (text: string): string => text.toLowerCase().replace(/[^a-z0-9]+/g, '-');

/** Limit lines and the upper frequency read back through the choice a user's request takes. */
export function limitChecks(): Check[] {
  const levels = GROUPS.flatMap((group) => {
    const { standard, distanceM, detector } = group;
    const { limitsAt } = chooseLimits({
      standard,
      class: group.class,
      distanceM,
      convertDistance: group.isConverted ?? false,
    });
    return group.levels.map(([frequencyMhz, expected]) =>
      check({
        id: slug(`limit ${standard} ${group.class} ${distanceM}m ${detector} ${frequencyMhz}mhz`),
        source: group.source,
        sourceStatus: group.sourceStatus,
        quantity: `limit ${standard} class ${group.class}, ${distanceM} m, ${detector}, ${frequencyMhz} MHz`,
        unit: 'dBµV/m',
        expected,
        computed: limitsAt(mhzToHz(frequencyMhz)).find((limit) => limit.detector === detector)?.limitDbuvPerM ?? NaN,
        // Decibels of the FCC's µV/m are typed with three decimals.
        tolerance: 0.0005,
      }),
    );
  });
  const upper = UPPER.map(([standard, clockMhz, maxMhz]) =>
    check({
      id: slug(`upper-frequency ${standard} ${clockMhz}mhz`),
      source: standard === 'CISPR 32' ? 'CISPR 32 table 1' : '47 CFR 15.33(b)(1)',
      sourceStatus: standard === 'CISPR 32' ? 'from memory' : 'seen',
      quantity: `upper end of the range, ${standard}, highest clock ${clockMhz} MHz`,
      unit: 'Hz',
      expected: mhzToHz(maxMhz),
      computed: upperFrequency(standard, mhzToHz(clockMhz)).maxHz,
      tolerance: 1,
    }),
  );
  return [...levels, ...upper];
}
