import type { Command } from 'commander';
import { fileError } from '../../../../app/errors.ts';
import { visibleText } from '../../../../app/report/safe-text.ts';
import { Project } from '../../../db/project.ts';
import { isProjectFile } from '../../../db/project-header.ts';
import { writePieces } from '../../../files/write-text.ts';
import { checkOutputs, STDOUT } from '../../outputs.ts';
import { addProjectOption, type ProjectOption, withProject } from '../../project-file.ts';

const BACKUP_HELP = '\nExample:\n  quietboard backup --project valve.quietboard valve-monday.quietboard\n';
const EXPORT_HELP = '\nExample:\n  quietboard export --project valve.quietboard valve.json\n';
const RESTORE_HELP = `
A project that is there already is kept under another name, which is printed.

Examples:
  quietboard restore valve-monday.quietboard --project valve.quietboard
  quietboard restore valve.json --project valve.quietboard
`;

/** Commands that move a whole project: backup, export, restore. */
export function addCopies(program: Command): void {
  const backup = program
    .command('backup')
    .summary('copy a project while it is in use')
    .description('Copies a whole project into a new file; works while other programs have it open.')
    .argument('<file>', 'the copy; must not exist');
  addProjectOption(backup).addHelpText('after', BACKUP_HELP).action(backUp);
  const exported = program
    .command('export')
    .summary('a whole project as one JSON file')
    .description('Writes everything a project holds as one JSON file; "restore" makes the same project of it.')
    .argument('<file>', 'the JSON file; - for standard output');
  addProjectOption(exported).addHelpText('after', EXPORT_HELP).action(exportTo);
  program
    .command('restore')
    .summary('a project from a backup or an export')
    .description('Makes a project of a backup (*.quietboard) or an export (JSON), after checking it.')
    .argument('<file>', 'the backup or export')
    .requiredOption('--project <file>', 'project file to make')
    .addHelpText('after', RESTORE_HELP)
    .action(restore);
}

async function backUp(copy: string, { project: file }: ProjectOption): Promise<void> {
  await withProject(file, 'read', (project) => project.backupTo(copy));
  process.stdout.write(`${visibleText(copy)} written.\n`);
}

async function exportTo(json: string, { project: file }: ProjectOption): Promise<void> {
  await checkOutputs({ '--json': json }, [file]);
  await withProject(file, 'read', (project) =>
    json === STDOUT
      ? project.exportText((text) => process.stdout.write(text))
      : writePieces(json, (write) => project.exportText(write)),
  );
  if (json !== STDOUT) process.stdout.write(`${visibleText(json)} written.\n`);
}

async function restore(from: string, { project: file }: ProjectOption): Promise<void> {
  const kept = await (isProjectFile(from) ? restoreBackup(from, file) : Project.restoreFile(file, from));
  const runs = await withProject(file, 'read', (project) => project.info().runs);
  const counted = `${runs} ${runs === 1 ? 'run' : 'runs'}`;
  process.stdout.write(`${visibleText(file)} made, with ${counted}.\n`);
  if (kept !== undefined) process.stdout.write(`What was there before is now ${visibleText(kept)}.\n`);
}

/** Only a sound backup may take a project's place. */
const restoreBackup = (from: string, file: string): Promise<string | undefined> =>
  withProject(from, 'read', (project) => {
    const report = project.doctor();
    const amiss = report.findings.find(({ isFine }) => !isFine);
    if (amiss) throw fileError(from, `is damaged and was not restored: ${amiss.message}`);
    return project.backupTo(file, 'keep-copy');
  });
