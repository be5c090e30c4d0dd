import type { Contributor, Detector, EstimateResult, ResultPoint, Verdict } from '../../app/estimate/result.ts';
import { CAUTIONS } from '../../app/report/cautions.ts';
import { sampleCurrentMap } from './sample-current-map.ts';

/**
 * Invented results for tests of reports: shaped as an estimate shapes them (order, signs, levels that add up), but no
 * physics. Every number follows from its frequency; nothing is random.
 */

const REQUIRED_MARGIN_DB = 6;

const powerSum = (levels: readonly number[]): number =>
  10 * Math.log10(levels.reduce((sum, db) => sum + 10 ** (db / 10), 0));
const linearSum = (levels: readonly number[]): number =>
  20 * Math.log10(levels.reduce((sum, db) => sum + 10 ** (db / 20), 0));

/** A bump of so many dB about a resonance. */
const bump = (frequencyHz: number, centreHz: number, heightDb: number): number =>
  heightDb / (1 + ((frequencyHz - centreHz) / (0.12 * centreHz)) ** 2);

function net(name: string, frequencyHz: number, baseDb: number): Contributor {
  const mhz = frequencyHz / 1e6;
  const viaDbuvPerM = {
    pair: baseDb + 20 * Math.log10(mhz / 100) - 8,
    plane: baseDb + 20 * Math.log10(mhz / 100) + bump(frequencyHz, 700e6, 10) - 5,
    'damper cable': baseDb + bump(frequencyHz, 130e6, 16) + bump(frequencyHz, 380e6, 8) - 9 * Math.log10(mhz / 60),
  };
  return { kind: 'net', name, viaDbuvPerM, levelDbuvPerM: powerSum(Object.values(viaDbuvPerM)) - 0.4 };
}

function pointAt(frequencyHz: number, detector: Detector, limitDbuvPerM: number, slopeDb = 0): ResultPoint {
  const mhz = frequencyHz / 1e6;
  const isEven = Math.round(mhz / 25) % 2 === 0;
  const edgeDb = -20 * Math.log10(Math.max(1, mhz / 260)) - slopeDb;
  const contributors: Contributor[] = [
    net('CLK_25M', frequencyHz, (isEven ? 17 : 30) + edgeDb),
    net('SPI_SCK', frequencyHz, (isEven ? 12 : 21) + edgeDb),
    net('DATA0', frequencyHz, 8 + edgeDb),
    net('DATA1', frequencyHz, 7.5 + edgeDb),
    {
      kind: 'loop',
      name: 'converter loop',
      levelDbuvPerM: 22 - 30 * Math.log10(mhz / 30),
      viaDbuvPerM: { loop: 22 - 30 * Math.log10(mhz / 30) },
    },
  ];
  if (mhz <= 300) {
    const levelDbuvPerM = 24 - 12 * Math.log10(mhz / 30);
    contributors.push({
      kind: 'cable',
      name: 'sensor cable',
      levelDbuvPerM,
      viaDbuvPerM: { 'sensor cable': levelDbuvPerM },
    });
  }
  contributors.sort((one, other) => other.levelDbuvPerM - one.levelDbuvPerM);
  const levels = contributors.map(({ levelDbuvPerM }) => levelDbuvPerM);
  const levelDbuvPerM = powerSum(levels);
  const isVertical = mhz < 230 || Math.round(mhz / 75) % 2 === 0;
  const otherDbuvPerM = levelDbuvPerM - 2 - 7 * Math.abs(Math.sin(mhz / 90));
  return {
    frequencyHz,
    detector,
    levelDbuvPerM,
    limitDbuvPerM,
    marginDb: limitDbuvPerM - levelDbuvPerM,
    polarization: isVertical ? 'vertical' : 'horizontal',
    antennaHeightM: isVertical ? 1 + (mhz % 7) / 20 : 1 + (300 / mhz) ** 0.5,
    turntableDeg: (mhz * 7) % 360,
    horizontalDbuvPerM: isVertical ? otherDbuvPerM : levelDbuvPerM,
    verticalDbuvPerM: isVertical ? levelDbuvPerM : otherDbuvPerM,
    upperBoundDbuvPerM: linearSum(levels),
    contributors,
  };
}

const inOrder = (points: ResultPoint[]): ResultPoint[] =>
  points.sort((one, other) => one.marginDb - other.marginDb || one.frequencyHz - other.frequencyHz);

const quasiPeakLimit = (frequencyHz: number): number => (frequencyHz <= 230e6 ? 40 : 47);

/** Rule of the contract ("Verdict"), for invented margins. */
function verdictOf(marginDb: number, requiredDb: number, labDb: number): Verdict {
  if (marginDb < 0) return 'exceeds';
  if (marginDb < requiredDb) return 'falls-short';
  return marginDb < labDb ? 'within-uncertainty' : 'meets';
}

/** A result with the given points in place of the sample's; worst and verdict follow. */
export function resultWith(points: readonly ResultPoint[], changes: Partial<EstimateResult> = {}): EstimateResult {
  const base = { ...frame(), ...changes };
  const ordered = inOrder([...points]);
  const first = ordered[0];
  const { requiredMarginDb, labUncertaintyDb } = base.limit;
  return {
    ...base,
    points: ordered,
    worst: first ? { frequencyHz: first.frequencyHz, marginDb: first.marginDb } : null,
    verdict: first ? verdictOf(first.marginDb, requiredMarginDb, labUncertaintyDb) : 'meets',
  };
}

