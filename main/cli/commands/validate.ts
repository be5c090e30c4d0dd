import type { Command } from 'commander';
import { fixed } from '../../../app/report/format.ts';
import { visibleText } from '../../../app/report/safe-text.ts';
import { wrapText } from '../../../app/report/wrap.ts';
import type { Check } from '../../../app/validate/check.ts';
import { jsonText } from '../../files/json-text.ts';
import { runJob } from '../../jobs/run-job.ts';
import { type Column, table } from '../columns.ts';
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
  const groups = new Map<string, Check[]>();
  for (const check of checks) {
    const source = `${check.source} (${check.sourceStatus})`;
    groups.set(source, [...(groups.get(source) ?? []), check]);
  }
  return [
    ...[...groups].flatMap(([source, rows]) => [
      ...wrapText(visibleText(source), width),
      ...table(rows, COLUMNS, width - 2).map((line) => `  ${line}`),
      '',
    ]),
    `${count('pass')} pass, ${count('fail')} fail, ${count('info')} for information`,
  ];
}

const COLUMNS: readonly Column<Check>[] = [
  { head: 'quantity', text: (check) => check.quantity, minWidth: 12, isWrapped: true },
  { head: 'expected', text: (check) => number(check.expected), align: 'right' },
  { head: 'computed', text: (check) => number(check.computed), align: 'right' },
  { head: 'diff.', text: (check) => number(check.difference, 2), align: 'right' },
  { head: 'tol.', text: (check) => number(check.tolerance, 2), align: 'right' },
  { head: 'unit', text: (check) => check.unit, minWidth: 3 },
  { head: '', text: (check) => check.status },
];

/** So many significant digits, plain where that is short. */
function number(value: number, digits = 4): string {
  if (value === 0 || !Number.isFinite(value)) return fixed(value, 0);
  const size = Math.abs(value);
  if (size < 1e-3 || size >= 1e5) return value.toExponential(1);
  return String(Number(value.toPrecision(digits)));
}
