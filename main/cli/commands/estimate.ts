import { type Command, Option } from 'commander';
import { AppError } from '../../../app/errors.ts';
import type { EstimateResult } from '../../../app/estimate/result.ts';
import { chooseLimits } from '../../../app/limits/choose.ts';
import { parseLimitFile } from '../../../app/limits/limit-file.ts';
import { limitRequestOf, type RunSettings } from '../../../app/project/run-settings.ts';
import { visibleText } from '../../../app/report/safe-text.ts';
import { textReport } from '../../../app/report/text-report.ts';
import { mhzToHz } from '../../../app/units/convert.ts';
import { Project } from '../../db/project.ts';
import type { NewRun } from '../../db/runs-repository.ts';
import { loadBoard } from '../../files/load-board.ts';
import { estimateJob } from '../../jobs/estimate-job.ts';
import { runEstimate } from '../../jobs/run-estimate.ts';
import { ESTIMATE_HELP } from '../estimate-help.ts';
import { EXIT_DONE, EXIT_SHORT } from '../exit.ts';
import { addLaterOptions, refuseLaterOptions } from '../later.ts';
import { readLimitFile, standardAndClass } from '../limit-choice.ts';
import { numberWithin, wholeNumberWithin } from '../numbers.ts';
import { checkOutputs, outputWidth, STDOUT } from '../outputs.ts';
import { progressLine } from '../progress.ts';
import { withProject } from '../project-file.ts';
import {
  addReportOptions,
  type ReportOptions,
  type ReportOutputs,
  reportFiles,
  type StoredTitle,
  writeReports,
} from '../report-outputs.ts';
import { chooseStructure, STRUCTURE_DEFAULT } from '../structure-choice.ts';
import { programVersion } from '../version.ts';

export interface EstimateOptions extends ReportOptions, ReportOutputs {
  readonly sources?: string;
  readonly standard?: string;
  readonly class?: string;
  readonly distance: number;
  readonly convertDistance?: boolean;
  readonly limitFile?: string;
  readonly measuredFrom: 'boundary' | 'center';
  readonly site: 'ground-plane' | 'free-space';
  readonly orientation: 'flat' | 'upright';
  readonly structure?: 'solved' | 'pair-only';
  readonly maxMhz?: number;
  readonly requiredMargin: number;
  readonly top: number;
  readonly project?: string;
  readonly note?: string;
}

/** What later versions bring; refused by name until then. */
const LATER = ['--waveform-at'];

export function addEstimate(program: Command): void {
  const command = program
    .command('estimate')
    .summary('estimate the radiated emission and compare with limit lines')
    .description('Estimates the radiated emission of a board and compares it with limit lines.')
    .argument('<board>', 'board file, or a layout in an open format')
    .option('--sources <file>', 'sources file: waveforms, drives, loads, loops, cables')
    .option('--standard <name>', 'limit lines, see "quietboard limits" (default: CISPR 32)')
    .option('--class <class>', 'class of the standard (default: B)')
    .option('--distance <m>', 'antenna distance', numberWithin(0.5, 100, 'm'), 3)
    .option('--convert-distance', "convert limits to this distance by the standard's rule")
    .option('--limit-file <file>', 'own limit lines instead of the built-in ones')
    .addOption(
      new Option('--measured-from <place>', 'where the distance starts')
        .choices(['boundary', 'center'])
        .default('boundary'),
    )
    .addOption(new Option('--site <kind>', 'test site').choices(['ground-plane', 'free-space']).default('ground-plane'))
    .addOption(new Option('--orientation <how>', 'board on the table').choices(['flat', 'upright']).default('flat'))
    .addOption(
      new Option('--structure <how>', `currents of planes and cables (default: ${STRUCTURE_DEFAULT})`).choices([
        'solved',
        'pair-only',
      ]),
    )
    .option('--max-mhz <n>', "upper end (default: the standard's rule)", numberWithin(1, 1e6, 'MHz'))
    .option('--required-margin <dB>', 'margin to keep below the limit', numberWithin(0, 100, 'dB'), 0)
    .option('--top <n>', 'rows of the printed table', wholeNumberWithin(0, 1e6), 20)
    .option('--json <file>', 'write the result as JSON; - for standard output')
    .option('--csv <file>', 'write the points as CSV')
    .option('--html <file>', 'write the report as one HTML file')
    .option('--junit <file>', 'write the bands as test cases for a build server')
    .option('--project <file>', 'keep the run in this project file; made when absent')
    .option('--note <text>', 'note to the kept run');
  addReportOptions(command).addHelpText('after', ESTIMATE_HELP);
  addLaterOptions(command, LATER);
  command.action(async (file: string, options: EstimateOptions) => {
    refuseLaterOptions(command, LATER);
    process.exitCode = await estimateFile(file, options);
  });
}

