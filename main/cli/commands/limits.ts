import type { Command } from 'commander';
import { inputError } from '../../../app/errors.ts';
import { allLimitLines } from '../../../app/limits/catalogue.ts';
import { isStandard, type LimitLine } from '../../../app/limits/limit-line.ts';
import { fixed, trimmed } from '../../../app/report/format.ts';
import { wrapText } from '../../../app/report/wrap.ts';
import { hzToMhz } from '../../../app/units/convert.ts';
import { jsonText } from '../../files/json-text.ts';
import { type Column, table } from '../columns.ts';
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
      ...table(own, COLUMNS, width - 2).map((line) => `  ${line}`),
    ];
  });
}

const COLUMNS: readonly Column<LimitLine>[] = [
  { head: 'class', text: (line) => line.class },
  { head: 'm', text: (line) => trimmed(line.distanceM, 2), align: 'right' },
  { head: 'site', text: (line) => line.siteKind },
  { head: 'detector', text: (line) => line.detector },
  { head: 'status', text: (line) => line.sourceStatus },
  { head: 'MHz:dBµV/m', text: (line) => pointsText(line.points), minWidth: 10, isWrapped: true },
];

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
