import { type Attributes, ContentError, wordAttribute } from './attributes.ts';

/** The three length units the schemas allow. */
const MM_PER_UNIT: ReadonlyMap<string, number> = new Map([
  ['MILLIMETER', 1],
  ['INCH', 25.4],
  ['MICRON', 0.001],
]);

/** Millimetres in one unit of the element's `units`. Throws ContentError on any other word, or none. */
export function mmPerUnit(element: string, attributes: Attributes): number {
  const factor = MM_PER_UNIT.get(wordAttribute(attributes, 'units'));
  if (factor === undefined) {
    const received = attributes.units === undefined ? 'nothing' : JSON.stringify(attributes.units.slice(0, 40));
    throw new ContentError(`${element} units must be MILLIMETER, INCH or MICRON; received ${received}`);
  }
  return factor;
}
