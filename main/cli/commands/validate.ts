import type { Command } from 'commander';
import { fixed } from '../../../app/report/format.ts';
import type { Check } from '../../../app/validate/check.ts';
import { jsonText } from '../../files/json-text.ts';
import { runJob } from '../../jobs/run-job.ts';
import { table } from '../columns.ts';
import { EXIT_DONE, EXIT_SHORT } from '../exit.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../outputs.ts';

const HELP = `
Every row compares a number from outside (a standard, a book, a closed form, a
general field solver) with what this program's own kernels compute now. Rows
marked info are shown beside the program's answer and cannot fail.

Examples:
  quietboard validate
  quietboard validate --json checks.json
  quietboard validate --json -

Exit code 1 when a row fails.
`;

export function addValidate(program: Command): void {
  program
    .command('validate')
    .summary('run the published checks of the program itself')
    .description('Runs the published checks of the program itself and prints source, expected, computed, difference.')
    .option('--json <file>', 'write the rows as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(runValidate);
}

async function runValidate(options: { readonly json?: string }): Promise<void> {
  await checkOutputs({ '--json': options.json }, []);
  const checks = await runJob('validate', null);
  await writeOutput(options.json, () => jsonText({ checks }));
  if (options.json !== STDOUT) process.stdout.write(`${checkLines(checks, outputWidth()).join('\n')}\n`);
  process.exitCode = checks.some((check) => check.status === 'fail') ? EXIT_SHORT : EXIT_DONE;
}

function checkLines(checks: readonly Check[], width: number): string[] {
  const count = (status: Check['status']) => checks.filter((check) => check.status === status).length;
  return [
    ...table(
      checks,
      [
        { head: 'quantity', text: (check) => check.quantity, minWidth: 12 },
        { head: 'source', text: (check) => `${check.source} (${check.sourceStatus})`, minWidth: 10 },
        { head: 'expected', text: (check) => number(check.expected), align: 'right' },
        { head: 'computed', text: (check) => number(check.computed), align: 'right' },
        { head: 'diff.', text: (check) => number(check.difference), align: 'right' },
        { head: 'tol.', text: (check) => number(check.tolerance), align: 'right' },
        { head: 'unit', text: (check) => check.unit, minWidth: 3 },
        { head: '', text: (check) => check.status },
      ],
      width,
    ),
    '',
    `${count('pass')} pass, ${count('fail')} fail, ${count('info')} for information`,
  ];
}

/** Four significant digits, plain where that is short. */
function number(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  return size >= 1e-3 && size < 1e5
    ? String(Number(value.toPrecision(4)))
    : Number.isFinite(value)
      ? value.toExponential(1)
      : fixed(value, 0);
}
