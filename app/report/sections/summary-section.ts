import { bandMargins } from '../../compare/bands.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import {
  BREAK,
  type Column,
  joined,
  mark,
  name,
  note,
  paragraph,
  type Section,
  strong,
  type Text,
  table,
} from '../blocks.ts';
import { type Cause, causesOf, worstWithout } from '../causes.ts';
import { isItself, KIND_PHRASE, pathText } from '../contributor-text.ts';
import type { ReportLimitLine } from '../figures/limit-lines.ts';
import { marginStrip } from '../figures/margin-strip.ts';
import { bandText, frequencyText, levelText, marginText, trimmed } from '../format.ts';
import { printed } from '../number.ts';
import { standingOf } from '../verdict.ts';
import { mainText } from './main-text.ts';
import { standingKey } from './spectrum-section.ts';

/** Causes listed: more would not be read in a minute. */
const MOST_CAUSES = 3;
/** Findings named for one net. */
const MOST_NUMBERS = 6;
/** A user's limit file may have hundreds of bands. */
const MOST_BANDS = 8;

const BAND_COLUMNS: readonly Column[] = [
  { head: '', width: 3 },
  { head: 'Band', width: 17, isWhole: true },
  { head: 'Detector', width: 12 },
  { head: 'Limit, dBµV/m', width: 14, isNumber: true },
  { head: 'Margin, dB', width: 12, isNumber: true },
  { head: 'Worst line', width: 14, isWhole: true },
  { head: 'Main contributor there', width: 28 },
];

/** Worst margin of each piece of the limit lines. */
export function bandsSection(result: EstimateResult, lines: readonly ReportLimitLine[]): Section {
  const bands = bandMargins(lines, result);
  const shown = bands.slice(0, MOST_BANDS);
  const left = bands.length - shown.length;
  const rows = shown.map(({ detector, fromHz, toHz, fromDbuvPerM, toDbuvPerM, worst }): Text[] => {
    const limit =
      fromDbuvPerM === toDbuvPerM ? trimmed(toDbuvPerM, 2) : `${trimmed(fromDbuvPerM, 2)} to ${trimmed(toDbuvPerM, 2)}`;
    const band = [bandText(fromHz, Math.min(toHz, result.limit.maxHz)), detector, printed(limit)];
    const point =
      worst && result.points.find((one) => one.detector === detector && one.frequencyHz === worst.frequencyHz);
    if (!point) return ['', ...band, '—', 'no line', ''];
    const standing = standingOf(point, result.limit.requiredMarginDb);
    return [
      mark(standing, standing),
      ...band,
      printed(marginText(point.marginDb)),
      frequencyText(point.frequencyHz),
      mainText(point),
    ];
  });
  return {
    title: 'Worst margin in each band',
    blocks:
      rows.length === 0
        ? []
        : [table(BAND_COLUMNS, rows), ...(left > 0 ? [note(`And ${left} more bands of the limit lines.`)] : [])],
  };
}

const CAUSE_COLUMNS: readonly Column[] = [
  { head: 'Cause', width: 38, isStrong: true },
  { head: 'Strongest at', width: 13, isWhole: true },
  { head: ['By itself', BREAK, 'dBµV/m'], width: 10, isNumber: true },
  { head: ['Margin', BREAK, 'dB'], width: 9, isNumber: true },
  { head: ['Must fall by', BREAK, 'dB'], width: 11, isNumber: true },
  { head: ['Worst margin', BREAK, 'without it, about'], width: 19 },
];

