import type { Trend } from '../../compare/types.ts';
import { type Cell, csvText } from '../csv-text.ts';

/**
 * A trend as a table for a spreadsheet (`csvText`): for every set-up and revision one row of the whole judged range and one
 * a band; numbers unrounded, empty cells where there is no line.
 */
export function trendCsv(trend: Trend): string {
  const rows: Cell[][] = [[...HEADS]];
  for (const { board, setup, points, bands } of trend.groups) {
    for (const [i, point] of points.entries()) {
      const start = [
        board,
        setup.standard,
        setup.class,
        setup.distanceM,
        setup.measuredFrom,
        setup.site,
        setup.orientation,
        setup.structure,
        point.revision,
        point.run,
        point.startedAt,
        point.runCount,
        point.programVersion,
        point.requiredMarginDb,
      ];
      const ends = [
        { band: ['all', '', ''] as Cell[], step: point },
        ...bands.map(({ detector, fromHz, toHz, steps }) => ({ band: [detector, fromHz, toHz], step: steps[i]! })),
      ];
      for (const { band, step } of ends) {
        const { worst, changeDb, direction } = step;
        rows.push([...start, ...band, worst?.marginDb ?? '', worst?.frequencyHz ?? '', changeDb ?? '', direction]);
      }
    }
  }
  return csvText(rows);
}

const HEADS: readonly string[] = [
  'board',
  'standard',
  'class',
  'distance (m)',
  'measured from',
  'site',
  'orientation',
  'structure',
  'revision',
  'run',
  'started at',
  'runs of the revision',
  'program version',
  'required margin (dB)',
  'detector',
  'band from (Hz)',
  'band to (Hz)',
  'worst margin (dB)',
  'at (Hz)',
  'change (dB)',
  'direction',
];
