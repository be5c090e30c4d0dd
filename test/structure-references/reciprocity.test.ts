import { describe, expect, it } from 'vitest';
import type { Radiator } from '../../app/fields/element-set.ts';
import { fieldAtAntenna } from '../../app/site/scan.ts';
import { LoopCoupling } from '../../app/structure/couplings.ts';
import { emptyIncident } from '../../app/structure/incident.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { STRUCTURE_CASES } from '../../app/validate/structure-cases.ts';
import { edgeCurrentsA, planStructure } from '../../app/validate/structure-estimate.ts';
import { expectClose } from '../support/expect-close.ts';

/** A small loop of wire at the antenna's place, in the plane of the horizontal and the vertical component. */
const DISTANCE_M = 3;
const SIDE_M = 0.02;
const HEIGHT_M = 1.7;
const ANGLE_RAD = 0.9;

type Complex = readonly [re: number, im: number];

describe('reciprocity between structure and antenna', () => {
  it.each([
    ['plane-80x50-220ohm', 200e6],
    ['cable-grounded', 200e6],
    ['cable-bend', 150e6],
  ])(
    '%s at %s Hz: the e.m.f. its currents make in a far loop is what the loop’s field makes of them',
    (id, frequencyHz) => {
      const testCase = { ...STRUCTURE_CASES.find((one) => one.id === id)!, frequenciesHz: [frequencyHz] };
      const plan = planStructure(testCase);
      const structure = plan.scene.structure!;
      const currentsA = edgeCurrentsA(plan, plan.table[0]!);

      // Way 1: the radiated field around the loop, ∮ E·dl, by the field kernels of the site scan.
      const radiators = structure.parts.map(
        ({ edges, elements }): Radiator => ({
          elements,
          currentsA: Float64Array.from(edges.flatMap((edge) => [currentsA[2 * edge]!, currentsA[2 * edge + 1]!])),
        }),
      );
      const around = (component: 'horizontal' | 'vertical', across: number, up: number): Complex =>
        fieldAtAntenna(radiators, component, ANGLE_RAD + Math.atan2(across, DISTANCE_M), HEIGHT_M + up, {
          kPerM: (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
          scanRadiusM: Math.hypot(DISTANCE_M, across),
          site: 'ground-plane',
          box: null,
        });
      const half = SIDE_M / 2;
      const sides = [
        around('horizontal', 0, -half),
        around('vertical', half, 0),
        negative(around('horizontal', 0, half)),
        negative(around('vertical', -half, 0)),
      ];
      const emf: Complex = [SIDE_M * sum(sides.map(([re]) => re)), SIDE_M * sum(sides.map(([, im]) => im))];

      // Way 2: the loop with 1 A as a source that drives the structure, by the kernels of the partial elements.
      const corner = (across: number, up: number) => {
        const [cos, sin] = [Math.cos(ANGLE_RAD), Math.sin(ANGLE_RAD)];
        return [
          DISTANCE_M * cos - across * sin + testCase.widthM / 2,
          DISTANCE_M * sin + across * cos + testCase.heightM / 2,
          HEIGHT_M + up - 0.8,
        ] as const;
      };
      const loop = {
        name: 'antenna',
        pointsM: [corner(-half, -half), corner(half, -half), corner(half, half), corner(-half, half)],
        waveform: '',
        delayS: 0,
        isInverted: false,
      };
      const incident = emptyIncident(structure.mesh);
      new LoopCoupling(structure, loop).addTo(incident, frequencyHz, 1, 0);
      let reactionRe = 0;
      let reactionIm = 0;
      for (let e = 0; e < structure.mesh.edgeCount; e++) {
        const [re, im] = [currentsA[2 * e]!, currentsA[2 * e + 1]!];
        reactionRe += re * incident.emfRe[e]! - im * incident.emfIm[e]!;
        reactionIm += re * incident.emfIm[e]! + im * incident.emfRe[e]!;
      }
      const because = 'the sides’ middles stand for the sides: (k·20 mm)²/24 and (20 mm/3 m)² at most 0.03 %';
      const size = Math.hypot(...emf);
      expect(size).toBeGreaterThan(0);
      expectClose(reactionRe, emf[0], { rel: 0.003, floor: size, because });
      expectClose(reactionIm, emf[1], { rel: 0.003, floor: size, because });
    },
  );
});

const negative = ([re, im]: Complex): Complex => [-re, -im];
const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
