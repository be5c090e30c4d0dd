import type { Command } from 'commander';
import { type FieldResult, parseFieldJob } from '../../../app/fields/field-job.ts';
import { fixed, mhzText } from '../../../app/report/format.ts';
import { peakFieldToDbuvPerM } from '../../../app/units/convert.ts';
import { inFile } from '../../files/in-file.ts';
import { jsonText } from '../../files/json-text.ts';
import { readJson } from '../../files/read-text.ts';
import { runJob } from '../../jobs/run-job.ts';
import { table } from '../columns.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../outputs.ts';

const HELP = `
The job file (metres, hertz, amperes; peak phasors as [re, im], e^(+jωt)):
  { "format": "quietboard-field", "version": 1,
    "frequenciesHz": [100e6], "ground": "none",
    "elements": [{ "fromM": [0,0,0.8], "toM": [0.01,0,0.8],
                   "currentA": [1,0], "currentEndA": [1,0] }],
    "observersM": [[3,0,1]] }
"ground": "perfect" reflects at z = 0. The current is linear between both ends;
"currentEndA" may be left out when it is the same.

Examples:
  quietboard field dipole.json
  quietboard field dipole.json --json fields.json
`;

export function addField(program: Command): void {
  program
    .command('field')
    .summary('E and H of given current elements at given points')
    .description('Electric and magnetic field of given straight current elements at given points.')
    .argument('<job>', 'the job file (JSON)')
    .option('--json <file>', 'write the complex fields as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(runField);
}

async function runField(file: string, options: { readonly json?: string }): Promise<void> {
  await checkOutputs({ '--json': options.json }, [file]);
  const { json } = await readJson(file);
  const result = await runJob(
    'field',
    inFile(file, () => parseFieldJob(json)),
  );
  await writeOutput(options.json, () => jsonText(result));
  if (options.json !== STDOUT) process.stdout.write(`${fieldLines(result, outputWidth()).join('\n')}\n`);
}

function fieldLines({ fields }: FieldResult, width: number): string[] {
  const rows = fields.flatMap(({ frequencyHz, observers }) =>
    observers.map(({ electricVPerM, magneticAPerM }, i) => ({
      frequencyHz,
      observer: i + 1,
      electricVPerM: magnitude(electricVPerM),
      magneticAPerM: magnitude(magneticAPerM),
    })),
  );
  return table(
    rows,
    [
      { head: 'MHz', text: (row) => mhzText(row.frequencyHz), align: 'right' },
      { head: 'observer', text: (row) => `${row.observer}`, align: 'right' },
      { head: '|E| V/m (peak)', text: (row) => row.electricVPerM.toExponential(4), align: 'right' },
      { head: 'dBµV/m (rms)', text: (row) => fixed(peakFieldToDbuvPerM(row.electricVPerM), 1), align: 'right' },
      { head: '|H| A/m (peak)', text: (row) => row.magneticAPerM.toExponential(4), align: 'right' },
    ],
    width,
  );
}

/** Length of a complex vector. */
const magnitude = (vector: readonly (readonly [number, number])[]): number => Math.hypot(...vector.flat());
