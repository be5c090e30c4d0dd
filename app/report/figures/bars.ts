import { type Markup, markup } from '../markup.ts';
import { px } from './path.ts';

/** Decibels shown by a full bar. */
export const BAR_SPAN_DB = 40;

/** How much of a bar a level fills: all of it at `topDb`, nothing `BAR_SPAN_DB` below. */
export function barShare(levelDb: number, topDb: number): number {
  const share = Math.min(1, Math.max(0, 1 - (topDb - levelDb) / BAR_SPAN_DB));
  return Number.isFinite(share) ? share : 0;
}

/** A level as a bar that ends at the right for `topDb` and is empty `BAR_SPAN_DB` below it. */
export const levelBar = (levelDb: number, topDb: number, className: string): Markup =>
  markup`<svg class="bar" viewBox="0 0 100 8" preserveAspectRatio="none" aria-hidden="true"><rect class="bar-back" width="100" height="8"/><rect class="${className}" width="${px(100 * barShare(levelDb, topDb))}" height="8"/></svg>`;
