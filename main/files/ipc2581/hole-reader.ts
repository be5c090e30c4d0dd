import { type Affine, combine, IDENTITY, readXform, translation } from './affine.ts';
import { type Attributes, numberAttribute, sizeAttribute, wordAttribute } from './attributes.ts';
import type { Hole, PlatedSlot } from './document.ts';
import { readLocation } from './pad-reader.ts';
import { readShape, type Shape, type ShapeContext } from './shapes.ts';
import type { ElementReader } from './xml-reader.ts';

/** Hole or LayerHole; undefined when it is not plated: then it joins nothing. */
export function readHole(
  context: ShapeContext,
  element: string,
  attributes: Attributes,
  place: Pick<Hole, 'net' | 'layer'>,
): Hole | undefined {
  const kind = platingOf(attributes);
  if (kind === undefined) return undefined;
  const { mmPerUnit } = context;
  return {
    xMm: numberAttribute(element, attributes, 'x') * mmPerUnit,
    yMm: numberAttribute(element, attributes, 'y') * mmPerUnit,
    diameterMm: sizeAttribute(element, attributes, 'diameter') * mmPerUnit,
    kind,
    net: place.net,
    layer: place.layer,
    from: undefined,
    to: undefined,
  };
}

/** Slot (revision A) or SlotCavity; undefined when it is not plated. */
export function slotReader(
  context: ShapeContext,
  attributes: Attributes,
  place: Pick<PlatedSlot, 'net' | 'layer'>,
  done: (slot: PlatedSlot) => void,
): ElementReader | undefined {
  if (platingOf(attributes) === undefined) return undefined;
  const shapes: Shape[] = [];
  let turn: Affine = IDENTITY;
  let location: Affine = IDENTITY;
  return {
    child(name, inner) {
      if (name === 'Location') location = translation(...readLocation(context, inner));
      else if (name === 'Xform') turn = readXform(inner, context.mmPerUnit);
      else return readShape(context, name, inner, (shape) => shapes.push(shape));
      return undefined;
    },
    end: () => done({ net: place.net, layer: place.layer, shapes, transform: combine(location, turn) }),
  };
}

/** VIA and VIA_CAPPED are vias. A hole without a word on its plating is taken as not plated. */
function platingOf(attributes: Attributes): Hole['kind'] | undefined {
  const plating = wordAttribute(attributes, 'platingStatus');
  if (plating.startsWith('VIA')) return 'via';
  return plating === 'PLATED' ? 'plated' : undefined;
}
