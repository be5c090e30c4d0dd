import type { EstimatePlan } from '../estimate/plan.ts';
import { emptyIncident } from '../structure/incident.ts';
import { EPSILON0_F_PER_M, MU0_H_PER_M, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { hzToMhz } from '../units/convert.ts';
import { type Check, check } from './check.ts';
import { STRUCTURE_CASES, STRUCTURE_SOURCE_V, type StructureCase, wireOverPlaneOhm } from './structure-cases.ts';
import { edgeCurrentsA, planStructure } from './structure-estimate.ts';

const caseOf = (id: string): StructureCase => STRUCTURE_CASES.find((testCase) => testCase.id === id)!;

/** Board and trace far smaller than the wavelength: both formulas are for that. */
const FREQUENCY_HZ = 30e6;

/**
 * The two closed forms of the trade for the common-mode voltage that a trace drives into cables, beside the solved
 * structure. Shown for information: they are estimates for boards far smaller than cable and wavelength.
 */
export function closedFormChecks(): Check[] {
  return [voltageDriven(), currentDriven()];
}

/**
 * Voltage-driven: an open trace on a board with one cable. Plane as a disk of the same area, trace over its middle:
 *   V_CM/V = (C/ε_r)·h/(4·ε0·A), C the trace's capacitance to the plane.
 * Source: derived by reciprocity from the charge of a disk; the mechanism: D. M. Hockanson et al., IEEE Trans. EMC 38(4),
 * 1996; H.-W. Shim, T. Hubing, IEEE Trans. EMC 47(4), 2005.
 */
function voltageDriven(): Check {
  const testCase = { ...caseOf('cable-open'), loadOhm: 1e6, frequenciesHz: [FREQUENCY_HZ] };
  const capacitanceF = lengthOf(testCase) / (wireOverPlaneOhm(testCase) * SPEED_OF_LIGHT_M_PER_S);
  const areaM2 = testCase.widthM * testCase.heightM;
  return row(
    testCase,
    'voltage-driven',
    'open trace, one cable: (C/ε_r)·h/(4·ε0·A) per volt',
    (STRUCTURE_SOURCE_V * capacitanceF * testCase.traceHeightM) / (4 * EPSILON0_F_PER_M * areaM2),
  );
}

/**
 * Current-driven: a trace with a low load on a board between two cables:
 *   V_CM = ω·L_ret·I, L_ret = µ0·h/(π·W) per length on the middle line of a plane of width W.
 * Source: derived from the current density of a strip; the mechanism: D. M. Hockanson et al., IEEE Trans. EMC 38(4), 1996.
 */
function currentDriven(): Check {
  const base = caseOf('cable-open');
  const opposite = {
    name: 'OPPOSITE',
    farEnd: 'open',
    pointsM: [
      [0, 0.03, 0],
      [-1, 0.03, 0],
    ],
  } as const;
  const testCase = { ...base, loadOhm: 1, cables: [...base.cables, opposite], frequenciesHz: [FREQUENCY_HZ] };
  const omega = 2 * Math.PI * FREQUENCY_HZ;
  const inductanceH = (lengthOf(testCase) * wireOverPlaneOhm(testCase)) / SPEED_OF_LIGHT_M_PER_S;
  const currentA = STRUCTURE_SOURCE_V / Math.hypot(testCase.sourceOhm + testCase.loadOhm, omega * inductanceH);
  const returnH = (lengthOf(testCase) * MU0_H_PER_M * testCase.traceHeightM) / (Math.PI * testCase.heightM);
  return row(testCase, 'current-driven', 'loaded trace between two cables: ω·L_ret·I', omega * returnH * currentA);
}

const lengthOf = ({ traceM: [from, to] }: StructureCase): number => Math.hypot(to[0] - from[0], to[1] - from[1]);

function row(testCase: StructureCase, id: string, quantity: string, expectedV: number): Check {
  return check({
    id: `structure-${id}`,
    source: 'closed form derived by reciprocity; mechanism: Hockanson et al., IEEE Trans. EMC 38(4), 1996',
    sourceStatus: 'derived',
    quantity: `common-mode voltage at the joint, ${quantity}, ${hzToMhz(FREQUENCY_HZ)} MHz`,
    unit: 'dBµV',
    expected: 20 * Math.log10(expectedV / 1e-6),
    computed: 20 * Math.log10(equivalentVoltageV(planStructure(testCase)) / 1e-6),
    tolerance: 0,
    isInformation: true,
  });
}

/** Voltage at the first cable's joint that would drive the same current into it as the net does, V (peak). */
function equivalentVoltageV(plan: EstimatePlan): number {
  const structure = plan.scene.structure!;
  const edge = structure.mesh.wireEdgeStart[0]!;
  const driven = edgeCurrentsA(plan, plan.table[0]!);
  const incident = emptyIncident(structure.mesh);
  incident.emfRe[edge] = 1;
  const { re, im } = structure.solverAt(FREQUENCY_HZ).solve(incident);
  return Math.hypot(driven[2 * edge]!, driven[2 * edge + 1]!) / Math.hypot(re[edge]!, im[edge]!);
}
