import type { Detector, EstimateResult, ResultPoint } from '../estimate/result.ts';
import { isItself, mainContributor, pathText } from './contributor-text.ts';
import { degreesText, fixed, levelText, marginText, mhzText } from './format.ts';
import { safeTerminalText, terminalWidth } from './safe-text.ts';
import { type Standing, standingOf } from './verdict.ts';
import { padEnd, padStart } from './wrap.ts';

interface Column {
  readonly head: string;
  readonly align: 'left' | 'right';
  readonly text: (point: ResultPoint, standing: Standing) => string;
  /** Where room is short the highest goes first; 0 stays. */
  readonly dropRank: number;
}

export const DETECTOR_SHORT: Readonly<Record<Detector, string>> = { 'quasi-peak': 'QP', average: 'AV', peak: 'PK' };

/** A word, since a terminal may show neither colour nor symbols. */
const STANDING_WORD: Readonly<Record<Standing, string>> = { over: 'OVER', short: 'short', fine: '' };

const COLUMNS: readonly Column[] = [
  { head: 'MHz', align: 'right', dropRank: 0, text: (point) => mhzText(point.frequencyHz) },
  { head: 'det', align: 'left', dropRank: 2, text: (point) => DETECTOR_SHORT[point.detector] },
  { head: 'level', align: 'right', dropRank: 0, text: (point) => levelText(point.levelDbuvPerM) },
  { head: 'limit', align: 'right', dropRank: 3, text: (point) => levelText(point.limitDbuvPerM) },
  { head: 'margin', align: 'right', dropRank: 0, text: (point) => marginText(point.marginDb) },
  { head: '', align: 'left', dropRank: 0, text: (_point, standing) => STANDING_WORD[standing] },
  { head: 'pol', align: 'left', dropRank: 1, text: (point) => (point.polarization === 'horizontal' ? 'H' : 'V') },
  { head: 'm', align: 'right', dropRank: 4, text: (point) => fixed(point.antennaHeightM, 2) },
  { head: '°', align: 'right', dropRank: 5, text: (point) => degreesText(point.turntableDeg) },
];

/** Said above the table, so that the columns need not be as wide as their units. */
export const TABLE_UNITS = 'Levels in dBµV/m, margins in dB; antenna height in m, turntable angle in °.';

const GAP = ' ';
const LAST_GAP = '  ';
const LAST_HEAD = 'main contributor';

/** The points as a table; the last column, the main contributor, takes the width that is left. */
export function pointTable(points: readonly ResultPoint[], result: EstimateResult, width: number): string[] {
  let columns = COLUMNS.map((column) => withCells(column, points, result)).filter((column) => column.width > 0);
  const left = () =>
    width - columns.reduce((sum, column) => sum + column.width + GAP.length, LAST_GAP.length - GAP.length);
  while (left() < LAST_HEAD.length && columns.some(({ dropRank }) => dropRank > 0)) {
    const next = Math.max(...columns.map(({ dropRank }) => dropRank));
    columns = columns.filter(({ dropRank }) => dropRank !== next);
  }
  const row = (texts: readonly string[], last: string) => {
    const padded = columns.map(({ align, width }, i) => (align === 'right' ? padStart : padEnd)(texts[i]!, width));
    return `${padded.join(GAP)}${LAST_GAP}${last}`.trimEnd();
  };
  return [
    row(
      columns.map(({ head }) => head),
      safeTerminalText(LAST_HEAD, left()),
    ),
    ...points.map((point, i) =>
      row(
        columns.map(({ cells }) => cells[i]!),
        mainText(point, left()),
      ),
    ),
  ];
}

function withCells(column: Column, points: readonly ResultPoint[], { limit }: EstimateResult) {
  const cells = points.map((point) => column.text(point, standingOf(point, limit.requiredMarginDb)));
  return { ...column, cells, width: Math.max(...[column.head, ...cells].map(terminalWidth)) };
}

/** "CLK via valve cable", cut so that both names keep a share of the room. */
function mainText(point: ResultPoint, width: number): string {
  const main = mainContributor(point);
  if (!main) return '';
  const { contributor, path } = main;
  if (!path || isItself(contributor, path)) return safeTerminalText(contributor.name, width);
  const via = ' via ';
  const room = Math.max(0, width - via.length);
  const pathWidth = terminalWidth(safeTerminalText(pathText(path.name), room));
  const name = safeTerminalText(contributor.name, room - Math.min(pathWidth, Math.floor(room / 2)));
  return `${name}${via}${safeTerminalText(pathText(path.name), room - terminalWidth(name))}`;
}
