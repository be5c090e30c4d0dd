import type { Command } from 'commander';
import { addProjectOption, type ProjectOption, runNumber, withProject } from '../../project-file.ts';

export function addDelete(program: Command): void {
  const command = program
    .command('delete')
    .summary('take runs out of a project')
    .description('Takes runs out of a project for good. Their numbers are not given again.')
    .argument('<runs...>', 'numbers of the runs');
  addProjectOption(command)
    .addHelpText('after', '\nExample:\n  quietboard delete --project valve.quietboard 3 4\n')
    .action(deleteRuns);
}

async function deleteRuns(texts: readonly string[], { project: file }: ProjectOption): Promise<void> {
  const runs = [...new Set(texts.map(runNumber))];
  await withProject(file, 'write', (project) => {
    for (const run of runs) project.run(run);
    for (const run of runs) project.deleteRun(run);
  });
  process.stdout.write(`${runs.length === 1 ? 'Run' : 'Runs'} ${runs.map((run) => `#${run}`).join(', ')} deleted.\n`);
}
