import type { Command } from 'commander';
import type { DoctorReport } from '../../../../app/project/project-info.ts';
import { visibleText } from '../../../../app/report/safe-text.ts';
import { wrapText } from '../../../../app/report/wrap.ts';
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

const HEAD_WIDTH = 9;
const megabytes = (bytes: number): string => (bytes / 1e6).toFixed(2);

function reportLines(report: DoctorReport, width: number): string[] {
  const counts = Object.entries(report.counts).map(([what, count]) => `${count} ${what}`);
  const facts: readonly (readonly [string, string])[] = [
    ['file', visibleText(report.file)],
    ['size', `${megabytes(report.sizeBytes)} MB, of which ${megabytes(report.freeBytes)} MB free`],
    ['holds', counts.join(', ')],
    ['tables', `version ${report.schemaVersion}, SQLite ${report.sqliteVersion}`],
    ['made by', `version ${visibleText(report.createdBy)}, last written by ${visibleText(report.writtenBy)}`],
  ];
  const row = (head: string, text: string) => wrapText(text, width, head.padEnd(HEAD_WIDTH), ' '.repeat(HEAD_WIDTH));
  return [
    ...facts.flatMap(([head, text]) => row(head, text)),
    '',
    ...report.findings.flatMap(({ isFine, message }) => row(isFine ? 'fine' : 'AMISS', message)),
    '',
    report.isFine ? 'Nothing is amiss.' : 'Something is amiss: restore a backup, or export what can still be read.',
  ];
}
