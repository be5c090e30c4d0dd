import type { StructureMaximum } from '../../app/validate/structure-cases.ts';
import { comparedStructureValues } from '../../app/validate/structure-compare.ts';

/** Change between two models, dB: the largest of the values that are compared. */
export const changeDb = (one: StructureMaximum, other: StructureMaximum): number =>
  Math.max(...comparedStructureValues(one).map(({ pick }) => Math.abs(20 * Math.log10(pick(other) / pick(one)))));
