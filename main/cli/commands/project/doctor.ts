import type { Command } from 'commander';
import type { DoctorReport } from '../../../../app/project/project-info.ts';
import { countText } from '../../../../app/report/format.ts';
import { visibleText } from '../../../../app/report/safe-text.ts';
import { padEnd, wrapText } from '../../../../app/report/wrap.ts';
import { jsonText } from '../../../files/json-text.ts';
import { EXIT_DONE, EXIT_SHORT } from '../../exit.ts';
import { checkOutputs, outputWidth, STDOUT, writeOutput } from '../../outputs.ts';
import { addProjectOption, type ProjectOption, withProject } from '../../project-file.ts';

const HELP = `
Reads every byte and changes nothing.

Example:
  quietboard doctor --project valve.quietboard

Exit code 1 when something is amiss.
`;

interface DoctorOptions extends ProjectOption {
  readonly json?: string;
}

export function addDoctor(program: Command): void {
  const command = program
    .command('doctor')
    .summary('examine a project file: integrity, versions, size')
    .description('Examines a project file: integrity, documents and their hashes, versions, size.');
  addProjectOption(command)
    .option('--json <file>', 'write the report as JSON; - for standard output')
    .addHelpText('after', HELP)
    .action(examine);
}

async function examine({ project: file, json }: DoctorOptions): Promise<void> {
  await checkOutputs({ '--json': json }, [file]);
  const report = await withProject(file, 'read', (project) => project.doctor());
  await writeOutput(json, () => jsonText({ format: 'quietboard-doctor', version: 1, ...report }));
  if (json !== STDOUT) process.stdout.write(`${reportLines(report, outputWidth()).join('\n')}\n`);
  process.exitCode = report.isFine ? EXIT_DONE : EXIT_SHORT;
}

/** Tables by what is in them, one and many. */
const CONTENTS: ReadonlyMap<string, readonly [one: string, many: string]> = new Map([
  ['run', ['run', 'runs']],
  ['layout', ['layout', 'layouts']],
  ['sources', ['set of sources', 'sets of sources']],
  ['samples', ['measured waveform', 'measured waveforms']],
  ['settings', ['set-up', 'set-ups']],
  ['result', ['result', 'results']],
  ['measurement', ['measurement', 'measurements']],
  ['draft', ['draft', 'drafts']],
]);

function contentsText(counts: DoctorReport['counts']): string {
  const parts = [...CONTENTS].flatMap(([table, [one, many]]) =>
    counts[table] ? [countText(counts[table], one, many)] : [],
  );
  return parts.length === 0 ? 'no runs yet' : parts.join(', ');
}

const megabytes = (bytes: number): string => `${(bytes / 1e6).toFixed(2)} MB`;

function reportLines(report: DoctorReport, width: number): string[] {
  const facts: [term: string, text: string][] = [
    ['File', report.file],
    ['Size', `${megabytes(report.sizeBytes)}, of which ${megabytes(report.freeBytes)} free`],
    ['Holds', contentsText(report.counts)],
    ['Tables', `version ${report.schemaVersion}, SQLite ${report.sqliteVersion}`],
    ['Made by', `version ${report.createdBy}, last written by version ${report.writtenBy}`],
  ];
  const findings = report.findings.map(({ isFine, message }) => [isFine ? 'fine' : 'AMISS', message] as const);
  return [
    ...facts.flatMap((fact) => hanging(fact, width)),
    '',
    ...findings.flatMap((finding) => hanging(finding, width)),
    '',
    report.isFine ? 'Nothing is amiss.' : 'Something is amiss: restore a backup, or export what can still be read.',
  ];
}

const TERM_WIDTH = 9;

const hanging = ([term, text]: readonly [string, string], width: number): string[] =>
  wrapText(visibleText(text), width, padEnd(term, TERM_WIDTH), ' '.repeat(TERM_WIDTH));
