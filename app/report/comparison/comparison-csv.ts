import type { Comparison, LineChange } from '../../compare/types.ts';
import { type Cell, csvText } from '../csv-text.ts';

/**
 * The lines of a comparison as a table for a spreadsheet (`csvText`): one row a reading, worst margin first, empty cells
 * where a side has none; numbers unrounded. The contributor whose own level changed most, then what changed about it.
 */
export function comparisonCsv(comparison: Comparison): string {
  return csvText([
    COLUMNS.map(([head]) => head),
    ...comparison.lines.map((line) => COLUMNS.map(([, cell]) => cell(line, comparison) ?? '')),
  ]);
}

type Value = Cell | null | undefined;

const COLUMNS: readonly (readonly [head: string, cell: (line: LineChange, comparison: Comparison) => Value])[] = [
  ['frequency (Hz)', ({ frequencyHz }) => frequencyHz],
  ['detector', ({ detector }) => detector],
  ['status', ({ status }) => status],
  ['limit crossing', ({ crossing }) => crossing],
  ['level before (dBuV/m)', ({ before }) => before?.levelDbuvPerM],
  ['level after (dBuV/m)', ({ after }) => after?.levelDbuvPerM],
  ['level change (dB)', ({ levelChangeDb }) => levelChangeDb],
  ['limit before (dBuV/m)', ({ before }) => before?.limitDbuvPerM],
  ['limit after (dBuV/m)', ({ after }) => after?.limitDbuvPerM],
  ['margin before (dB)', ({ before }) => before?.marginDb],
  ['margin after (dB)', ({ after }) => after?.marginDb],
  ['margin change (dB)', ({ marginChangeDb }) => marginChangeDb],
  ['contributor', ({ contributors }) => contributors[0]?.name],
  ['contributor radiates from', ({ contributors }) => contributors[0]?.path],
  ['contributor before (dBuV/m)', ({ contributors }) => contributors[0]?.beforeDbuvPerM],
  ['contributor after (dBuV/m)', ({ contributors }) => contributors[0]?.afterDbuvPerM],
  ['what changed', ({ causes }, { changes }) => causes.map((index) => changes[index]!.text).join('; ')],
];
