import { type Markup, markup } from '../markup.ts';
import { px } from './path.ts';

/** Decibels shown by a full bar. */
export const BAR_SPAN_DB = 40;

/** A level as a bar that ends at the right for `topDb` and is empty `BAR_SPAN_DB` below it. */
export function levelBar(levelDb: number, topDb: number, className: string): Markup {
  const share = Math.min(1, Math.max(0, 1 - (topDb - levelDb) / BAR_SPAN_DB));
  return markup`<svg class="bar" viewBox="0 0 100 8" preserveAspectRatio="none" aria-hidden="true"><rect class="bar-back" width="100" height="8"/><rect class="${className}" width="${px(100 * (Number.isFinite(share) ? share : 0))}" height="8"/></svg>`;
}
