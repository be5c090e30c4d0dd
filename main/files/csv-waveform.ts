import type { SampleColumns } from '../../app/board/convert-waveforms.ts';
import { fileError } from '../../app/errors.ts';
import { decodeText, readBytes } from './read-text.ts';

const MAX_BYTES = 64e6;
/** Lines of names, units and settings that oscilloscopes write before the first row. */
const MAX_HEADER_LINES = 200;
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/** A waveform file: time (s) and value (V or A). Throws `file` with the line. */
export async function readCsvWaveform(file: string): Promise<SampleColumns> {
  return parseCsvWaveform(file, decodeText(file, await readBytes(file, MAX_BYTES)));
}

/**
 * First two columns of a table, split by comma, semicolon, tab or spaces; header lines before the first row of two
 * numbers are skipped. Where the header calls the first column "Sequence", it counts samples, and the header's "Start"
 * and "Increment" columns give the times. Throws `file` with the line for a later row that is no two numbers.
 */
export function parseCsvWaveform(file: string, text: string): SampleColumns {
  const header: string[][] = [];
  const rows: [number, number][] = [];
  for (const [i, line] of text.split(/\r\n|\n|\r/).entries()) {
    if (line.trim() === '') continue;
    const cells = cellsOf(line);
    const [first = '', value = ''] = cells;
    if (NUMBER.test(first) && NUMBER.test(value)) {
      rows.push([Number(first), Number(value)]);
    } else if (rows.length > 0 || i >= MAX_HEADER_LINES) {
      throw fileError(file, `line ${i + 1} must be a row of two numbers, time (s) and value; received something else`);
    } else {
      header.push(cells);
    }
  }
  if (rows.length < 2)
    throw fileError(file, `must hold at least two rows of time (s) and value; received ${rows.length}`);
  const toTimeS = timeScale(file, header);
  return { timesS: rows.map(([first]) => toTimeS(first)), values: rows.map(([, value]) => value) };
}

function cellsOf(line: string): string[] {
  const separator = [',', ';', '\t'].find((character) => line.includes(character)) ?? /\s+/;
  return line
    .trim()
    .split(separator)
    .map((cell) => cell.trim());
}

/** From the first column to seconds. */
function timeScale(file: string, header: readonly string[][]): (first: number) => number {
  const units = header.find((cells) => /^sequence$/i.test(cells[0] ?? ''));
  if (units === undefined) return (timeS) => timeS;
  const setting = (name: RegExp): number => {
    const at = header[0]!.findIndex((cell) => name.test(cell));
    return NUMBER.test(units[at] ?? '') ? Number(units[at]) : Number.NaN;
  };
  const [startS, incrementS] = [setting(/^start$/i), setting(/^increment$/i)];
  if (Number.isFinite(startS) && incrementS > 0) return (count) => startS + count * incrementS;
  throw fileError(
    file,
    'the first column must be time in seconds; received sample numbers without start and increment',
  );
}
