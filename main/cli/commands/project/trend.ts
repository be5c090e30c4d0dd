import type { Command } from 'commander';
import { trendOf } from '../../../../app/compare/trend.ts';
import { trendText } from '../../../../app/report/trend/trend-text.ts';
import { checkOutputs, outputWidth, STDOUT } from '../../outputs.ts';
import { addProjectOption, type ProjectOption, withProject } from '../../project-file.ts';
import {
  addReportOptions,
  type ReportOptions,
  type ReportOutputs,
  reportFiles,
  writeReports,
} from '../../report-outputs.ts';

const HELP = `
Runs are grouped by set-up (standard, class, distance, site, orientation): only
margins of the same set-up are put in a row. A revision counts with its latest
run.

Examples:
  quietboard trend --project valve.quietboard
  quietboard trend --project valve.quietboard --html trend.html
`;

type TrendOptions = ProjectOption & ReportOptions & ReportOutputs;

export function addTrend(program: Command): void {
  const command = program
    .command('trend')
    .summary('worst margins from revision to revision')
    .description('Shows how the worst margin of every set-up and band moved from revision to revision.');
  addProjectOption(command)
    .option('--json <file>', 'write the trend as JSON; - for standard output')
    .option('--csv <file>', 'write the trend as CSV')
    .option('--html <file>', 'write the trend as one HTML file');
  addReportOptions(command).addHelpText('after', HELP).action(showTrend);
}

async function showTrend(options: TrendOptions): Promise<void> {
  await checkOutputs(reportFiles(options), [options.project]);
  const { name, trend, lastAt } = await withProject(options.project, 'read', (project) => ({
    name: project.info().name,
    trend: trendOf(project.trendRuns()),
    lastAt: project.runs({ limit: 1 })[0]?.startedAt,
  }));
  const title = lastAt === undefined ? undefined : { project: name, run: null, startedAt: lastAt, note: '' };
  await writeReports({ kind: 'trend', trend }, title, options);
  if (options.json !== STDOUT) process.stdout.write(trendText(trend, { width: outputWidth() }));
}
