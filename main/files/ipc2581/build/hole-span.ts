import type { Hole, Ipc2581Document } from '../document.ts';

/** Copper layers a hole joins, the upper one first. */
export interface Span {
  readonly fromLayer: string;
  readonly toLayer: string;
}

/**
 * Span of a hole: its own, else its drill layer's, else the numbers at the end of the drill layer's name (`DRILL_1-6`,
 * as revision A files without spans have them). Undefined when none of them names two copper layers.
 */
export function spanOf(document: Ipc2581Document, hole: Hole, coppers: readonly string[]): Span | undefined {
  const layer = hole.layer === undefined ? undefined : document.layers.get(hole.layer);
  const indexOf = (name: string | undefined): number => (name === undefined ? -1 : coppers.indexOf(name));
  return (
    between(coppers, indexOf(hole.from), indexOf(hole.to)) ??
    between(coppers, indexOf(layer?.from), indexOf(layer?.to)) ??
    byLayerName(coppers, hole.layer ?? '')
  );
}

function byLayerName(coppers: readonly string[], name: string): Span | undefined {
  const numbers = /(\d{1,3})\s*-\s*(\d{1,3})\s*$/.exec(name);
  return numbers === null ? undefined : between(coppers, Number(numbers[1]) - 1, Number(numbers[2]) - 1);
}

function between(coppers: readonly string[], i: number, k: number): Span | undefined {
  if (i < 0 || k < 0 || i === k || i >= coppers.length || k >= coppers.length) return undefined;
  return { fromLayer: coppers[Math.min(i, k)]!, toLayer: coppers[Math.max(i, k)]! };
}