/** The strongest causes, what each must lose, and what would be left without it. */
export function causesSection(result: EstimateResult): Section {
  const title = 'Strongest causes';
  const causes = causesOf(result).slice(0, MOST_CAUSES);
  if (causes.length === 0) return { title, blocks: [] };
  const { requiredMarginDb } = result.limit;
  const rows = causes.map((cause): Text[] => [
    causeText(cause),
    frequencyText(cause.point.frequencyHz),
    printed(levelText(cause.ownDbuvPerM)),
    printed(marginText(cause.ownMarginDb)),
    cause.ownMarginDb < requiredMarginDb ? levelText(requiredMarginDb - cause.ownMarginDb) : '—',
    withoutText(worstWithout(result, [cause])),
  ]);
  const needed = requiredMarginDb > 0 ? `the limit with ${trimmed(requiredMarginDb, 1)} dB of margin` : 'the limit';
  return {
    title,
    blocks: [
      table(CAUSE_COLUMNS, rows),
      ...cureBlocks(result, causes),
      note(
        `Each by itself at its own worst line; it must fall until it alone keeps ${needed}. Without it: its power gone, phases not counted, so off by several dB at times. What a change really does, an estimate with the change tells.`,
      ),
    ],
  };
}

function cureBlocks(result: EstimateResult, causes: readonly Cause[]) {
  const together = causes.length > 1 && worstWithout(result, causes);
  const numbers = (cause: Cause): string[] =>
    result.findings.flatMap(({ net }, i) =>
      cause.contributor.kind === 'net' && net === cause.contributor.name ? [String(i + 1)] : [],
    );
  const nets = [...new Map(causes.map((cause) => [cause.contributor.name, cause])).values()];
  const found = nets.filter((cause) => numbers(cause).length > 0);
  const said: Text[] = [
    ...(together ? [`Without ${causes.length === 2 ? 'both' : 'all three'}: about ${withoutText(together)}.`] : []),
    ...(found.length > 0
      ? [
          [
            'Findings on the board: ',
            joined(
              found.map((cause) => [name(cause.contributor.name, 30), ` No. ${listed(numbers(cause))}`]),
              '; ',
            ),
            '.',
          ],
        ]
      : []),
  ];
  return said.length === 0 ? [] : [paragraph(joined(said, ' '))];
}

const listed = (numbers: readonly string[]): string =>
  `${numbers.slice(0, MOST_NUMBERS).join(', ')}${numbers.length > MOST_NUMBERS ? ' …' : ''}`;

const withoutText = (worst: ReturnType<typeof worstWithout>): string =>
  worst === undefined
    ? 'nothing is left'
    : `${printed(marginText(worst.marginDb))} dB at ${frequencyText(worst.frequencyHz)}`;

/** "CLK_25M through the valve cable". */
function causeText({ contributor, path }: Cause): Text {
  const itself = isItself({ ...contributor, levelDbuvPerM: 0, viaDbuvPerM: {} }, { name: path, levelDbuvPerM: 0 });
  return [
    contributor.kind === 'cable' && KIND_PHRASE.cable,
    name(contributor.name, 30),
    !itself && [path === 'pair' ? ' from its ' : ' through the ', name(pathText(path), 24)],
  ];
}

/** The whole spectrum on a strip: how far each line is from its limit. */
export const stripSection = (result: EstimateResult, lines: readonly ReportLimitLine[]): Section => ({
  title: 'Margin over frequency',
  isKept: true,
  blocks:
    result.points.length === 0
      ? []
      : [{ kind: 'figure', pictures: [marginStrip(result, lines)], captions: standingKey(result) }],
});

/** What the numbers are worth. */
export function suretySection(result: EstimateResult): Section {
  const { limit, structure, caveats } = result;
  const kinds = new Set(caveats.map(({ code }) => code)).size;
  return {
    title: 'How sure',
    blocks: [
      {
        kind: 'list',
        items: [
          [
            strong(`Laboratory: ±${levelText(limit.labUncertaintyDb)} dB`),
            ' expanded uncertainty of its instruments (CISPR 16-4-2), before the way cables lie.',
          ],
          [
            strong('Model: 10 dB and more'),
            ` is a normal error; ${
              structure === 'solved'
                ? 'planes and cables were solved, enclosure and power-ground resonances were not.'
                : 'planes and cables were not solved, and they usually decide.'
            }`,
          ],
          [
            strong(`Limit values: ${limit.sourceStatus}`),
            caveats.length === 0
              ? '. No caveats of the model apply.'
              : `. ${caveats.length} caveats of ${kinds === 1 ? 'one kind' : `${kinds} kinds`} apply; they are listed with the model.`,
          ],
        ],
      },
    ],
  };
}
