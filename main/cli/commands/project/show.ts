import type { Command } from 'commander';
import { textReport } from '../../../../app/report/text-report.ts';
import { reportedRun } from '../../../reports/reported-run.ts';
import { wholeNumberWithin } from '../../numbers.ts';
import { checkOutputs, outputWidth, STDOUT } from '../../outputs.ts';
import { addProjectOption, type ProjectOption, runNumber, withProject } from '../../project-file.ts';
import {
  addReportOptions,
  type ReportOptions,
  type ReportOutputs,
  reportFiles,
  writeReports,
} from '../../report-outputs.ts';

const HELP = `
Examples:
  quietboard show --project valve.quietboard 7
  quietboard show --project valve.quietboard 7 --pdf review.pdf \\
      --author "A. Designer"
`;

interface ShowOptions extends ProjectOption, ReportOptions, ReportOutputs {
  readonly top: number;
}

export function addShow(program: Command): void {
  const command = program
    .command('show')
    .summary('a run kept in a project: table, report, raw numbers')
    .description('Shows a run as it was when it was estimated; nothing is computed again.')
    .argument('<run>', 'number of the run');
  addProjectOption(command)
    .option('--top <n>', 'rows of the printed table', wholeNumberWithin(0, 1e6), 20)
    .option('--json <file>', 'write the result as JSON; - for standard output')
    .option('--csv <file>', 'write the points as CSV')
    .option('--html <file>', 'write the report as one HTML file')
    .option('--junit <file>', 'write the bands as test cases for a build server');
  addReportOptions(command).addHelpText('after', HELP).action(show);
}

async function show(number: string, options: ShowOptions): Promise<void> {
  await checkOutputs(reportFiles(options), [options.project]);
  const run = runNumber(number);
  const { name, stored } = await withProject(options.project, 'read', (project) => ({
    name: project.info().name,
    stored: project.run(run),
  }));
  const title = { project: name, run, startedAt: stored.startedAt, note: stored.note };
  await writeReports({ kind: 'run', run: reportedRun(stored) }, title, options);
  if (options.json !== STDOUT) {
    process.stdout.write(textReport(stored.result, { top: options.top, width: outputWidth() }));
  }
}
