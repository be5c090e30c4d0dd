import { spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { STRUCTURE_CASES, type StructureCase, type StructureMaximum } from '../../app/validate/structure-cases.ts';
import { resonanceOf } from '../../app/validate/structure-resonance.ts';
import { solveStructure } from './solve-structure.ts';
import { changeDb } from './structure-change.ts';

/** A case whose values change by more with another division of the grid is refused: the answer is good to about 1 dB. */
const CONVERGED_DB = 1;
const CONVERGED_RESONANCE = 0.01;

/** Solves all cases, then a few frequencies of each with another division, and writes app/validate/structure-maxima.ts. */
export async function writeStructureMaxima(): Promise<void> {
  const rows: StructureMaximum[] = [];
  for (const testCase of STRUCTURE_CASES) {
    for (const row of await solveStructure(testCase, testCase.divisions, testCase.frequenciesHz)) {
      console.log(JSON.stringify(row));
      rows.push(row);
    }
  }
  const notes: string[] = [];
  for (const testCase of STRUCTURE_CASES) {
    const note = await convergence(testCase, rows);
    console.log(note);
    notes.push(note);
  }
  const version = spawnSync('nec2c', ['-v'], { encoding: 'utf8' }).stdout.trim();
  writeFileSync(new URL('../../app/validate/structure-maxima.ts', import.meta.url), source(rows, version, notes));
}

/** Two frequencies of a case (three around a resonance), solved with another division of the grid. */
async function convergence(testCase: StructureCase, rows: readonly StructureMaximum[]): Promise<string> {
  const { id, isResonance = false } = testCase;
  const own = rows.filter(({ caseId }) => caseId === id);
  const stored = isResonance ? aroundPeak(own) : [own[1]!, own.at(-1)!];
  const checkedHz = stored.map(({ frequencyHz }) => frequencyHz);
  const otherCase = { ...testCase, ...testCase.other };
  const other = await solveStructure(otherCase, otherCase.divisions, checkedHz);
  const how = `${id}: strips of ${stripMm(otherCase)} instead of ${stripMm(testCase)} mm`;
  if (isResonance) {
    const one = resonanceOf(stored);
    const two = resonanceOf(other);
    const shift = two.frequencyHz / one.frequencyHz - 1;
    const levelDb = 20 * Math.log10(two.fieldVPerM / one.fieldVPerM);
    if (!(Math.abs(shift) < CONVERGED_RESONANCE)) throw new Error(`${how}: resonance moves by ${shift}`);
    return `${how}: resonance ${(100 * shift).toFixed(2)} %, ${levelDb.toFixed(2)} dB`;
  }
  const worstDb = Math.max(...stored.map((row, i) => changeDb(row, other[i]!)));
  if (!(worstDb < CONVERGED_DB)) throw new Error(`${how}: ${worstDb} dB, not converged`);
  return `${how}: ${worstDb.toFixed(2)} dB at ${checkedHz.map((hz) => hz / 1e6).join(' and ')} MHz`;
}

const stripMm = ({ pitchM, divisions }: StructureCase): string => ((1e3 * pitchM) / divisions).toFixed(2);

function aroundPeak(rows: readonly StructureMaximum[]): readonly StructureMaximum[] {
  const { frequencyHz } = resonanceOf(rows);
  const next = rows.findIndex((row) => row.frequencyHz > frequencyHz);
  const nearest = rows[next]!.frequencyHz - frequencyHz < frequencyHz - rows[next - 1]!.frequencyHz ? next : next - 1;
  return rows.slice(nearest - 1, nearest + 2);
}

const source = (
  rows: readonly StructureMaximum[],
  version: string,
  notes: readonly string[],
): string => `import type { StructureMaximum } from './structure-cases.ts';

/**
 * Maxima over height (1-4 m) and angle at 3 m of the cases in structure-cases.ts over a perfect ground, and the largest current
 * of each cable. Written by \`npm run references\` (test/nec/generate.mjs) with ${version} (Debian), the plane as a wire grid.
 * Largest change with another division of the grid:
${notes.map((note) => ` * - ${note}`).join('\n')}
 * Not to be edited by hand.
 */
type Row = readonly [
  caseId: string,
  frequencyHz: number,
  horizontalVPerM: number,
  verticalVPerM: number,
  cableCurrentsA: readonly number[],
];

const ROWS: readonly Row[] = [
${rows.map(rowText).join('\n')}
];

export const STRUCTURE_MAXIMA: readonly StructureMaximum[] = ROWS.map(
  ([caseId, frequencyHz, horizontalVPerM, verticalVPerM, cableCurrentsA]) => ({
    caseId,
    frequencyHz,
    horizontalVPerM,
    verticalVPerM,
    cableCurrentsA,
  }),
);
`;

const rowText = (row: StructureMaximum): string =>
  `  ['${row.caseId}', ${row.frequencyHz / 1e6}e6, ${number(row.horizontalVPerM)}, ${number(row.verticalVPerM)}, [${row.cableCurrentsA.map(number).join(', ')}]],`;

const number = (value: number): string => String(Number(value.toPrecision(5)));