async function estimateFile(file: string, options: EstimateOptions): Promise<number> {
  const { json, project } = options;
  if (options.note !== undefined && project === undefined) {
    throw new AppError('input', '--note must go with --project; received no project', '--note');
  }
  Project.requireNote(options.note ?? '');
  const inputs = [file, options.sources, options.limitFile];
  await checkOutputs({ ...reportFiles(options), '--project': project }, inputs);
  const limitFile = await readLimitFile(options.limitFile);
  const { standard, class: limitClass } = standardAndClass(options, limitFile);
  const wanted: RunSettings = {
    standard,
    class: limitClass,
    distanceM: options.distance,
    convertDistance: options.convertDistance === true,
    measuredFrom: options.measuredFrom,
    site: options.site,
    orientation: options.orientation,
    structure: STRUCTURE_DEFAULT,
    ...(options.maxMhz !== undefined && { maxHz: mhzToHz(options.maxMhz) }),
    requiredMarginDb: options.requiredMargin,
    ...(limitFile !== undefined && { limitFile }),
  };
  // Limits that do not exist, and a project that cannot be opened, must not be found out after minutes of work.
  chooseLimits(limitRequestOf(wanted), limitFile === undefined ? undefined : parseLimitFile(limitFile));
  if (project !== undefined) Project.requireWritable(project);
  const loaded = await loadBoard(file, options.sources);
  const structure = chooseStructure(options.structure, loaded.document.board.structure?.planes);
  const settings: RunSettings = { ...wanted, structure };
  const job = estimateJob(loaded.document, settings, programVersion());
  const chosen = chooseLimits(job.limits, job.catalogue);
  const progress = progressLine('Frequency');
  const startedAt = new Date();
  const result = await runEstimate(job, { onProgress: progress.show }).finally(progress.clear);
  const durationS = (Date.now() - startedAt.getTime()) / 1000;
  const run = { startedAt: startedAt.toISOString(), document: loaded.document, settings, result, durationS };
  const { stored, failure } =
    project === undefined ? NOT_KEPT : await keep(project, { ...run, note: options.note ?? '' });
  const reported = {
    result,
    board: job.board,
    limitLines: chosen.lines,
    ...(stored && { startedAt: stored.startedAt }),
  };
  await writeReports({ kind: 'run', run: reported }, stored, options);
  if (json !== STDOUT) process.stdout.write(textReport(result, { top: options.top, width: outputWidth() }));
  if (failure !== undefined) throw failure;
  if (stored) {
    const text = `Kept as run #${stored.run} in ${visibleText(project!)}.\n`;
    if (json === STDOUT) process.stderr.write(text);
    else process.stdout.write(`\n${text}`);
  }
  return exitCodeOf(result);
}

interface Kept {
  readonly stored?: StoredTitle;
  /** Why the run could not be kept: told last, so that the work of minutes is shown and written all the same. */
  readonly failure?: unknown;
}
const NOT_KEPT: Kept = {};

async function keep(file: string, run: NewRun & { readonly note: string }): Promise<Kept> {
  try {
    const stored = await withProject(file, 'create', (project) => ({
      project: project.info().name,
      run: project.addRun(run),
      startedAt: run.startedAt,
      note: run.note,
    }));
    return { stored };
  } catch (failure) {
    return { failure };
  }
}

/** By the worst margin: every one must reach the required one. */
const exitCodeOf = ({ worst, limit }: EstimateResult): number =>
  worst !== null && worst.marginDb < limit.requiredMarginDb ? EXIT_SHORT : EXIT_DONE;
