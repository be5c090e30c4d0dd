import { type Affine, combine, IDENTITY, readXform, translation } from './affine.ts';
import { type Attributes, type Names, wordAttribute } from './attributes.ts';
import { addPad, addShape, countFeatures, mayBeCopper, type SetPlace } from './collect.ts';
import { readHole, slotReader } from './hole-reader.ts';
import { padReader, readLocation } from './pad-reader.ts';
import { placeShape } from './place-shape.ts';
import { type LineWidth, readLineWidth, readShape, type Shape } from './shapes.ts';
import type { StepContext } from './step-context.ts';
import type { ElementReader } from './xml-reader.ts';

/** LayerFeature: on copper everything is read, elsewhere only holes and slots. */
export function layerFeatureReader(
  context: StepContext,
  attributes: Attributes,
  routeNet: string | undefined,
): ElementReader | undefined {
  const layer = context.names.read('LayerFeature', attributes, 'layerRef');
  if (layer === undefined) return undefined;
  const isCopper = mayBeCopper(context, layer);
  if (isCopper) countFeatures(context, layer, 0);
  return {
    child(name, inner) {
      if (name !== 'Set') return undefined;
      return setReader(context, readSet(context.names, inner, layer, routeNet), isCopper);
    },
  };
}

const readSet = (names: Names, attributes: Attributes, layer: string, routeNet: string | undefined): SetPlace => ({
  layer,
  net: attributes.net === undefined ? routeNet : names.readNet('Set', attributes),
  usage: wordAttribute(attributes, 'geometryUsage'),
  isNegative: wordAttribute(attributes, 'polarity') === 'NEGATIVE',
});

function setReader(context: StepContext, place: SetPlace, isCopper: boolean): ElementReader {
  const { step } = context;
  if (isCopper && place.net !== undefined) step.netNames.add(place.net);
  let width: LineWidth | undefined;
  return {
    child(name, attributes) {
      switch (name) {
        case 'Hole': {
          const hole = readHole(context, name, attributes, place);
          if (hole !== undefined) step.holes.push(hole);
          if (place.net !== undefined) step.netNames.add(place.net);
          return undefined;
        }
        case 'Slot':
        case 'SlotCavity':
          return slotReader(context, attributes, place, (slot) => {
            step.slots.push(slot);
            if (slot.net !== undefined) step.netNames.add(slot.net);
          });
        case 'Features':
          return isCopper ? featuresReader(context, place, () => width) : undefined;
        case 'Pad':
          return isCopper ? padReader(context, (pad) => addPad(context, place, pad)) : undefined;
        default:
          width = readLineWidth(context, name, attributes) ?? width;
          return undefined;
      }
    },
  };
}

/**
 * Features: shapes at any depth, transformed by Xform and then moved to every Location. The Set may give a line
 * description for strokes that have none of their own.
 */
function featuresReader(context: StepContext, place: SetPlace, setWidth: () => LineWidth | undefined): ElementReader {
  const shapes: Shape[] = [];
  const locations: Affine[] = [];
  let turn: Affine = IDENTITY;
  return {
    child(name, attributes) {
      if (name === 'Location') locations.push(translation(...readLocation(context, attributes)));
      else if (name === 'Xform') turn = readXform(attributes, context.mmPerUnit);
      else return readShape(context, name, attributes, (shape) => shapes.push(shape));
      return undefined;
    },
    end() {
      for (const location of locations.length > 0 ? locations : [IDENTITY]) {
        const transform = combine(location, turn);
        for (const shape of shapes) {
          countFeatures(context, place.layer, 1);
          const drawn = shape.kind === 'stroke' ? { ...shape, width: shape.width ?? setWidth() } : shape;
          addShape(context, { ...place, isPad: false, shape: placeShape(drawn, transform), transform });
        }
      }
    },
  };
}
