import { hzToMhz, peakFieldToDbuvPerM } from '../units/convert.ts';
import { type Check, check } from './check.ts';
import { STRUCTURE_CASES, STRUCTURE_DISTANCE_M, type StructureCase, type StructureMaximum } from './structure-cases.ts';
import { closedFormChecks } from './structure-closed-forms.ts';
import { compareStructure, type StructureComparison } from './structure-compare.ts';
import { convergenceChecks } from './structure-convergence.ts';
import { estimateStructure } from './structure-estimate.ts';
import { structureLawChecks } from './structure-law-checks.ts';
import { STRUCTURE_MAXIMA } from './structure-maxima.ts';
import { resonanceOf } from './structure-resonance.ts';

const SOURCE = 'nec2c (NEC-2 moment method, Debian), wire grid over perfect ground; generator test/nec/generate.mjs';

/** Reference and estimate of all values of a case. */
export const structureComparisons = (testCase: StructureCase): StructureComparison[] =>
  compareStructure(testCase, storedRows(testCase), estimateStructure(testCase));

const storedRows = ({ id }: StructureCase): StructureMaximum[] =>
  STRUCTURE_MAXIMA.filter(({ caseId }) => caseId === id);

/** Bands with one tolerance, dB. Planes and slots: 1.5 dB to 700 MHz, 2 dB to 1 GHz; with cables 1.5 dB. */
interface Band {
  readonly toHz: number;
  readonly toleranceDb: number;
}

export const bandsOf = ({ cables }: StructureCase): readonly Band[] =>
  cables.length > 0
    ? [{ toHz: 400e6, toleranceDb: 1.5 }]
    : [
        { toHz: 700e6, toleranceDb: 1.5 },
        { toHz: 1000e6, toleranceDb: 2 },
      ];
export const RESONANCE_TOLERANCE_DB = 3;
export const RESONANCE_TOLERANCE = 0.01;

/** Whole boards, planes and cables solved, against stored answers of a general solver: one row a case, band and quantity. */
export function structureChecks(): Check[] {
  const rows = STRUCTURE_CASES.flatMap((testCase) =>
    testCase.isResonance ? resonanceRows(testCase) : levelRows(testCase),
  );
  return [...rows, ...structureLawChecks(), ...convergenceChecks(), ...closedFormChecks()];
}

function levelRows(testCase: StructureCase): Check[] {
  const all = structureComparisons(testCase);
  return bandsOf(testCase).flatMap(({ toHz, toleranceDb }, i, bands) => {
    const fromHz = bands[i - 1]?.toHz ?? 0;
    const own = all.filter(({ frequencyHz }) => frequencyHz > fromHz * (1 + 1e-9) && frequencyHz <= toHz * (1 + 1e-9));
    return [...new Set(own.map(({ quantity }) => quantity))].map((quantity) =>
      levelRow(testCase, toHz, toleranceDb, worstOf(own.filter((one) => one.quantity === quantity))),
    );
  });
}

/** NaN (no such line in the result) is the worst: it must not hide. */
const sizeDb = ({ differenceDb }: StructureComparison): number =>
  Number.isNaN(differenceDb) ? Infinity : Math.abs(differenceDb);
const worstOf = (compared: readonly StructureComparison[]): StructureComparison =>
  compared.reduce((worst, one) => (sizeDb(one) > sizeDb(worst) ? one : worst));

function levelRow(testCase: StructureCase, toHz: number, toleranceDb: number, worst: StructureComparison): Check {
  const { quantity, frequencyHz, expected, computed } = worst;
  const isField = quantity === 'horizontal' || quantity === 'vertical';
  const toDb = isField ? peakFieldToDbuvPerM : peakCurrentToDbua;
  return check({
    id: `structure-${testCase.id}-${quantity.replace(' ', '-')}-${hzToMhz(toHz)}mhz`,
    source: SOURCE,
    sourceStatus: 'reference solver',
    quantity: `${describe(testCase)}: ${isField ? `${quantity} maximum at ${STRUCTURE_DISTANCE_M} m` : `largest current of ${quantity}`}, worst frequency ${hzToMhz(frequencyHz)} MHz`,
    unit: isField ? 'dBµV/m' : 'dBµA',
    expected: toDb(expected),
    computed: toDb(computed),
    tolerance: toleranceDb,
  });
}

function resonanceRows(testCase: StructureCase): Check[] {
  const expected = resonanceOf(storedRows(testCase));
  const computed = resonanceOf(estimateStructure(testCase));
  const row = { source: SOURCE, sourceStatus: 'reference solver' } as const;
  return [
    check({
      ...row,
      id: `structure-${testCase.id}-frequency`,
      quantity: `${describe(testCase)}: frequency of the resonance`,
      unit: 'MHz',
      expected: hzToMhz(expected.frequencyHz),
      computed: hzToMhz(computed.frequencyHz),
      tolerance: RESONANCE_TOLERANCE * hzToMhz(expected.frequencyHz),
    }),
    check({
      ...row,
      id: `structure-${testCase.id}-level`,
      quantity: `${describe(testCase)}: level of the resonance at ${STRUCTURE_DISTANCE_M} m`,
      unit: 'dBµV/m',
      expected: peakFieldToDbuvPerM(expected.fieldVPerM),
      computed: peakFieldToDbuvPerM(computed.fieldVPerM),
      tolerance: RESONANCE_TOLERANCE_DB,
    }),
  ];
}

/** Rms, dB over 1 µA. */
const peakCurrentToDbua = (currentPeakA: number): number => 20 * Math.log10(currentPeakA / Math.SQRT2 / 1e-6);

function describe({ widthM, heightM, loadOhm, slotM, cables, orientation }: StructureCase): string {
  const size = `${Math.round(1e3 * widthM)} × ${Math.round(1e3 * heightM)} mm`;
  const ends = cables.map(({ farEnd }) => (farEnd === 'open' ? 'open' : 'grounded')).join(' and ');
  const extras = [
    orientation === 'upright' ? ', upright' : '',
    slotM === undefined ? '' : `, slot of ${Math.round(1e3 * (slotM[1][1] - slotM[0][1]))} mm`,
    ends === '' ? '' : `, ${cables.length > 1 ? 'cables' : 'cable'} ${ends}`,
  ];
  return `plane ${size}${extras.join('')}, load ${loadOhm} Ω`;
}
