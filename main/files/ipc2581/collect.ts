import { ContentError } from './attributes.ts';
import { type DrawnShape, isCopperFunction } from './document.ts';
import type { Pad } from './pad-reader.ts';
import { placeShape } from './place-shape.ts';
import type { StepContext } from './step-context.ts';

/** What a Set says about everything drawn in it. */
export type SetPlace = Pick<DrawnShape, 'layer' | 'net' | 'usage' | 'isNegative'>;

const MOST_SHAPES = 2_000_000;

/** A layer that is not declared yet counts as copper until the end of the file. */
export function mayBeCopper({ document }: StepContext, layer: string): boolean {
  const declared = document.layers.get(layer);
  return declared === undefined || isCopperFunction(declared.layerFunction);
}

export function countFeatures({ step }: StepContext, layer: string, count: number): void {
  step.featureCounts.set(layer, (step.featureCounts.get(layer) ?? 0) + count);
}

/** Throws ContentError beyond any real board: shapes times locations of one element can be many. */
export function addShape({ step }: StepContext, drawn: DrawnShape): void {
  if (step.shapes.length >= MOST_SHAPES) throw new ContentError(`a step draws more than ${MOST_SHAPES} copper shapes`);
  step.shapes.push(drawn);
}

/** Keeps the pins of a pad; its shape only where it may be a clearance. */
export function addPad(context: StepContext, place: SetPlace, pad: Pad): void {
  if (!mayBeCopper(context, place.layer)) return;
  countFeatures(context, place.layer, 1);
  const { xMm, yMm } = pad;
  for (const { component, pin } of pad.pins) {
    context.step.pads.push({ layer: place.layer, component, pin, net: place.net, xMm, yMm });
  }
  const declared = context.document.layers.get(place.layer);
  if (declared !== undefined && !declared.isNegative && !place.isNegative) return;
  const transform = pad.placement;
  for (const shape of pad.shapes) {
    addShape(context, { ...place, isPad: true, shape: placeShape(shape, transform), transform });
  }
}
