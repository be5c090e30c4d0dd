import { dbText } from '../../compare/run-text.ts';
import type { Trend, TrendBand, TrendGroup, TrendPoint } from '../../compare/types.ts';
import { BREAK, type Column, mark, name, note, paragraph, type Section, strong, type Text, table } from '../blocks.ts';
import { bandName, stateText } from '../comparison/comparison-words.ts';
import { trendFigure } from '../figures/trend-figure.ts';
import { frequencyText, trimmed } from '../format.ts';
import { revisionName, setupText, standingOfPoint } from './trend-words.ts';

/** Sections of a trend, one a board and set-up, for the page of a screen and for print alike. */

export const TREND_TITLE = 'Trend of worst margins';

/** Rows before a table stops: the last revisions. */
const MOST_ROWS = 100;
/** Revisions side by side in the table of bands: as many of the last ones as a page is wide. */
const MOST_COLUMNS = 5;

export const trendSections = ({ groups }: Trend): Section[] => groups.map(groupSection);

function groupSection(group: TrendGroup, index: number): Section {
  const { points, bands, requiredMarginDb, headline } = group;
  const shown = points.slice(-MOST_ROWS);
  const captions: Text[] = [
    [mark('over', 'over'), 'over the limit'],
    ...(requiredMarginDb > 0
      ? [[mark('short', 'short'), `short of the required ${trimmed(requiredMarginDb, 1)} dB (hatched band)`]]
      : []),
    [mark('fine', 'fine'), 'fine'],
    'Margins above 50 dB are drawn at 50 dB.',
  ];
  return {
    title: setupText(group),
    blocks: [
      paragraph(name(group.board, 80), headline !== '' && ['. ', strong(`Worst margin ${headline}.`)]),
      { kind: 'figure', pictures: [trendFigure(group, `trend-hatch-${index}`)], captions },
      table(POINT_COLUMNS, shown.map(pointRow), 'bands'),
      ...(bands.length > 0 ? [bandTable(bands, points)] : []),
      note(
        'Of every revision its latest run counts. Runs with another limit, distance, site, orientation or structure have a section of their own.',
      ),
    ],
  };
}

const number = (head: string, unit: string, width: number): Column => ({
  head: unit === '' ? head : [head, BREAK, unit],
  width,
  isNumber: true,
});

const POINT_COLUMNS: readonly Column[] = [
  { head: '', width: 3 },
  { head: 'Revision', width: 18 },
  number('Run', '', 6),
  number('Runs', '', 6),
  { head: 'Started', width: 16, isWhole: true },
  { ...number('Worst margin', 'dB', 12), isStrong: true },
  number('At', '', 12),
  { head: 'Against the revision before', width: 27 },
];

function pointRow(point: TrendPoint): Text[] {
  const standing = standingOfPoint(point);
  const { worst, text, isOtherProgram } = point;
  return [
    worst !== null && mark(standing, standing),
    name(revisionName(point), 32),
    String(point.run),
    String(point.runCount),
    point.startedAt.slice(0, 16).replace('T', ' '),
    worst ? dbText(worst.marginDb) : 'no line',
    worst ? frequencyText(worst.frequencyHz) : '',
    [text, isOtherProgram && `${text === '' ? '' : '; '}by another program version`],
  ];
}

function bandTable(bands: readonly TrendBand[], points: readonly TrendPoint[]) {
  const shown = points.slice(-MOST_COLUMNS);
  const columns: Column[] = [
    { head: 'Worst margin by band, dB', width: 18, isWhole: true },
    ...shown.map((point): Column => ({ head: name(revisionName(point), 16), width: 13, isNumber: true })),
    { head: 'Last step', width: 17 },
  ];
  const row = (band: TrendBand): Text[] => [
    bandName(band),
    ...band.steps.slice(-MOST_COLUMNS).map(stateText),
    band.steps.at(-1)!.text,
  ];
  return table(columns, bands.map(row), 'bands');
}
