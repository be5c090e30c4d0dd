import { type Command, Option } from 'commander';
import type { EstimateResult } from '../../../app/estimate/result.ts';
import { chooseLimits } from '../../../app/limits/choose.ts';
import type { RunSettings } from '../../../app/project/run-settings.ts';
import { csvReport } from '../../../app/report/csv-report.ts';
import { htmlReport } from '../../../app/report/html-report.ts';
import { labelledLimits } from '../../../app/report/limit-labels.ts';
import { textReport } from '../../../app/report/text-report.ts';
import { mhzToHz } from '../../../app/units/convert.ts';
import { jsonText } from '../../files/json-text.ts';
import { loadBoard } from '../../files/load-board.ts';
import { estimateJob } from '../../jobs/estimate-job.ts';
import { runEstimate } from '../../jobs/run-estimate.ts';
import { ESTIMATE_HELP } from '../estimate-help.ts';
import { EXIT_DONE, EXIT_SHORT } from '../exit.ts';
import { addLaterOptions, refuseLaterOptions } from '../later.ts';
import { readLimitFile, standardAndClass } from '../limit-choice.ts';
import { numberWithin, wholeNumberWithin } from '../numbers.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../outputs.ts';
import { progressLine } from '../progress.ts';
import { chooseStructure, STRUCTURE_DEFAULT } from '../structure-choice.ts';
import { programVersion } from '../version.ts';

export interface EstimateOptions {
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
  readonly json?: string;
  readonly csv?: string;
  readonly html?: string;
}

/** What later versions bring; refused by name until then. */
const LATER = ['--project', '--pdf', '--waveform-at'];

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
    .addHelpText('after', ESTIMATE_HELP);
  addLaterOptions(command, LATER);
  command.action(async (file: string, options: EstimateOptions) => {
    refuseLaterOptions(command, LATER);
    process.exitCode = await estimateFile(file, options);
  });
}

async function estimateFile(file: string, options: EstimateOptions): Promise<number> {
  const { json, csv, html } = options;
  const inputs = [file, options.sources, options.limitFile];
  await checkOutputs({ '--json': json, '--csv': csv, '--html': html }, inputs);
  const limitFile = await readLimitFile(options.limitFile);
  const { standard, class: limitClass } = standardAndClass(options, limitFile);
  const loaded = await loadBoard(file, options.sources);
  const settings: RunSettings = {
    standard,
    class: limitClass,
    distanceM: options.distance,
    convertDistance: options.convertDistance === true,
    measuredFrom: options.measuredFrom,
    site: options.site,
    orientation: options.orientation,
    structure: chooseStructure(options.structure, loaded.document.board.structure?.planes),
    ...(options.maxMhz !== undefined && { maxHz: mhzToHz(options.maxMhz) }),
    requiredMarginDb: options.requiredMargin,
    ...(limitFile !== undefined && { limitFile }),
  };
  const job = estimateJob(loaded.document, settings, programVersion());
  const chosen = chooseLimits(job.limits, job.catalogue);
  const progress = progressLine('Frequency');
  const result = await runEstimate(job, progress.show).finally(progress.clear);

  await writeOutput(csv, () => csvReport(result));
  await writeOutput(html, () => htmlReport(result, loaded.board, labelledLimits(chosen.lines)));
  await writeOutput(json, () => jsonText(result));
  if (json !== STDOUT) process.stdout.write(textReport(result, { top: options.top, width: outputWidth() }));
  return exitCodeOf(result);
}

/** By the worst margin: every one must reach the required one. */
const exitCodeOf = ({ worst, limit }: EstimateResult): number =>
  worst !== null && worst.marginDb < limit.requiredMarginDb ? EXIT_SHORT : EXIT_DONE;
