import { fileError } from '../../app/errors.ts';
import type { MeasurementInput } from '../../app/project/measurement.ts';
import { decodeText, readBytes } from './read-text.ts';

type Points = MeasurementInput['points'];
type Detector = Points[number]['detector'];

const MAX_BYTES = 64e6;
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const HZ_OF_UNIT = new Map([
  ['hz', 1],
  ['khz', 1e3],
  ['mhz', 1e6],
  ['ghz', 1e9],
]);
const DETECTORS = new Map<string, Detector>([
  ['qp', 'quasi-peak'],
  ['quasi-peak', 'quasi-peak'],
  ['quasipeak', 'quasi-peak'],
  ['pk', 'peak'],
  ['peak', 'peak'],
  ['av', 'average'],
  ['avg', 'average'],
  ['average', 'average'],
]);

/**
 * A table of field strengths: frequency, level in dBµV/m, and, if it has one, a detector column (QP, PK, AV). The unit of the
 * frequency is read from the header (`MHz`); without one it is Hz. Rows before the first two numbers are header; without
 * a detector the levels count as quasi-peak. `name`: what its owner calls the file. Throws `file` with the line.
 */
export async function readMeasurement(path: string, name: string): Promise<Points> {
  return parseMeasurement(name, decodeText(name, await readBytes(path, MAX_BYTES)));
}

export function parseMeasurement(name: string, text: string): Points {
  const points: Points = [];
  const header: string[] = [];
  let hzPerUnit = 1;
  for (const [i, line] of text.split(/\r\n|\n|\r/).entries()) {
    if (line.trim() === '') continue;
    const [frequency = '', level = '', ...others] = cellsOf(line);
    const isRow = NUMBER.test(frequency) && NUMBER.test(level);
    if (!isRow && points.length > 0) throw rowError(name, i, 'a row of frequency and level');
    if (!isRow) {
      header.push(line.toLowerCase());
      continue;
    }
    if (points.length === 0) hzPerUnit = unitOf(name, header);
    const frequencyHz = Number(frequency) * hzPerUnit;
    if (!(frequencyHz > 0)) throw rowError(name, i, 'a frequency above 0');
    points.push({ frequencyHz, levelDbuvPerM: Number(level), detector: detectorOf(others) });
  }
  if (points.length > 0) return points;
  throw fileError(name, 'must be a table of frequency and level (dBµV/m); received no row of two numbers');
}

const rowError = (name: string, index: number, must: string) =>
  fileError(name, `line ${index + 1} must be ${must}; received something else`);

function cellsOf(line: string): string[] {
  const separator = [';', '\t', ','].find((sign) => line.includes(sign)) ?? /\s+/;
  return line
    .trim()
    .split(separator)
    .map((cell) => cell.trim().replace(/^"(.*)"$/, '$1'));
}

/** Levels of another unit would be wrong by 20 dB and more: they are refused. */
function unitOf(name: string, header: readonly string[]): number {
  const text = header.join(' ');
  const other = /db(?:µ|μ|u)a(?:\/m)?|dbm|db(?:µ|μ|u)v(?!\/m)/.exec(text);
  if (other) throw fileError(name, `the levels must be in dBµV/m; received ${other[0]}`);
  const unit = /\b([kmg]?hz)\b/.exec(text)?.[1] ?? 'hz';
  return HZ_OF_UNIT.get(unit)!;
}

const detectorOf = (cells: readonly string[]): Detector => {
  for (const cell of cells) {
    const detector = DETECTORS.get(cell.toLowerCase());
    if (detector !== undefined) return detector;
  }
  return 'quasi-peak';
};
