import type { Command } from 'commander';
import type { ImportSummary } from '../../../app/board/import-summary.ts';
import { countText, fixed } from '../../../app/report/format.ts';
import { safeTerminalText } from '../../../app/report/safe-text.ts';
import { wrapText } from '../../../app/report/wrap.ts';
import { importBoard } from '../../files/import-board.ts';
import { jsonText } from '../../files/json-text.ts';
import { table } from '../columns.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../outputs.ts';

interface ImportOptions {
  readonly output?: string;
  readonly json?: string;
}

const LONGEST_SHOWN = 10;

const HELP = `
Accepted: IPC-2581 files (XML, revisions A, B and C), an open format that many
layout programs write. What the file lacks is said as a finding.

Examples:
  quietboard import layout.xml
  quietboard import layout.xml -o layout.board.json
  quietboard import layout.xml --json -

The other commands read a layout directly, too. A board file is the better start
when planes, stackup or return paths need to be completed by hand.
`;

export function addImport(program: Command): void {
  program
    .command('import')
    .summary('open layout format to board file, with a summary and findings')
    .description('Reads a layout in an open format, says what is in it, and writes it as a board file.')
    .argument('<file>', 'the layout')
    .option('-o, --output <board>', 'write the board file here')
    .option('--json <file>', 'write the summary as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(runImport);
}

async function runImport(file: string, options: ImportOptions): Promise<void> {
  await checkOutputs({ '--output': options.output, '--json': options.json }, [file]);
  const { board, summary } = await importBoard(file);
  await writeOutput(options.output, () => jsonText(board));
  await writeOutput(options.json, () => jsonText(summary));
  if (options.json !== STDOUT) process.stdout.write(`${summaryLines(summary, outputWidth()).join('\n')}\n`);
}

function summaryLines(summary: ImportSummary, width: number): string[] {
  const { source, boardMm } = summary;
  const facts: [string, string][] = [
    [
      'Source',
      [source.format, source.revision && `revision ${source.revision}`, source.units].filter(Boolean).join(', '),
    ],
    [
      'Board',
      `${fixed(boardMm[0], 2)} × ${fixed(boardMm[1], 2)} mm, ${countText(summary.copperLayers, 'copper layer')}`,
    ],
    ['Nets', `${summary.nets}, of which ${summary.netsWithTraces} with traces`],
    [
      'Copper',
      `${countText(summary.segments, 'segment')}, ${countText(summary.arcs, 'arc')}, ${countText(summary.vias, 'via')}`,
    ],
    ['Parts', `${summary.components}`],
    ['Traces', `${fixed(summary.traceLengthMm, 1)} mm in all`],
  ];
  const longest = summary.netLengths.slice(0, LONGEST_SHOWN);
  const left = summary.netLengths.length - longest.length;
  return [
    ...facts.map(([head, text]) => `${head.padEnd(8)}${safeTerminalText(text, width - 8)}`),
    ...(longest.length === 0 ? [] : ['', ...longestTable(longest, width)]),
    ...(left > 0 ? [`… ${left} more (all of them with --json)`] : []),
    '',
    ...(summary.findings.length === 0 ? ['No findings.'] : ['Findings']),
    ...summary.findings.flatMap(({ message }) => wrapText(safeTerminalText(message, 1000), width, '  - ', '    ')),
  ];
}

const longestTable = (rows: ImportSummary['netLengths'], width: number): string[] =>
  table(
    rows,
    [
      { head: 'longest nets', text: ({ name }) => name, minWidth: 12 },
      { head: 'mm', text: ({ lengthMm }) => fixed(lengthMm, 2), align: 'right' },
    ],
    width,
  );
