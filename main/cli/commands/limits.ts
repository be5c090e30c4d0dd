import type { Command } from 'commander';
import { inputError } from '../../../app/errors.ts';
import { allLimitLines } from '../../../app/limits/catalogue.ts';
import { isStandard, type LimitLine } from '../../../app/limits/limit-line.ts';
import { fixed, trimmed } from '../../../app/report/format.ts';
import { terminalWidth } from '../../../app/report/safe-text.ts';
import { padEnd, wrapText } from '../../../app/report/wrap.ts';
import { hzToMhz } from '../../../app/units/convert.ts';
import { jsonText } from '../../files/json-text.ts';
import { table } from '../columns.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../outputs.ts';

const HELP = `
A step is shown as "level/level" at its frequency; between other points the line
is straight over the logarithm of the frequency. Values "from memory" were
recalled, not read: compare them with the standard before you rely on them.

Examples:
  quietboard limits
  quietboard limits "CISPR 32"
  quietboard limits en55032 --json -
`;

export function addLimits(program: Command): void {
  program
    .command('limits')
    .summary('the limit lines, with source and status')
    .description('Lists the built-in limit lines with class, distance, detector, levels, source and status.')
    .argument('[name]', 'one standard, by its name or an alias (any case)')
    .option('--json <file>', 'write the lines as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(runLimits);
}

async function runLimits(name: string | undefined, options: { readonly json?: string }): Promise<void> {
  await checkOutputs({ '--json': options.json }, []);
  const lines = name === undefined ? allLimitLines : allLimitLines.filter((line) => isStandard(line, name));
  if (lines.length === 0) {
    const known = [...new Set(allLimitLines.map((line) => line.standard))];
    throw inputError('limits', `the name of a standard (${known.join(', ')}) or an alias of one`, name);
  }
  await writeOutput(options.json, () => jsonText({ lines }));
  if (options.json !== STDOUT) process.stdout.write(`${limitLines(lines, outputWidth()).join('\n')}\n`);
}

function limitLines(lines: readonly LimitLine[], width: number): string[] {
  const standards = [...new Set(lines.map((line) => line.standard))];
  return standards.flatMap((standard, i) => {
    const own = lines.filter((line) => line.standard === standard);
    const aliases = [...new Set(own.flatMap((line) => line.aliases))];
    const sources = [...new Set(own.map((line) => `${line.edition}; ${line.source}`))];
    return [
      ...(i === 0 ? [] : ['']),
      standard,
      ...(aliases.length === 0 ? [] : wrapText(`also: ${aliases.join(', ')}`, width, '  ', '    ')),
      ...sources.flatMap((source) => wrapText(source, width, '  ', '    ')),
      ...lineTable(own, width),
    ];
  });
}

const COLUMNS = [
  { head: 'class', text: (line: LimitLine) => line.class },
  { head: 'm', text: (line: LimitLine) => trimmed(line.distanceM, 2), align: 'right' },
  { head: 'site', text: (line: LimitLine) => line.siteKind },
  { head: 'detector', text: (line: LimitLine) => line.detector },
  { head: 'status', text: (line: LimitLine) => line.sourceStatus },
] as const;
const POINTS_HEAD = 'MHz:dBµV/m';
const LEAST_POINTS_WIDTH = 24;

/** One line of the standard a row; the points are wrapped in the room that is left, never cut. */
function lineTable(lines: readonly LimitLine[], width: number): string[] {
  const indent = '  ';
  const rows = table(lines, COLUMNS, width - indent.length - LEAST_POINTS_WIDTH).map((row) => `${indent}${row}`);
  const start = rows.reduce((widest, row) => Math.max(widest, terminalWidth(row)), 0) + 2;
  const texts = [POINTS_HEAD, ...lines.map((line) => pointsText(line.points))];
  return rows.flatMap((row, i) => wrapText(texts[i]!, width, padEnd(row, start), ' '.repeat(start)));
}

/** "30:40, 230:40/47, 1000:47". */
function pointsText(points: LimitLine['points']): string {
  const levelsAt = new Map<number, string[]>();
  for (const [frequencyHz, level] of points) {
    levelsAt.set(frequencyHz, [...(levelsAt.get(frequencyHz) ?? []), trimmed(Number(fixed(level, 1)), 1)]);
  }
  return [...levelsAt]
    .map(([frequencyHz, levels]) => `${trimmed(hzToMhz(frequencyHz), 3)}:${levels.join('/')}`)
    .join(', ');
}
