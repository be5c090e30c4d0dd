import type { Attributes, Names } from './attributes.ts';
import { emptyStep, type Ipc2581Document, pinKey } from './document.ts';
import { layerFeatureReader } from './layer-feature-reader.ts';
import { padStackReader } from './pad-stack-reader.ts';
import { ContourReader } from './shapes.ts';
import type { StepContext } from './step-context.ts';
import type { ElementReader } from './xml-reader.ts';

/** Step: the board, or a panel that repeats other steps. */
export function stepReader(document: Ipc2581Document, names: Names, attributes: Attributes): ElementReader {
  const step = emptyStep(names.read('Step', attributes, 'name') ?? '');
  document.steps.push(step);
  const context: StepContext = { document, step, names, mmPerUnit: document.mmPerUnit };
  return {
    child(name, inner) {
      switch (name) {
        case 'StepRepeat':
          step.repeats++;
          return undefined;
        case 'Profile':
          return new ContourReader(context, (shape) => {
            if (shape.kind === 'area' && step.profile === undefined) step.profile = shape;
          });
        case 'Component':
          readComponent(context, inner);
          return undefined;
        case 'LogicalNet':
          return logicalNetReader(context, inner);
        case 'PadStack':
          return padStackReader(context, inner);
        case 'LayerFeature':
          return layerFeatureReader(context, inner, undefined);
        case 'Route': {
          // Revision A: the net may stand here instead of on the Sets.
          const net = names.readNet(name, inner);
          return {
            child: (leaf, route) => (leaf === 'LayerFeature' ? layerFeatureReader(context, route, net) : undefined),
          };
        }
        default:
          return undefined;
      }
    },
  };
}

function readComponent({ step, names }: StepContext, attributes: Attributes): void {
  step.componentCount++;
  const refDes = names.read('Component', attributes, 'refDes');
  const layer = names.read('Component', attributes, 'layerRef');
  if (refDes !== undefined && layer !== undefined) step.componentLayers.set(refDes, layer);
}

function logicalNetReader({ step, names }: StepContext, attributes: Attributes): ElementReader | undefined {
  const net = names.readNet('LogicalNet', { ...attributes, net: attributes.name });
  if (net === undefined) return undefined;
  step.logicalNets.add(net);
  return {
    child(name, inner) {
      if (name !== 'PinRef') return undefined;
      const pin = names.read(name, inner, 'pin');
      const component = names.read(name, inner, 'componentRef') ?? '';
      if (pin !== undefined && !step.pinNets.has(pinKey(component, pin))) step.pinNets.set(pinKey(component, pin), net);
      return undefined;
    },
  };
}
