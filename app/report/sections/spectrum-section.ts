import type { EstimateResult } from '../../estimate/result.ts';
import { dash, mark, type Section, type Text } from '../blocks.ts';
import type { ReportLimitLine } from '../figures/limit-lines.ts';
import { marginStrip } from '../figures/margin-strip.ts';
import { spectrumFigure } from '../figures/spectrum-figure.ts';
import { trimmed } from '../format.ts';

/** Spectrum and margin strip with the key to their marks. */
export const spectrumSection = (result: EstimateResult, lines: readonly ReportLimitLine[]): Section => ({
  title: 'Spectrum',
  isKept: true,
  blocks: [
    {
      kind: 'figure',
      pictures: [spectrumFigure(result, lines), marginStrip(result, lines)],
      captions: [
        ...standingKey(result),
        [
          [dash('horizontal'), 'horizontal, '],
          [dash('vertical'), 'vertical polarisation: maximum of each over height and angle'],
        ],
        'Of readings closer than a printed dot the strongest are drawn; margins above 40 dB are not.',
      ],
    },
  ],
});

/** What the three marks mean; the middle one only where a margin is required. */
export function standingKey({ limit }: EstimateResult): Text[] {
  const required = trimmed(limit.requiredMarginDb, 1);
  return [
    [mark('over', 'over'), 'over the limit'],
    ...(limit.requiredMarginDb > 0
      ? [[mark('short', 'short'), `short of the required ${required} dB (hatched band)`]]
      : []),
    [mark('fine', 'fine'), 'fine'],
  ];
}
