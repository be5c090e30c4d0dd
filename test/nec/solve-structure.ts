import { STRUCTURE_DISTANCE_M, type StructureCase, type StructureMaximum } from '../../app/validate/structure-cases.ts';
import { type NecFrequencyResult, runNec2c } from '../support/nec2c.ts';
import { FIRST_CABLE, gridDeck } from './grid-model.ts';
import { maximaOf } from './maxima.ts';
import { type ScanGrid, scanColumns } from './two-wire-model.ts';

/** Fine enough for the parabola through neighbours: fringes over height are 0.5 m long at 1 GHz. */
const SCAN: ScanGrid = { distanceM: STRUCTURE_DISTANCE_M, angleStepDeg: 10, heightStepM: 0.1 };

/** Maxima of a case by nec2c, one row a frequency. */
export async function solveStructure(
  testCase: StructureCase,
  divisions: number,
  frequenciesHz: readonly number[],
  scan: ScanGrid = SCAN,
): Promise<StructureMaximum[]> {
  const results = await runNec2c(gridDeck(testCase, divisions, frequenciesHz, scanColumns(scan)));
  return results.map((result) => ({
    caseId: testCase.id,
    frequencyHz: result.frequencyHz,
    ...maximaOf(result, scan, 0),
    cableCurrentsA: testCase.cables.map((_, i) => largestCurrentA(result, FIRST_CABLE + i)),
  }));
}

const largestCurrentA = ({ currents }: NecFrequencyResult, tag: number): number =>
  Math.max(...currents.filter((one) => one.tag === tag).map(({ currentA }) => Math.hypot(currentA.re, currentA.im)));
