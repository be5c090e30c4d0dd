import { z } from 'zod';
import { useRemembered } from '../state/remembered.ts';

/** The part of the range that the spectrum shows; null: all of it. */
export type Zoom = readonly [fromHz: number, toHz: number] | null;

const zoomSchema: z.ZodType<Zoom> = z.tuple([z.number().positive(), z.number().positive()]).nullable();

export const useZoom = (): readonly [Zoom, (zoom: Zoom) => void] =>
  useRemembered<Zoom>('spectrum.zoom', zoomSchema, null);

/** Narrower than this there is nothing more to see. */
const LEAST_RATIO = 1.02;

/** Two ends in any order as a part of the whole; null when they are nearly one, or the whole. */
export function zoomBetween(oneHz: number, otherHz: number, [fromHz, toHz]: readonly [number, number]): Zoom {
  const low = Math.max(fromHz, Math.min(oneHz, otherHz));
  const high = Math.min(toHz, Math.max(oneHz, otherHz));
  if (!(high / low > LEAST_RATIO)) return null;
  return low <= fromHz * 1.001 && high >= toHz * 0.999 ? null : [low, high];
}

/** The zoom made `ratio` times as wide about a frequency that keeps its place. */
export function zoomAbout(zoom: Zoom, whole: readonly [number, number], aboutHz: number, ratio: number): Zoom {
  const [fromHz, toHz] = zoom ?? whole;
  const low = aboutHz / (aboutHz / fromHz) ** ratio;
  const high = aboutHz * (toHz / aboutHz) ** ratio;
  return high / low > LEAST_RATIO ? zoomBetween(low, high, whole) : zoom;
}
