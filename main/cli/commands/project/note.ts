import type { Command } from 'commander';
import { addProjectOption, type ProjectOption, runNumber, withProject } from '../../project-file.ts';

export function addNote(program: Command): void {
  const command = program
    .command('note')
    .summary('write a note to a run')
    .description('Replaces the note of a run; an empty text takes it away.')
    .argument('<run>', 'number of the run')
    .argument('<text>', 'the note');
  addProjectOption(command)
    .addHelpText('after', '\nExample:\n  quietboard note --project valve.quietboard 7 "after the layout review"\n')
    .action(writeNote);
}

async function writeNote(run: string, text: string, { project: file }: ProjectOption): Promise<void> {
  const number = runNumber(run);
  await withProject(file, 'write', (project) => project.setNote(number, text));
  process.stdout.write(`Note of run #${number} ${text === '' ? 'taken away' : 'written'}.\n`);
}
