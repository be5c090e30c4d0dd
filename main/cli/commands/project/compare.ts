import type { Command } from 'commander';
import { compareRuns } from '../../../../app/compare/compare-runs.ts';
import { comparisonText } from '../../../../app/report/comparison/comparison-text.ts';
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
Positive changes of a margin are improvements. Lines that one of the two runs
does not have are shown as new or gone.

Examples:
  quietboard compare --project valve.quietboard 1 2
  quietboard compare --project valve.quietboard 2 3 --pdf b-to-c.pdf
`;

interface CompareOptions extends ProjectOption, ReportOptions, ReportOutputs {
  readonly top: number;
}

export function addCompare(program: Command): void {
  const command = program
    .command('compare')
    .summary('two runs of a project, line by line, and what changed')
    .description('Compares two runs: what changed on the board and in the set-up, and what that did to every line.')
    .argument('<before>', 'number of the earlier run')
    .argument('<after>', 'number of the later run');
  addProjectOption(command)
    .option('--top <n>', 'rows of the printed tables', wholeNumberWithin(0, 1e6), 20)
    .option('--json <file>', 'write the comparison as JSON; - for standard output')
    .option('--csv <file>', 'write the lines as CSV')
    .option('--html <file>', 'write the comparison as one HTML file');
  addReportOptions(command).addHelpText('after', HELP).action(compare);
}

async function compare(before: string, after: string, options: CompareOptions): Promise<void> {
  await checkOutputs(reportFiles(options), [options.project]);
  const numbers = [runNumber(before), runNumber(after)] as const;
  const { name, comparison } = await withProject(options.project, 'read', (project) => ({
    name: project.info().name,
    comparison: compareRuns(project.run(numbers[0]), project.run(numbers[1])),
  }));
  const title = { project: name, run: null, startedAt: comparison.after.startedAt, note: '' };
  await writeReports({ kind: 'comparison', comparison }, title, options);
  if (options.json !== STDOUT) {
    process.stdout.write(comparisonText(comparison, { top: options.top, width: outputWidth() }));
  }
}
