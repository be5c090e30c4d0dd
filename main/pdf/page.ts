import { LIGHT } from '../../app/report/palette.ts';
import type { Paper } from '../../app/report/report-title.ts';

/** Measures of the printed page, in points (1/72 inch). */

export const PAGE_SIZES: Readonly<Record<Paper, { readonly widthPt: number; readonly heightPt: number }>> = {
  A4: { widthPt: 595.28, heightPt: 841.89 },
  Letter: { widthPt: 612, heightPt: 792 },
};

export const MARGINS_PT = { left: 42, top: 46, right: 42, bottom: 46 } as const;

/** Room between the margins. */
export interface PageRoom {
  readonly widthPt: number;
  readonly heightPt: number;
}

export function roomOn(paper: Paper): PageRoom {
  const { widthPt, heightPt } = PAGE_SIZES[paper];
  return {
    widthPt: widthPt - MARGINS_PT.left - MARGINS_PT.right,
    heightPt: heightPt - MARGINS_PT.top - MARGINS_PT.bottom,
  };
}

export const TEXT_PT = 8.6;
export const TABLE_PT = 7.6;
export const NOTE_PT = 7.4;

export const INK = LIGHT.get('ink')!;
export const QUIET = LIGHT.get('quiet')!;
export const HAIR = LIGHT.get('hair')!;
export const HAIRLINE_PT = 0.4;
export const RULE_PT = 0.7;
