import type { Attributes } from './attributes.ts';
import { addPad } from './collect.ts';
import type { Hole } from './document.ts';
import { readHole } from './hole-reader.ts';
import { padReader } from './pad-reader.ts';
import type { StepContext } from './step-context.ts';
import type { ElementReader } from './xml-reader.ts';

/** PadStack (revisions A and B): a hole with its own span, and pads on several layers, mask and paste among them. */
export function padStackReader(context: StepContext, attributes: Attributes): ElementReader {
  const { names, step } = context;
  const net = names.readNet('PadStack', attributes);
  if (net !== undefined) step.netNames.add(net);
  return {
    child(name, inner) {
      if (name === 'LayerPad') {
        const layer = names.read(name, inner, 'layerRef');
        return layer === undefined
          ? undefined
          : padReader(context, (pad) => addPad(context, { layer, net, usage: '', isNegative: false }, pad));
      }
      const hole = name === 'LayerHole' ? readHole(context, name, inner, { net, layer: undefined }) : undefined;
      return hole === undefined ? undefined : layerHoleReader(context, hole);
    },
  };
}

function layerHoleReader({ names, step }: StepContext, hole: Hole): ElementReader {
  let span: Pick<Hole, 'from' | 'to'> = { from: undefined, to: undefined };
  return {
    child(name, inner) {
      if (name === 'Span')
        span = { from: names.read(name, inner, 'fromLayer'), to: names.read(name, inner, 'toLayer') };
      return undefined;
    },
    end: () => void step.holes.push({ ...hole, ...span }),
  };
}
