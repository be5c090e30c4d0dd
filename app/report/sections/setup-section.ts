import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { type Column, note, type Section, strong, type Text, table } from '../blocks.ts';
import { clipLine, type ReportLimitLine } from '../figures/limit-lines.ts';
import { siteFigure } from '../figures/site-figure.ts';
import { frequencyText, levelText, trimmed } from '../format.ts';
import { printed } from '../number.ts';
import { limitName } from '../verdict.ts';

/** Set-up drawn to scale. */
export const setupSection = (board: Board, result: EstimateResult): Section => ({
  title: 'Set-up',
  isKept: true,
  blocks: [
    {
      kind: 'figure',
      pictures: [siteFigure(board, result)],
      captions: ['Both views to scale. The table carries the board at its height and is not part of the model.'],
    },
  ],
});

/** The limit with where it comes from. */
export function limitSection(result: EstimateResult, lines: readonly ReportLimitLine[]): Section {
  const { limit } = result;
  return {
    title: 'Limit',
    isKept: true,
    blocks: [
      {
        kind: 'facts',
        facts: [
          { term: 'Standard', value: limitName(result) },
          { term: 'Edition', value: limit.edition },
          { term: 'Source of the values', value: limit.source },
          { term: 'Status', value: strong(limit.sourceStatus) },
          { term: 'Judged up to', value: `${frequencyText(limit.maxHz)} (${limit.maxRule})` },
          ...(limit.conversion === undefined ? [] : [{ term: 'Distance conversion', value: limit.conversion }]),
          {
            term: 'Laboratory',
            value: `±${levelText(limit.labUncertaintyDb)} dB expanded uncertainty (CISPR 16-4-2)`,
          },
        ],
      },
      ...(lines.length > 0
        ? [
            table(LIMIT_COLUMNS, limitRows(lines, limit.maxHz), 'narrow'),
            note('At a band edge the tighter line holds. A sloping line is straight over the logarithm of frequency.'),
          ]
        : []),
    ],
  };
}

const LIMIT_COLUMNS: readonly Column[] = [
  { head: 'From', width: 15, isNumber: true },
  { head: 'To', width: 15, isNumber: true },
  { head: 'Detector', width: 15 },
  { head: 'Limit, dBµV/m', width: 18, isNumber: true },
];

function limitRows(lines: readonly ReportLimitLine[], maxHz: number): Text[][] {
  return lines.flatMap(({ detector, points }) => {
    const clipped = clipLine(points, points[0]?.[0] ?? 0, maxHz);
    return clipped.slice(1).flatMap(([toHz, toDb], i) => {
      const [fromHz, fromDb] = clipped[i]!;
      if (fromHz === toHz) return [];
      const level = fromDb === toDb ? trimmed(toDb, 2) : `${trimmed(fromDb, 2)} to ${trimmed(toDb, 2)}`;
      return [[frequencyText(fromHz), frequencyText(toHz), detector, printed(level)]];
    });
  });
}
