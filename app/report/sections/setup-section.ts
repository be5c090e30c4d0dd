import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { clipLine, type ReportLimitLine } from '../figures/limit-lines.ts';
import { siteFigure } from '../figures/site-figure.ts';
import { frequencyText, levelText, trimmed } from '../format.ts';
import { type Markup, markup } from '../markup.ts';
import { limitName } from '../verdict.ts';
import { numberCell } from './number.ts';

/** Set-up drawn to scale, and the limit with where it comes from. */
export function setupSection(board: Board, result: EstimateResult, lines: readonly ReportLimitLine[]): Markup {
  const { limit } = result;
  return markup`<section class="keep"><h2>Set-up</h2><figure>${siteFigure(board, result)}
<figcaption><span>Both views to scale. The table carries the board at its height and is not part of the model.</span></figcaption></figure></section>
<section class="keep"><h2>Limit</h2>
<dl class="facts"><div><dt>Standard</dt><dd>${limitName(result)}</dd></div><div><dt>Edition</dt><dd>${limit.edition}</dd></div><div><dt>Source of the values</dt><dd>${limit.source}</dd></div><div><dt>Status</dt><dd><strong>${limit.sourceStatus}</strong></dd></div><div><dt>Judged up to</dt><dd>${frequencyText(limit.maxHz)} (${limit.maxRule})</dd></div>${
    limit.conversion !== undefined && markup`<div><dt>Distance conversion</dt><dd>${limit.conversion}</dd></div>`
  }<div><dt>Laboratory</dt><dd>±${levelText(limit.labUncertaintyDb)} dB expanded uncertainty (CISPR 16-4-2)</dd></div></dl>
${lines.length > 0 && limitTable(lines, limit.maxHz)}</section>`;
}

function limitTable(lines: readonly ReportLimitLine[], maxHz: number): Markup {
  const rows = lines.flatMap(({ detector, points }) => {
    const clipped = clipLine(points, points[0]?.[0] ?? 0, maxHz);
    return clipped.slice(1).flatMap(([toHz, toDb], i) => {
      const [fromHz, fromDb] = clipped[i]!;
      if (fromHz === toHz) return [];
      const level = fromDb === toDb ? trimmed(toDb, 2) : `${trimmed(fromDb, 2)} to ${trimmed(toDb, 2)}`;
      return [
        markup`<tr>${numberCell(frequencyText(fromHz))}${numberCell(frequencyText(toHz))}<td>${detector}</td>${numberCell(level)}</tr>`,
      ];
    });
  });
  return markup`<table class="narrow"><thead><tr><th class="n">From</th><th class="n">To</th><th>Detector</th><th class="n">Limit, dBµV/m</th></tr></thead><tbody>${rows}</tbody></table><p class="note">At a band edge the tighter line holds. A sloping line is straight over the logarithm of frequency.</p>`;
}