/** Harmonics of 25 MHz to 1 GHz: some over the limit, some short of 6 dB, most fine. */
export function sampleResult(): EstimateResult {
  const points = Array.from({ length: 39 }, (_, i) => {
    const frequencyHz = 25e6 * (i + 2);
    return pointAt(frequencyHz, 'quasi-peak', quasiPeakLimit(frequencyHz));
  });
  return resultWith(points, { currentMaps: [125e6, 375e6, 75e6].map((hz) => sampleCurrentMap(hz)) });
}

/** As many readings as asked for, evenly spaced to 1 GHz and beyond it with average and peak. */
export function denseResult(count: number): EstimateResult {
  const stepHz = 2e9 / count;
  const points: ResultPoint[] = [];
  for (let i = 0; points.length < count; i++) {
    const frequencyHz = 30e6 + i * stepHz;
    if (frequencyHz <= 1e9) points.push(pointAt(frequencyHz, 'quasi-peak', quasiPeakLimit(frequencyHz), 4));
    else {
      points.push(pointAt(frequencyHz, 'average', frequencyHz <= 3e9 ? 50 : 54, 2));
      points.push(pointAt(frequencyHz, 'peak', frequencyHz <= 3e9 ? 70 : 74, 2));
    }
  }
  const { limit } = frame();
  return resultWith(points, { limit: { ...limit, maxHz: 2e9, maxRule: 'highest clock 150 MHz: 2 GHz' } });
}

/** No line in the judged range. */
export const emptyResult = (): EstimateResult => resultWith([], { caveats: [], findings: [], notes: [] });

export const SAMPLE_LIMIT_LINES: readonly {
  readonly detector: Detector;
  readonly points: readonly (readonly [frequencyHz: number, limitDbuvPerM: number])[];
  readonly label: string;
}[] = [
  {
    detector: 'quasi-peak',
    label: 'CISPR 32 B 3 m, quasi-peak',
    points: [
      [30e6, 40],
      [230e6, 40],
      [230e6, 47],
      [1e9, 47],
    ],
  },
  {
    detector: 'average',
    label: 'CISPR 32 B 3 m, average',
    points: [
      [1e9, 50],
      [3e9, 50],
      [3e9, 54],
      [6e9, 54],
    ],
  },
  {
    detector: 'peak',
    label: 'CISPR 32 B 3 m, peak',
    points: [
      [1e9, 70],
      [3e9, 70],
      [3e9, 74],
      [6e9, 74],
    ],
  },
];

function frame(): Omit<EstimateResult, 'points' | 'worst' | 'verdict'> {
  return {
    format: 'quietboard-result',
    version: 1,
    board: {
      name: 'Greenhouse damper controller',
      revision: 'C',
      sha256: '3f1c9a7e5b2d48060f1e2d3c4b5a69788796a5b4c3d2e1f00112233445566778',
    },
    program: { version: '0.1.0' },
    site: {
      kind: 'ground-plane',
      distanceM: 3,
      measuredFrom: 'boundary',
      orientation: 'flat',
      tableHeightM: 0.8,
      boundaryRadiusM: 0.2593,
    },
    limit: {
      standard: 'CISPR 32',
      class: 'B',
      distanceM: 3,
      requiredMarginDb: REQUIRED_MARGIN_DB,
      edition: 'CISPR 32:2015 with amendment 1:2019',
      source: 'table A.4 as transcribed in a public mail list; the 3 m line is an alternative to 10 m',
      sourceStatus: 'seen (secondary copy)',
      maxHz: 1e9,
      maxRule: 'highest clock 25 MHz: 1 GHz',
      labUncertaintyDb: 6.3,
    },
    structure: 'solved',
    caveats: [
      {
        code: 'permittivity-guessed',
        message:
          'The stackup file gave no permittivity for this layer; 4.3 was taken. Impedance and delay may be off by 5 %.',
        where: 'D2',
        fromHz: 0,
        toHz: 0,
      },
      ...['N$1', 'N$4', 'N$7', 'N$12', 'N$31', 'N$40'].map((where) => ({
        code: 'net-without-drive',
        message: 'The net has traces but no drive: it counts as silent.',
        where,
        fromHz: 0,
        toHz: 0,
      })),
      {
        code: 'plane-cavity-missing',
        message: 'The planes count as one sheet: resonances between power and ground are not in the level.',
        where: '',
        fromHz: 400e6,
        toHz: 1e9,
      },
      {
        code: 'cable-beyond-model',
        message: 'The stated current of this cable was extended with its last value.',
        where: 'sensor cable',
        fromHz: 300e6,
        toHz: 1e9,
      },
    ],
    findings: [
      {
        code: 'plane-gap',
        net: 'CLK_25M',
        message: 'Crosses a 1.5 mm slot in L2 GND; the return goes 11 mm around it: +4.7 dB at 375 MHz.',
        atM: [0.05675, 0.0332],
        layer: 'L4 BOT',
      },
      {
        code: 'layer-change',
        net: 'CLK_25M',
        message: 'Changes its reference from L2 GND to L3 PWR; the nearest stitching via is 8.2 mm away.',
        atM: [0.052, 0.038],
        layer: 'L1 TOP',
      },
      {
        code: 'plane-gap',
        net: 'DATA1',
        message: 'Runs over the split between +3V3 and +12V.',
        atM: [0.0625, 0.047],
        layer: 'L1 TOP',
      },
    ],
    cautions: CAUTIONS,
    notes: ['DATA1: driver pin U1.21 chosen (first output-like pin).', 'SPI_SCK: load pin J3.4 chosen.'],
  };
}
