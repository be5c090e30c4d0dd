import type { Command } from 'commander';
import { compareResults, type ResultDifference } from '../../../../app/compare/result-difference.ts';
import { frequencyText } from '../../../../app/report/format.ts';
import { visibleText } from '../../../../app/report/safe-text.ts';
import { wrapText } from '../../../../app/report/wrap.ts';
import { jsonText } from '../../../files/json-text.ts';
import { estimateJob } from '../../../jobs/estimate-job.ts';
import { runEstimate } from '../../../jobs/run-estimate.ts';
import { EXIT_DONE, EXIT_SHORT } from '../../exit.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../../outputs.ts';
import { progressLine } from '../../progress.ts';
import { addProjectOption, type ProjectOption, runNumber, withProject } from '../../project-file.ts';
import { programVersion } from '../../version.ts';

const HELP = `
The same program version gives the same numbers, bit for bit. Another version
may not: what it changed is shown, and the stored run stays as it is.

Example:
  quietboard rerun --project valve.quietboard 7

Exit codes: 0 the same result, 1 another one.
`;

interface RerunOptions extends ProjectOption {
  readonly json?: string;
}

export function addRerun(program: Command): void {
  const command = program
    .command('rerun')
    .summary('compute a stored run again and show the difference')
    .description('Computes a stored run again from what the project keeps, and compares with the stored result.')
    .argument('<run>', 'number of the run');
  addProjectOption(command)
    .option('--json <file>', 'write the difference as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(async (run: string, options: RerunOptions) => {
      process.exitCode = await rerun(runNumber(run), options);
    });
}

async function rerun(run: number, { project: file, json }: RerunOptions): Promise<number> {
  await checkOutputs({ '--json': json }, [file]);
  const stored = await withProject(file, 'read', (project) => project.run(run));
  const progress = progressLine('Frequency');
  const job = estimateJob(stored.document, stored.settings, programVersion());
  const result = await runEstimate(job, { onProgress: progress.show }).finally(progress.clear);
  const difference = compareResults(stored.result, result);
  await writeOutput(json, () =>
    jsonText({
      format: 'quietboard-rerun',
      version: 1,
      run,
      storedVersion: stored.programVersion,
      programVersion: programVersion(),
      ...difference,
    }),
  );
  if (json !== STDOUT) {
    const text = sentence(run, stored.programVersion, difference);
    process.stdout.write(`${wrapText(text, outputWidth()).join('\n')}\n`);
  }
  return difference.isIdentical ? EXIT_DONE : EXIT_SHORT;
}

function sentence(run: number, storedVersion: string, difference: ResultDifference): string {
  const who = `Run #${run}, stored by version ${visibleText(storedVersion)}, computed again by version ${programVersion()}`;
  if (difference.isIdentical) return `${who}: the same result, ${difference.pointCount} readings, bit for bit.`;
  const levels =
    difference.largestDb === null
      ? 'no reading is in both'
      : `levels differ by up to ${difference.largestDb.toPrecision(2)} dB (at ${frequencyText(difference.largestAtHz ?? 0)})`;
  const counts = `${difference.onlyStored} readings only in the stored result, ${difference.onlyNew} only in the new one`;
  const other = difference.otherKeys.length === 0 ? '' : `; also different: ${difference.otherKeys.join(', ')}`;
  return `${who}: another result: ${levels}; ${counts}${other}.`;
}
