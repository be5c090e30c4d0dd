import type { EstimateRequest } from '../estimate/estimate-request.ts';
import { lineLevel } from '../estimate/line-level.ts';
import { type EstimatePlan, planEstimate } from '../estimate/plan.ts';
import type { FrequencyLines } from '../estimate/spectrum-table.ts';
import { type StructureAnswer, StructureResponder } from '../estimate/structure-responder.ts';
import { chooseLimits } from '../limits/choose.ts';
import type { Mesh } from '../structure/mesh.ts';
import { mhzToHz } from '../units/convert.ts';
import { structureBoard } from './structure-board.ts';
import { STRUCTURE_DISTANCE_M, type StructureCase, type StructureMaximum } from './structure-cases.ts';

/** The case's scene and spectral lines. `cellM`: other cells than the program's own choice. */
export const planStructure = (testCase: StructureCase, cellM?: number): EstimatePlan =>
  planEstimate(structureBoard(testCase, cellM), requestFor(testCase));

/** Keeps its last answer, so that level and cable currents come from one solution. */
class LastAnswerResponder extends StructureResponder {
  #last: { readonly lines: FrequencyLines; readonly answer: StructureAnswer | null } | null = null;

  override answer(lines: FrequencyLines): StructureAnswer | null {
    if (this.#last?.lines !== lines) this.#last = { lines, answer: super.answer(lines) };
    return this.#last.answer;
  }
}

/** The case as the estimate solves and scans it, planes and cables solved. */
export function estimateStructure(testCase: StructureCase, cellM?: number): StructureMaximum[] {
  const { scene, table } = planStructure(testCase, cellM);
  const structure = scene.structure!;
  const responder = new LastAnswerResponder(
    scene,
    structure,
    table.map(({ frequencyHz }) => frequencyHz),
  );
  return table.map((lines) => {
    const level = lineLevel(scene, lines, responder);
    return {
      caseId: testCase.id,
      frequencyHz: lines.frequencyHz,
      horizontalVPerM: level?.horizontalVPerM ?? Number.NaN,
      verticalVPerM: level?.verticalVPerM ?? Number.NaN,
      cableCurrentsA: largestCableCurrentsA(structure.mesh, currentsOf(responder.answer(lines))),
    };
  });
}

function largestCableCurrentsA({ wires, wireEdgeStart }: Mesh, currentsA: Float64Array): number[] {
  return wires.map(({ pieces }, i) =>
    largestMagnitude(currentsA.subarray(2 * wireEdgeStart[i]!, 2 * (wireEdgeStart[i]! + pieces.length))),
  );
}

/** One net, so one domain. */
const currentsOf = (answer: StructureAnswer | null): Float64Array => [...answer!.currentsByDomain.values()][0]!;

/** Currents of the structure's edges (complex pairs, A) at one frequency. */
export const edgeCurrentsA = ({ scene }: EstimatePlan, lines: FrequencyLines): Float64Array =>
  currentsOf(new StructureResponder(scene, scene.structure!, [lines.frequencyHz]).answer(lines));

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
