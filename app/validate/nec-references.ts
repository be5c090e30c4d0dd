import type { Board } from '../board/board.ts';
import { parseBoardFile, toBoard } from '../board/parse-board.ts';
import { estimate } from '../estimate/estimate.ts';
import type { Polarization, ResultPoint } from '../estimate/result.ts';
import { chooseLimits } from '../limits/choose.ts';
import { hzToMhz, mhzToHz, mToMm, peakFieldToDbuvPerM } from '../units/convert.ts';
import { type Check, check } from './check.ts';
import {
  comparedComponents,
  fieldVPerM,
  NEC_CASES,
  NEC_DISTANCES_M,
  NEC_SOURCE_V,
  type NecCase,
  type NecMaximum,
  twoWireImpedanceOhm,
} from './nec-cases.ts';
import { NEC_MAXIMA } from './nec-maxima.ts';

/** Lines: both components that count. Wide loops: the stronger one. */
const LINE_TOLERANCE_DB = 0.5;
const WIDE_LOOP_TOLERANCE_DB = 1;

/** The case as a board a user would draw: trace and named return, measured impedance, no plane. */
function necBoard(testCase: NecCase): Board {
  const lengthMm = mToMm(testCase.lengthM);
  const spacingMm = mToMm(testCase.spacingM);
  const turn = ([along, across]: readonly [number, number]): [number, number] =>
    testCase.along === 'x' ? [along, across] : [-across, along];
  const corners = [
    [0, spacingMm],
    [lengthMm, spacingMm],
    [0, 0],
    [lengthMm, 0],
  ] as const;
  const [start, end, returnStart, returnEnd] = corners.map(turn) as [number, number][];
  return toBoard(
    parseBoardFile({
      format: 'quietboard-board',
      version: 1,
      name: testCase.id,
      outline: [{ pointsMm: [returnStart, returnEnd, end, start] }],
      stackup: [{ name: 'TOP', kind: 'copper', thicknessMm: 0 }],
      nets: [
        {
          name: 'LINE',
          traces: [{ layer: 'TOP', widthMm: 2 * mToMm(testCase.wireRadiusM), pointsMm: [start, end] }],
          pins: [
            { name: 'source', atMm: start, layer: 'TOP' },
            { name: 'load', atMm: end, layer: 'TOP' },
          ],
          z0Ohm: twoWireImpedanceOhm(testCase),
          epsilonEff: 1,
          returnPath: { layer: 'TOP', pointsMm: [returnStart, returnEnd] },
        },
      ],
      waveforms: [
        {
          name: 'lines',
          kind: 'lines',
          lines: testCase.frequenciesHz.map((frequencyHz) => ({
            frequencyMhz: hzToMhz(frequencyHz),
            amplitudeV: NEC_SOURCE_V,
            phaseDeg: 0,
          })),
        },
      ],
      drives: [{ net: 'LINE', pin: 'source', waveform: 'lines', sourceOhm: testCase.sourceOhm }],
      loads: [{ net: 'LINE', pin: 'load', resistanceOhm: testCase.loadOhm }],
    }),
  ).board;
}

/** The case through the whole estimate, one point a frequency. */
function estimateCase(testCase: NecCase, distanceM: number): readonly ResultPoint[] {
  const site = { kind: 'ground-plane', distanceM, measuredFrom: 'center', orientation: testCase.orientation } as const;
  return estimate(necBoard(testCase), {
    limits: chooseLimits({ standard: 'CISPR 32', class: 'B', distanceM, convertDistance: false }),
    site,
    structure: 'pair-only',
    maxHz: mhzToHz(1000),
    requiredMarginDb: 0,
    boardSha256: '',
    programVersion: '',
    notes: [],
  }).points;
}

/** One component at one frequency: reference and estimate, dBµV/m (rms). */
export interface NecComparison {
  readonly frequencyHz: number;
  readonly component: Polarization;
  readonly expectedDbuvPerM: number;
  readonly computedDbuvPerM: number;
}

/** Everything that is compared of a case at a distance. */
export function compareCase(testCase: NecCase, distanceM: number): NecComparison[] {
  const points = new Map(
    estimateCase(testCase, distanceM).map((point) => [Math.round(point.frequencyHz), point] as const),
  );
  const own = NEC_MAXIMA.filter((maximum) => maximum.caseId === testCase.id && maximum.distanceM === distanceM);
  return own.flatMap((maximum) =>
    componentsOf(testCase, maximum).map((component) => {
      const point = points.get(Math.round(maximum.frequencyHz));
      const level = component === 'horizontal' ? point?.horizontalDbuvPerM : point?.verticalDbuvPerM;
      return {
        frequencyHz: maximum.frequencyHz,
        component,
        expectedDbuvPerM: peakFieldToDbuvPerM(fieldVPerM(maximum, component)),
        computedDbuvPerM: level ?? Number.NaN,
      };
    }),
  );
}

const componentsOf = (testCase: NecCase, maximum: NecMaximum): Polarization[] =>
  testCase.kind === 'line' ? comparedComponents(maximum) : comparedComponents(maximum).slice(0, 1);

const necToleranceDb = ({ kind }: NecCase): number => (kind === 'line' ? LINE_TOLERANCE_DB : WIDE_LOOP_TOLERANCE_DB);

/** One row a case, distance and component: the frequency where estimate and reference differ most. */
export function necChecks(): Check[] {
  return NEC_CASES.flatMap((testCase) =>
    NEC_DISTANCES_M.flatMap((distanceM) => {
      const compared = compareCase(testCase, distanceM);
      return (['horizontal', 'vertical'] as const).flatMap((component) => {
        const worst = compared
          .filter((one) => one.component === component)
          .sort((one, other) => differenceDb(other) - differenceDb(one))[0];
        return worst === undefined ? [] : [necRow(testCase, distanceM, worst)];
      });
    }),
  );
}

/** NaN (no such line in the result) sorts first: it must not hide. */
const differenceDb = ({ expectedDbuvPerM, computedDbuvPerM }: NecComparison): number =>
  Number.isNaN(computedDbuvPerM) ? Infinity : Math.abs(computedDbuvPerM - expectedDbuvPerM);

function necRow(testCase: NecCase, distanceM: number, worst: NecComparison): Check {
  const stands = testCase.orientation === 'flat' ? 'flat' : `upright, wires along ${testCase.along}`;
  return check({
    id: `nec-${testCase.id}-${distanceM}m-${worst.component}`,
    source: 'nec2c (NEC-2 moment method, Debian), thin-wire model over perfect ground; generator test/nec/generate.mjs',
    sourceStatus: 'reference solver',
    quantity: `${testCase.kind === 'line' ? 'two-wire line' : 'wide loop'} ${mToMm(testCase.lengthM).toFixed(0)} × ${mToMm(testCase.spacingM).toFixed(0)} mm, ${testCase.sourceOhm} Ω to ${testCase.loadOhm} Ω, ${stands}, ${distanceM} m: ${worst.component} maximum, worst frequency ${hzToMhz(worst.frequencyHz)} MHz`,
    unit: 'dBµV/m',
    expected: worst.expectedDbuvPerM,
    computed: worst.computedDbuvPerM,
    tolerance: necToleranceDb(testCase),
  });
}
