import { type Command, Option } from 'commander';
import type { Board } from '../../app/board/board.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { LimitSet } from '../../app/limits/choose.ts';
import { csvReport } from '../../app/report/csv-report.ts';
import { htmlReport } from '../../app/report/html-report.ts';
import { junitReport } from '../../app/report/junit.ts';
import { labelledLimits } from '../../app/report/limit-labels.ts';
import type { ReportTitle } from '../../app/report/report-title.ts';
import { BUILT_IN_CHECKS } from '../../app/validate/built-in-summary.ts';
import { jsonText } from '../files/json-text.ts';
import { runPdf } from '../pdf/run-pdf.ts';
import { type OutputFiles, writeBytesOutput, writeOutput } from './outputs.ts';
import { programVersion } from './version.ts';

/** What goes into a report's title block beside what the result says. */
export interface ReportOptions {
  readonly paper: 'A4' | 'Letter';
  readonly author?: string;
  readonly date?: string;
}

/** Files to write about one run. */
export interface RunOutputs {
  readonly json?: string;
  readonly csv?: string;
  readonly html?: string;
  readonly pdf?: string;
  readonly junit?: string;
}

export const addReportOptions = (command: Command): Command =>
  command
    .option('--pdf <file>', 'write the report for the design review as PDF')
    .addOption(new Option('--paper <size>', 'paper of the PDF').choices(['A4', 'Letter']).default('A4'))
    .option('--author <name>', 'who answers for the report, for its title block')
    .option('--date <text>', "date for the title block (default: the stored run's)");

export const runOutputFiles = ({ json, csv, html, pdf, junit }: RunOutputs): OutputFiles => ({
  '--json': json,
  '--csv': csv,
  '--html': html,
  '--pdf': pdf,
  '--junit': junit,
});

interface StoredTitle {
  readonly project: string;
  readonly run: number | null;
  readonly startedAt: string;
  readonly note: string;
}

/** A result with what its reports show beside it. */
export interface ReportedRun {
  readonly result: EstimateResult;
  readonly board: Board;
  readonly limits: LimitSet;
  /** Absent: not kept in a project. */
  readonly stored?: StoredTitle;
}

/** Writes what was asked for. The same run gives the same bytes: the date is the run's own or the one given. */
export async function writeRunOutputs(
  run: ReportedRun,
  outputs: RunOutputs,
  { paper, author, date }: ReportOptions,
): Promise<void> {
  const { result, board, limits, stored } = run;
  const limitLines = labelledLimits(limits.lines);
  const title = titleOf(stored, { paper, author, date });
  await writeOutput(outputs.csv, () => csvReport(result));
  await writeOutput(outputs.html, () => htmlReport(result, board, limitLines, title));
  await writeOutput(outputs.junit, () =>
    junitReport(
      result,
      limits.lines,
      stored ? { startedAt: stored.startedAt, ...(stored.run !== null && { run: stored.run }) } : {},
    ),
  );
  await writeBytesOutput(outputs.pdf, () =>
    runPdf({
      result,
      board,
      limitLines,
      title,
      paper,
      validation: { programVersion: programVersion(), groups: BUILT_IN_CHECKS },
    }),
  );
  await writeOutput(outputs.json, () => jsonText(result));
}

/** The title block's own part. A report about several runs has no run number. */
export const titleOf = (stored: StoredTitle | undefined, { author, date }: ReportOptions): ReportTitle => ({
  project: stored?.project ?? '',
  author: author ?? '',
  dateText: date ?? (stored ? dateTextOf(stored.startedAt) : ''),
  runNumber: stored?.run ?? null,
  note: stored?.note ?? '',
});

/** "2026-12-01 14:05 UTC": the same on every machine. */
const dateTextOf = (isoUtc: string): string => `${isoUtc.slice(0, 10)} ${isoUtc.slice(11, 16)} UTC`;
