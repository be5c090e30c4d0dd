import type { StackLayer } from '../../app/board/board.ts';
import type { LayerSight } from './hit-test.ts';
import type { RememberedLayers } from './remembered-view.ts';

export interface CopperLayer {
  readonly index: number;
  readonly name: string;
}

/** From the top downwards. */
export const copperLayers = (stackup: readonly StackLayer[]): readonly CopperLayer[] =>
  stackup.flatMap(({ kind, name }, index) => (kind === 'copper' ? [{ index, name }] : []));

/** What is shown, and which layer lies on top: the chosen one, else the one next to the eye. */
export function sightOf(
  layers: readonly CopperLayer[],
  { hidden, active }: RememberedLayers,
  isFromBottom: boolean,
): LayerSight {
  const isHidden = new Set(hidden);
  const shown = new Set(layers.filter(({ name }) => !isHidden.has(name)).map(({ index }) => index));
  const seen = layers.filter(({ index }) => shown.has(index));
  const nearest = isFromBottom ? seen.at(-1) : seen[0];
  const chosen = seen.find(({ name }) => name === active);
  return { isShown: (index) => shown.has(index), activeLayer: (chosen ?? nearest)?.index ?? -1, isFromBottom };
}

/** Shown layers in the order of drawing: the farthest from the eye first, the active one last. */
export function drawingOrder(layers: readonly CopperLayer[], sight: LayerSight): readonly number[] {
  const shown = layers.map(({ index }) => index).filter(sight.isShown);
  const farFirst = sight.isFromBottom ? shown : shown.toReversed();
  return [...farFirst.filter((index) => index !== sight.activeLayer), sight.activeLayer].filter(sight.isShown);
}
