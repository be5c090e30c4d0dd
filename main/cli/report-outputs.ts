import { type Command, Option } from 'commander';
import { dateText } from '../../app/report/format.ts';
import type { ReportTitle } from '../../app/report/report-title.ts';
import { reportContent } from '../reports/report-content.ts';
import type { ReportFormat, ReportSubject } from '../reports/report-request.ts';
import { type OutputFiles, writeBytesOutput, writeOutput } from './outputs.ts';
import { programVersion } from './version.ts';

/** What goes into a report's title block beside what the result says. */
export interface ReportOptions {
  readonly paper: 'A4' | 'Letter';
  readonly author?: string;
  readonly date?: string;
}

/** Files to write. */
export interface ReportOutputs {
  readonly json?: string;
  readonly csv?: string;
  readonly html?: string;
  readonly pdf?: string;
  readonly junit?: string;
}

const FORMATS: readonly ReportFormat[] = ['csv', 'html', 'junit', 'pdf', 'json'];

export const addReportOptions = (command: Command): Command =>
  command
    .option('--pdf <file>', 'write the report for the design review as PDF')
    .addOption(new Option('--paper <size>', 'paper of the PDF').choices(['A4', 'Letter']).default('A4'))
    .option('--author <name>', 'who answers for the report, for its title block')
    .option('--date <text>', "date for the title block (default: the stored run's)");

export const reportFiles = (outputs: ReportOutputs): OutputFiles =>
  Object.fromEntries(FORMATS.map((format) => [`--${format}`, outputs[format]]));

/** What a project knows of the runs in a report. */
export interface StoredTitle {
  readonly project: string;
  /** null: several runs. */
  readonly run: number | null;
  readonly startedAt: string;
  readonly note: string;
}

/** Writes what was asked for. The same runs give the same bytes: the date is the run's own or the one given. */
export async function writeReports(
  subject: ReportSubject,
  stored: StoredTitle | undefined,
  options: ReportOutputs & ReportOptions,
): Promise<void> {
  const title = titleOf(stored, options);
  for (const format of FORMATS) {
    const file = options[format];
    if (file === undefined) continue;
    const request = { subject, format, title, paper: options.paper, programVersion: programVersion() };
    const content = await reportContent(request);
    if (typeof content === 'string') await writeOutput(file, () => content);
    else await writeBytesOutput(file, content);
  }
}

const titleOf = (stored: StoredTitle | undefined, { author, date }: ReportOptions): ReportTitle => ({
  project: stored?.project ?? '',
  author: author ?? '',
  dateText: date ?? (stored ? dateText(stored.startedAt) : ''),
  runNumber: stored?.run ?? null,
  note: stored?.note ?? '',
});
