import type { EstimateResult, ResultPoint } from '../../estimate/result.ts';
import { BREAK, type Column, mark, note, type Section, type Text, table } from '../blocks.ts';
import { degreesText, fixed, levelText, marginText, mhzText } from '../format.ts';
import { printed } from '../number.ts';
import { DETECTOR_SHORT } from '../text-table.ts';
import { type Standing, standingOf } from '../verdict.ts';
import { mainText } from './main-text.ts';

/** Rows before the table stops. */
const MOST_ROWS = 60;

const STANDING_WORD: Readonly<Record<Standing, string>> = { over: 'over', short: 'short', fine: 'fine' };

const number = (head: string, unit: string, width: number): Column => ({
  head: [head, BREAK, unit],
  width,
  isNumber: true,
});

const COLUMNS: readonly Column[] = [
  { head: '', width: 2.2 },
  number('Frequency', 'MHz', 9.4),
  { head: 'Det.', width: 4.4 },
  number('Level', 'dBµV/m', 7.4),
  number('Limit', 'dBµV/m', 7.4),
  { ...number('Margin', 'dB', 6.6), isStrong: true },
  number('Horiz.', 'dBµV/m', 7.4),
  number('Vert.', 'dBµV/m', 7.4),
  number('Bound', 'dBµV/m', 7.4),
  { head: 'Pol.', width: 4.2 },
  number('Height', 'm', 6),
  number('Angle', '°', 5.6),
  { head: 'Main contributor', width: 32 },
];

/** The worst readings in numbers. */
export function pointsSection(result: EstimateResult, mostRows = MOST_ROWS): Section {
  const title = 'Worst lines';
  const { points } = result;
  if (points.length === 0) return { title, blocks: [] };
  const shown = points.slice(0, mostRows);
  const left = points.length - shown.length;
  const more = left > 0 ? ` The ${left} readings that follow have larger margins; they are in the JSON result.` : '';
  return {
    title,
    blocks: [
      table(
        COLUMNS,
        shown.map((point) => row(point, result.limit.requiredMarginDb)),
        'points',
      ),
      note(
        `Worst margin first, ties by frequency.${more} QP quasi-peak, AV average, PK peak. Bound: linear sum of all contributors at the maximum. Angle: azimuth of the antenna in board axes, counter-clockwise from +x seen from the top.`,
      ),
    ],
  };
}

function row(point: ResultPoint, requiredMarginDb: number): Text[] {
  const standing = standingOf(point, requiredMarginDb);
  const level = (levelDb: number) => printed(levelText(levelDb));
  return [
    mark(standing, STANDING_WORD[standing]),
    mhzText(point.frequencyHz),
    DETECTOR_SHORT[point.detector],
    level(point.levelDbuvPerM),
    level(point.limitDbuvPerM),
    printed(marginText(point.marginDb)),
    level(point.horizontalDbuvPerM),
    level(point.verticalDbuvPerM),
    level(point.upperBoundDbuvPerM),
    point.polarization === 'horizontal' ? 'H' : 'V',
    fixed(point.antennaHeightM, 2),
    degreesText(point.turntableDeg),
    mainText(point),
  ];
}
