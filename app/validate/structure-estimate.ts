import { solveShare } from '../estimate/estimate.ts';
import type { EstimateRequest } from '../estimate/estimate-request.ts';
import { type EstimatePlan, planEstimate } from '../estimate/plan.ts';
import type { FrequencyLines } from '../estimate/spectrum-table.ts';
import { StructureResponder } from '../estimate/structure-responder.ts';
import { chooseLimits } from '../limits/choose.ts';
import { mhzToHz } from '../units/convert.ts';
import { structureBoard } from './structure-board.ts';
import { STRUCTURE_DISTANCE_M, type StructureCase, type StructureMaximum } from './structure-cases.ts';

/** The case's scene and spectral lines. `cellM`: other cells than the program's own choice. */
export const planStructure = (testCase: StructureCase, cellM?: number): EstimatePlan =>
  planEstimate(structureBoard(testCase, cellM), requestFor(testCase));

/** The case through the estimate, planes and cables solved. */
export function estimateStructure(testCase: StructureCase, cellM?: number): StructureMaximum[] {
  const plan = planStructure(testCase, cellM);
  return solveShare(plan, { index: 0, of: 1 }).map((level, i) => {
    const lines = plan.table[i]!;
    return {
      caseId: testCase.id,
      frequencyHz: lines.frequencyHz,
      horizontalVPerM: level?.horizontalVPerM ?? Number.NaN,
      verticalVPerM: level?.verticalVPerM ?? Number.NaN,
      cableCurrentsA: testCase.cables.length > 0 ? largestCableCurrentsA(plan, lines) : [],
    };
  });
}

function largestCableCurrentsA(plan: EstimatePlan, lines: FrequencyLines): number[] {
  const { mesh } = plan.scene.structure!;
  const currentsA = edgeCurrentsA(plan, lines);
  return mesh.wires.map(({ pieces }, i) => {
    const first = mesh.wireEdgeStart[i]!;
    return largestMagnitude(currentsA.subarray(2 * first, 2 * (first + pieces.length)));
  });
}

/** Currents of the structure's edges (complex pairs, A) at one frequency; one net, so one domain. */
export function edgeCurrentsA({ scene }: EstimatePlan, lines: FrequencyLines): Float64Array {
  const answer = new StructureResponder(scene, scene.structure!, [lines.frequencyHz]).answer(lines);
  return [...answer!.currentsByDomain.values()][0]!;
}

const requestFor = ({ orientation }: StructureCase): EstimateRequest => ({
  limits: chooseLimits({ standard: 'CISPR 32', class: 'B', distanceM: STRUCTURE_DISTANCE_M, convertDistance: true }),
  site: { kind: 'ground-plane', distanceM: STRUCTURE_DISTANCE_M, measuredFrom: 'center', orientation },
  structure: 'solved',
  maxHz: mhzToHz(1000),
  requiredMarginDb: 0,
  boardSha256: '',
  programVersion: '',
  notes: [],
});

/** Of complex pairs. */
function largestMagnitude(pairs: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < pairs.length; i += 2) largest = Math.max(largest, Math.hypot(pairs[i]!, pairs[i + 1]!));
  return largest;
}
