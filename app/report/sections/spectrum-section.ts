import type { EstimateResult } from '../../estimate/result.ts';
import type { ReportLimitLine } from '../figures/limit-lines.ts';
import { marginStrip } from '../figures/margin-strip.ts';
import { inlineMark } from '../figures/marks.ts';
import { spectrumFigure } from '../figures/spectrum-figure.ts';
import { trimmed } from '../format.ts';
import { type Markup, markup } from '../markup.ts';

/** Spectrum and margin strip with the key to their marks. */
export function spectrumSection(result: EstimateResult, lines: readonly ReportLimitLine[]): Markup {
  const required = trimmed(result.limit.requiredMarginDb, 1);
  const hasBand = result.limit.requiredMarginDb > 0;
  const keyLine = (className: string, path: string) =>
    markup`<svg class="inline" viewBox="-7 -7 14 14" aria-hidden="true"><path class="${className}" d="${path}"/></svg>`;
  return markup`<section class="keep"><h2>Spectrum</h2>
<figure>${spectrumFigure(result, lines)}${marginStrip(result, lines)}
<figcaption><span>${inlineMark('over', 'over')}over the limit</span>${
    hasBand && markup`<span>${inlineMark('short', 'short')}short of the required ${required} dB (hatched band)</span>`
  }<span>${inlineMark('fine', 'fine')}fine</span><span>${keyLine('pol-h', 'M-5 0H5')}horizontal, ${keyLine('pol-v', 'M0 -5V5')}vertical polarisation: maximum of each over height and angle</span><span>Of readings closer than a printed dot the strongest are drawn; margins above 40 dB are not.</span></figcaption></figure></section>`;
}
