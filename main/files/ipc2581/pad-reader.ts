import { type Affine, combine, IDENTITY, readXform, translation } from './affine.ts';
import { type Attributes, numberAttribute } from './attributes.ts';
import { readShape, type Shape, type ShapeContext } from './shapes.ts';
import type { ElementReader } from './xml-reader.ts';

export interface Pad {
  readonly xMm: number;
  readonly yMm: number;
  readonly placement: Affine;
  readonly pins: readonly { readonly component: string; readonly pin: string }[];
  readonly shapes: readonly Shape[];
}

/** Location in millimetres; both numbers must be there. */
export const readLocation = (context: ShapeContext, attributes: Attributes): readonly [xMm: number, yMm: number] => [
  numberAttribute('Location', attributes, 'x') * context.mmPerUnit,
  numberAttribute('Location', attributes, 'y') * context.mmPerUnit,
];

/** Pad or LayerPad: absolute location, shape and the pins that sit on it. */
export function padReader(context: ShapeContext, done: (pad: Pad) => void): ElementReader {
  const { names } = context;
  const pins: { component: string; pin: string }[] = [];
  const shapes: Shape[] = [];
  let turn = IDENTITY;
  let [xMm, yMm]: readonly [number, number] = [0, 0];
  return {
    child(name, attributes) {
      if (name === 'Location') [xMm, yMm] = readLocation(context, attributes);
      else if (name === 'Xform') turn = readXform(attributes, context.mmPerUnit);
      else if (name === 'PinRef') {
        const pin = names.read(name, attributes, 'pin');
        if (pin !== undefined) pins.push({ component: names.read(name, attributes, 'componentRef') ?? '', pin });
      } else return readShape(context, name, attributes, (shape) => shapes.push(shape));
      return undefined;
    },
    end: () => done({ xMm, yMm, placement: combine(translation(xMm, yMm), turn), pins, shapes }),
  };
}
