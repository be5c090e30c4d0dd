import type { Polarization } from '../../estimate/result.ts';
import { type Markup, markup } from '../markup.ts';
import type { Standing } from '../verdict.ts';
import { dashPath, px } from './path.ts';

/**
 * Marks that say the same without colour: a filled triangle points up (over the limit), a half-filled diamond (short of
 * the required margin), a small ring (fine). A polarisation is a dash that lies as its field does.
 */

/** Outlines of one standing's mark at a place, about 10 wide; `half` is the filled half of the diamond. */
export function markPath(standing: Standing, x: number, y: number): { outline: string; half: string } {
  switch (standing) {
    case 'over':
      return { outline: `M${px(x)} ${px(y - 5)}L${px(x + 4.8)} ${px(y + 3.5)}H${px(x - 4.8)}Z`, half: '' };
    case 'short':
      return {
        outline: `M${px(x)} ${px(y - 4.6)}L${px(x + 4.6)} ${px(y)}L${px(x)} ${px(y + 4.6)}L${px(x - 4.6)} ${px(y)}Z`,
        half: `M${px(x)} ${px(y - 4.6)}L${px(x - 4.6)} ${px(y)}L${px(x)} ${px(y + 4.6)}Z`,
      };
    case 'fine':
      return { outline: `M${px(x - 2.2)} ${px(y)}a2.2 2.2 0 1 0 4.4 0a2.2 2.2 0 1 0 -4.4 0`, half: '' };
  }
}

/** Many marks of one standing as two paths. */
export function markGroup(standing: Standing, places: readonly (readonly [number, number])[]): Markup | undefined {
  if (places.length === 0) return undefined;
  const paths = places.map(([x, y]) => markPath(standing, x, y));
  const half = paths.map((path) => path.half).join('');
  return markup`<g class="mark ${standing}"><path class="rim" d="${paths.map(({ outline }) => outline).join('')}"/>${
    half !== '' && markup`<path class="half" d="${half}"/>`
  }</g>`;
}

/** One mark as a picture in running text or a table cell; `label` is what it says. */
export const inlineMark = (standing: Standing, label: string): Markup =>
  markup`<svg class="inline" viewBox="-7 -7 14 14" role="img" aria-label="${label}">${markGroup(standing, [[0, 0]])}</svg>`;

/** Half a dash where there is room, and where readings stand side by side. */
export const DASH_HALF_PX = 4;
export const DENSE_DASH_HALF_PX = 1.6;

export const polarizationDash = (polarization: Polarization, x: number, y: number, half: number): string =>
  polarization === 'horizontal' ? dashPath(x, y, half, 0) : dashPath(x, y, 0, half);

/** One dash as a picture in running text. */
export const dashPicture = (polarization: Polarization): Markup =>
  markup`<svg class="inline" viewBox="-7 -7 14 14" aria-hidden="true"><path class="${polarization === 'horizontal' ? 'pol-h' : 'pol-v'}" d="${polarizationDash(polarization, 0, 0, 5)}"/></svg>`;
