import { mhzToHz, rmsFieldToDbuvPerM } from '../../units/convert.ts';
import type { LimitLine } from '../limit-line.ts';

/**
 * 47 CFR 15.109, unintentional radiators. The rule states µV/m; levels here are the unrounded decibels of those. Up to and
 * including 1000 MHz the detector is quasi-peak (15.35(a)); above, average, and the peak may be 20 dB higher (15.35(b)).
 */

const family = {
  standard: 'FCC 15.109',
  aliases: [
    'FCC',
    'FCC Part 15',
    'FCC Part 15B',
    'FCC 15',
    '47 CFR 15.109',
    '47 CFR Part 15',
    'CFR 47 15.109',
    'FCC 47 CFR 15.109',
  ],
  edition: '47 CFR 15.109 and 15.35, texts of 2011 to 2021',
  source: '47 CFR 15.109(a), (b) and 15.35(a), (b)',
  sourceStatus: 'seen',
} as const;

/** Emissions are measured up to 40 GHz at most (15.33). */
const LAST_MHZ = 40_000;
/** 15.35(b): the peak may exceed the average limit by this. */
const PEAK_OVER_AVERAGE_DB = 20;

type Row = readonly [fromMhz: number, toMhz: number, fieldUvPerM: number];

const pointsOf = (rows: readonly Row[], raiseDb = 0): LimitLine['points'] =>
  rows.flatMap(([fromMhz, toMhz, fieldUvPerM]): LimitLine['points'] => {
    const levelDb = rmsFieldToDbuvPerM(fieldUvPerM * 1e-6) + raiseDb;
    return [
      [mhzToHz(fromMhz), levelDb],
      [mhzToHz(toMhz), levelDb],
    ];
  });

/** The field above 960 MHz holds on above 1 GHz, with the other detectors. */
function linesOf(className: string, distanceM: number, below: readonly Row[]): LimitLine[] {
  const above: Row = [1000, LAST_MHZ, below.at(-1)![2]];
  const common = { ...family, class: className, distanceM } as const;
  const overOneGhz = { ...common, siteKind: 'free-space', startsAboveFirst: true } as const;
  return [
    { ...common, detector: 'quasi-peak', siteKind: 'ground-plane', points: pointsOf(below) },
    { ...overOneGhz, detector: 'average', points: pointsOf([above]) },
    { ...overOneGhz, detector: 'peak', points: pointsOf([above], PEAK_OVER_AVERAGE_DB) },
  ];
}

export const FCC_15_LINES: readonly LimitLine[] = [
  ...linesOf('A', 10, [
    [30, 88, 90],
    [88, 216, 150],
    [216, 960, 210],
    [960, 1000, 300],
  ]),
  ...linesOf('B', 3, [
    [30, 88, 100],
    [88, 216, 150],
    [216, 960, 200],
    [960, 1000, 500],
  ]),
];
