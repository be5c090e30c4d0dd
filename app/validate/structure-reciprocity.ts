import type { Point3M } from '../board/board.ts';
import type { Radiator } from '../fields/element-set.ts';
import { fieldAtAntenna } from '../site/scan.ts';
import { LoopCoupling } from '../structure/couplings.ts';
import { emptyIncident } from '../structure/incident.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { STRUCTURE_DISTANCE_M, type StructureCase } from './structure-cases.ts';
import { edgeCurrentsA, planStructure } from './structure-estimate.ts';

/** A small loop of wire at the antenna's place, in the plane of the horizontal and the vertical component. */
const SIDE_M = 0.02;
const HEIGHT_M = 1.7;
const ANGLE_RAD = 0.9;
const TABLE_HEIGHT_M = 0.8;

type Complex = readonly [re: number, im: number];

/**
 * One number in two ways (reciprocity): the e.m.f. that a case's structure currents I make in the loop, ∮ E·dl by the field
 * kernels of the site scan; and Σ I·v with the e.m.f. v that the loop with 1 A makes in the structure, by the kernels of the
 * partial elements. Re, im, V. The first of the case's frequencies; flat boards.
 */
export function farLoopReaction(testCase: StructureCase): { readonly byField: Complex; readonly byReaction: Complex } {
  const plan = planStructure(testCase);
  const lines = plan.table[0]!;
  const structure = plan.scene.structure!;
  const currentsA = edgeCurrentsA(plan, lines);
  const radiators = structure.parts.map(
    ({ edges, elements }): Radiator => ({
      elements,
      currentsA: Float64Array.from(edges.flatMap((edge) => [currentsA[2 * edge]!, currentsA[2 * edge + 1]!])),
    }),
  );
  const around = (component: 'horizontal' | 'vertical', across: number, up: number, sign: number): Complex => {
    const distanceM = STRUCTURE_DISTANCE_M;
    const [re, im] = fieldAtAntenna(radiators, component, ANGLE_RAD + Math.atan2(across, distanceM), HEIGHT_M + up, {
      kPerM: (2 * Math.PI * lines.frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
      scanRadiusM: Math.hypot(distanceM, across),
      site: 'ground-plane',
      box: null,
    });
    return [sign * SIDE_M * re!, sign * SIDE_M * im!];
  };
  const half = SIDE_M / 2;
  const sides = [
    around('horizontal', 0, -half, 1),
    around('vertical', half, 0, 1),
    around('horizontal', 0, half, -1),
    around('vertical', -half, 0, -1),
  ];
  const sum = (part: 0 | 1): number => sides.reduce((total, side) => total + side[part], 0);

  const corner = (across: number, up: number): Point3M => {
    const [cos, sin] = [Math.cos(ANGLE_RAD), Math.sin(ANGLE_RAD)];
    return [
      STRUCTURE_DISTANCE_M * cos - across * sin + testCase.widthM / 2,
      STRUCTURE_DISTANCE_M * sin + across * cos + testCase.heightM / 2,
      HEIGHT_M + up - TABLE_HEIGHT_M,
    ];
  };
  const pointsM = [corner(-half, -half), corner(half, -half), corner(half, half), corner(-half, half)];
  const loop = { name: 'antenna', pointsM, waveform: '', delayS: 0, isInverted: false };
  const incident = emptyIncident(structure.mesh);
  new LoopCoupling(structure, loop).addTo(incident, lines.frequencyHz, 1, 0);
  let re = 0;
  let im = 0;
  for (let e = 0; e < structure.mesh.edgeCount; e++) {
    const [iRe, iIm] = [currentsA[2 * e]!, currentsA[2 * e + 1]!];
    re += iRe * incident.emfRe[e]! - iIm * incident.emfIm[e]!;
    im += iRe * incident.emfIm[e]! + iIm * incident.emfRe[e]!;
  }
  return { byField: [sum(0), sum(1)], byReaction: [re, im] };
}
