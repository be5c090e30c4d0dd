import { inputError } from '../errors.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { FIELD_STRIDE } from './element-field.ts';
import type { FieldJob, FieldResult } from './field-job.ts';
import { addLinearElementField, imageOf, type LinearElement } from './linear-element.ts';

type Complex = readonly [re: number, im: number];

/**
 * E and H of the job's current elements at its points, with their images when the ground is perfect.
 * Throws `input` when a point lies on an element (the field of a filament is infinite there).
 */
export function runFieldJob(job: FieldJob): FieldResult {
  const elements = job.elements.map(
    ({ fromM, toM, currentA, currentEndA = currentA }): LinearElement => ({
      fromM,
      toM,
      startRe: currentA[0],
      startIm: currentA[1],
      endRe: currentEndA[0],
      endIm: currentEndA[1],
    }),
  );
  const electric = new Float64Array(FIELD_STRIDE);
  const magnetic = new Float64Array(FIELD_STRIDE);
  return {
    format: 'quietboard-field-result',
    version: 1,
    fields: job.frequenciesHz.map((frequencyHz) => {
      const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
      return {
        frequencyHz,
        observers: job.observersM.map((observerM, o) => {
          electric.fill(0);
          magnetic.fill(0);
          for (const [e, element] of elements.entries()) {
            const sources = job.ground === 'perfect' ? [element, imageOf(element)] : [element];
            for (const source of sources) {
              if (!addLinearElementField(electric, magnetic, 0, kPerM, observerM, source)) {
                throw inputError(`observersM[${o}]`, `off elements[${e}], whose field is infinite on it`, observerM);
              }
            }
          }
          return { electricVPerM: vectorOf(electric), magneticAPerM: vectorOf(magnetic) };
        }),
      };
    }),
  };
}

function vectorOf(field: Float64Array): readonly [Complex, Complex, Complex] {
  return [
    [field[0]!, field[1]!],
    [field[2]!, field[3]!],
    [field[4]!, field[5]!],
  ];
}
