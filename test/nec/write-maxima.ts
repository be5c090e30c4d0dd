import { spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { NEC_CASES, type NecMaximum } from '../../app/validate/nec-cases.ts';

import { COARSE_END_SEGMENTS, changeDb, solveCase } from './solve-case.ts';

/** A case whose maxima change by more when the segments are doubled is refused. */
const CONVERGED_DB = 0.1;

/** Solves every case with single and doubled segments and writes the doubled model's maxima as app/validate/nec-maxima.ts. */
export async function writeMaxima(): Promise<void> {
  const rows: NecMaximum[] = [];
  let worstDb = 0;
  for (const testCase of NEC_CASES) {
    const coarse = await solveCase(testCase, COARSE_END_SEGMENTS);
    const fine = await solveCase(testCase, 2 * COARSE_END_SEGMENTS + 1);
    const caseDb = Math.max(...fine.map((row, index) => changeDb(row, coarse[index]!)));
    console.log(`${testCase.id}: ${caseDb.toFixed(3)} dB when the segments are doubled`);
    if (!(caseDb < CONVERGED_DB)) throw new Error(`${testCase.id} is not converged`);
    worstDb = Math.max(worstDb, caseDb);
    rows.push(...fine);
  }
  const version = spawnSync('nec2c', ['-v'], { encoding: 'utf8' }).stdout.trim();
  writeFileSync(new URL('../../app/validate/nec-maxima.ts', import.meta.url), source(rows, version, worstDb));
}

const source = (
  rows: readonly NecMaximum[],
  version: string,
  worstDb: number,
): string => `import type { NecMaximum } from './nec-cases.ts';

/**
 * Maxima over height (1-4 m) and angle of the cases in nec-cases.ts over a perfect ground. Written by
 * \`npm run references\` (test/nec/generate.mjs) with ${version} (Debian); doubling the segments changed no value by more than
 * ${worstDb.toFixed(3)} dB. Not to be edited by hand.
 */
type Row = readonly [
  caseId: string,
  distanceM: number,
  frequencyHz: number,
  horizontalVPerM: number,
  verticalVPerM: number,
];

const ROWS: readonly Row[] = [
${rows.map(rowText).join('\n')}
];

export const NEC_MAXIMA: readonly NecMaximum[] = ROWS.map(
  ([caseId, distanceM, frequencyHz, horizontalVPerM, verticalVPerM]) => ({
    caseId,
    distanceM,
    frequencyHz,
    horizontalVPerM,
    verticalVPerM,
  }),
);
`;

const rowText = (row: NecMaximum): string =>
  `  ['${row.caseId}', ${row.distanceM}, ${row.frequencyHz / 1e6}e6, ${number(row.horizontalVPerM)}, ${number(row.verticalVPerM)}],`;

const number = (value: number): string => String(Number(value.toPrecision(5)));
