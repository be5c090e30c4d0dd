import {
  comparedComponents,
  fieldVPerM,
  NEC_DISTANCES_M,
  type NecCase,
  type NecMaximum,
} from '../../app/validate/nec-cases.ts';

import { runNec2c } from '../support/nec2c.ts';
import { maximaOf } from './maxima.ts';
import { meshOf, type ScanGrid, scanColumns, twoWireDeck } from './two-wire-model.ts';

/** Pieces on an end wire of the coarse model; the fine one has twice as many and one (odd again). */
export const COARSE_END_SEGMENTS = 5;

/** A scan fine enough for the parabola to be right to 0.01 dB at 800 MHz. */
const scanAt = (distanceM: number): ScanGrid => ({ distanceM, angleStepDeg: 5, heightStepM: 0.05 });

/** Maxima of a case at every distance and frequency, by nec2c. */
export async function solveCase(testCase: NecCase, endSegments: number): Promise<NecMaximum[]> {
  const scans = NEC_DISTANCES_M.map(scanAt);
  const columns = scans.map(scanColumns);
  const results = await runNec2c(twoWireDeck(testCase, meshOf(testCase, endSegments), columns.flat()));
  return scans.flatMap((scan, index) => {
    const firstGrid = columns.slice(0, index).reduce((sum, list) => sum + list.length, 0);
    return results.map((result) => ({
      caseId: testCase.id,
      distanceM: scan.distanceM,
      frequencyHz: result.frequencyHz,
      ...maximaOf(result, scan, firstGrid),
    }));
  });
}

/** Change of a maximum between two models, dB: the larger of the components that are compared. */
export const changeDb = (one: NecMaximum, other: NecMaximum): number =>
  Math.max(
    ...comparedComponents(one).map((component) =>
      Math.abs(20 * Math.log10(fieldVPerM(one, component) / fieldVPerM(other, component))),
    ),
  );
