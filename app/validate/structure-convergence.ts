import { hzToMhz } from '../units/convert.ts';
import { type Check, check } from './check.ts';
import { STRUCTURE_CASES, type StructureCase } from './structure-cases.ts';
import { compareStructure } from './structure-compare.ts';
import { estimateStructure } from './structure-estimate.ts';

const caseOf = (id: string): StructureCase => STRUCTURE_CASES.find((testCase) => testCase.id === id)!;

const SMALL = caseOf('plane-60x40');
/** The small plane with a cable of another case: halved cells stay quick to solve. */
const withCable = (id: string, frequenciesHz: readonly number[]): StructureCase => ({
  ...SMALL,
  id: `${SMALL.id}-${id}`,
  orientation: caseOf(id).orientation,
  cables: caseOf(id).cables.map((cable) => ({
    ...cable,
    pointsM: cable.pointsM.map(([x, y, z]) => [x - 0.04, Math.abs(y - 0.03) < 1e-9 ? 0.0225 : y, z] as const),
  })),
  frequenciesHz,
});

/** Cells halved; no caveat of an opening or of coarse cells applies to these. */
export const HALVED_CASES: readonly StructureCase[] = [
  { ...SMALL, frequenciesHz: [30e6, 400e6, 1000e6] },
  { ...caseOf('plane-80x50-220ohm'), frequenciesHz: [200e6, 1000e6] },
  withCable('cable-open', [30e6, 400e6]),
  withCable('cable-upright-grounded', [200e6]),
];
export const HALVED_TOLERANCE_DB = 0.5;

/** What cells of 5 mm give against cells of 2.5 mm. */
export const halvedComparisons = (testCase: StructureCase) =>
  compareStructure(testCase, estimateStructure(testCase, 2.5e-3), estimateStructure(testCase, 5e-3));

/** From 0.1 to 5 mm, thirteen thicknesses in equal ratios. */
export const THICKNESSES_M: readonly number[] = Array.from({ length: 13 }, (_, i) => 1e-4 * 50 ** (i / 12));

/**
 * Horizontal and vertical maximum and cable currents of a case per thickness of the dielectric (V/m² and A/m), one row a
 * thickness. h/a is kept, so the line stays the same (Z0 = 60·acosh(h/a)) and only the geometry of pair and structure changes.
 */
export const levelsPerThickness = (testCase: StructureCase, frequencyHz: number): number[][] =>
  THICKNESSES_M.map((traceHeightM) => {
    const scaled = { ...testCase, traceHeightM, traceRadiusM: traceHeightM / 12, frequenciesHz: [frequencyHz] };
    const [row] = estimateStructure(scaled);
    return [row!.horizontalVPerM, row!.verticalVPerM, ...row!.cableCurrentsA].map((value) => value / traceHeightM);
  });

/** Largest second difference of a series in dB: zero for a power law. */
export function roughnessDb(values: readonly number[]): number {
  const db = values.map((value) => 20 * Math.log10(value));
  return Math.max(...db.slice(2).map((value, i) => Math.abs(value - 2 * db[i + 1]! + db[i]!)));
}

/** The cases of the thickness rows, with the frequency each is taken at. */
export const THICKNESS_CASES: readonly (readonly [StructureCase, number])[] = [
  [caseOf('plane-80x50-220ohm'), 100e6],
  [caseOf('plane-80x50-220ohm'), 700e6],
  [withCable('cable-open', []), 200e6],
];

/** Rows on what must not depend on the program's own choices: cell size, and the thickness it is far above. */
export const convergenceChecks = (): Check[] => [
  ...HALVED_CASES.map(halvedRow),
  ...THICKNESS_CASES.flatMap(([testCase, frequencyHz]) => thicknessRows(testCase, frequencyHz)),
];

function halvedRow(testCase: StructureCase): Check {
  const worst = halvedComparisons(testCase).reduce((one, other) =>
    Math.abs(other.differenceDb) > Math.abs(one.differenceDb) ? other : one,
  );
  return check({
    id: `structure-halved-${testCase.id}`,
    source: 'law: the answer must not depend on the cells',
    sourceStatus: 'derived',
    quantity: `${testCase.id}: change of all levels and cable currents when 5 mm cells are halved; worst: ${worst.quantity} at ${hzToMhz(worst.frequencyHz)} MHz`,
    unit: 'dB',
    expected: 0,
    computed: worst.differenceDb,
    tolerance: HALVED_TOLERANCE_DB,
  });
}

/** Proportional to h where it is small; the slope on log scales changes by less than 0.1 dB a step up to 5 mm. */
function thicknessRows(testCase: StructureCase, frequencyHz: number): Check[] {
  const rows = levelsPerThickness(testCase, frequencyHz);
  const series = rows[0]!.map((_, quantity) => rows.map((row) => row[quantity]!));
  const firstStepsDb = series.map(([first, , third]) => 20 * Math.log10(third! / first!));
  const worstStepDb = firstStepsDb.reduce((one, other) => (Math.abs(other) > Math.abs(one) ? other : one));
  const common = { sourceStatus: 'derived', unit: 'dB', expected: 0 } as const;
  const what = `${testCase.id}, ${hzToMhz(frequencyHz)} MHz, all levels and cable currents`;
  const id = `structure-thickness-${testCase.id}-${hzToMhz(frequencyHz)}mhz`;
  return [
    check({
      ...common,
      id: `${id}-small`,
      source: 'law: field and currents of a pair far closer than all else are proportional to its height',
      quantity: `${what}: level per thickness at 0.19 mm against 0.1 mm of dielectric`,
      computed: worstStepDb,
      tolerance: 0.17,
    }),
    check({
      ...common,
      id: `${id}-smooth`,
      source: 'law: no step where the thickness passes the cells’ or the trace’s sizes',
      quantity: `${what}: largest second difference over thirteen thicknesses from 0.1 to 5 mm`,
      computed: Math.max(...series.map(roughnessDb)),
      tolerance: 0.1,
    }),
  ];
}
