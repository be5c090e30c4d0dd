import { Command } from 'commander';
import { addEstimate } from './commands/estimate.ts';
import { addField } from './commands/field.ts';
import { addImport } from './commands/import.ts';
import { addLimits } from './commands/limits.ts';
import { addNets } from './commands/nets.ts';
import { addCompare } from './commands/project/compare.ts';
import { addCopies } from './commands/project/copies.ts';
import { addDelete } from './commands/project/delete.ts';
import { addDoctor } from './commands/project/doctor.ts';
import { addNote } from './commands/project/note.ts';
import { addRerun } from './commands/project/rerun.ts';
import { addRuns } from './commands/project/runs.ts';
import { addShow } from './commands/project/show.ts';
import { addTrend } from './commands/project/trend.ts';
import { addSchema } from './commands/schema.ts';
import { addServe } from './commands/serve.ts';
import { addValidate } from './commands/validate.ts';
import { programVersion } from './version.ts';

const HELP_WIDTH = 80;

const HELP = `
Start:
  quietboard nets my.board.json         what is on the board
  quietboard estimate my.board.json     levels, limits, margins
  quietboard estimate --help            all options, with examples
  quietboard estimate my.board.json --project my.quietboard --pdf report.pdf
  quietboard trend --project my.quietboard

Exit codes: 0 done, 1 a margin falls short or a check fails, 2 usage or input
error, 3 unexpected failure. Board files and layouts stay on this machine.
`;

/** The command line: commands, options, help. Failures are thrown (`CommanderError` for usage). */
export function buildProgram(): Command {
  const program = new Command('quietboard')
    .description('Estimates the radiated emission of a circuit board from its layout, before the\nlaboratory.')
    .version(programVersion(), '-V, --version', 'print the version')
    .helpOption('-h, --help', 'print this help')
    .helpCommand('help [command]', 'print the help of a command')
    .configureHelp({ helpWidth: HELP_WIDTH })
    .addHelpText('after', HELP)
    .showHelpAfterError('(--help shows what there is)')
    .exitOverride();
  const commands = [addEstimate, addNets, addImport, addLimits, addField, addValidate, addSchema, addServe];
  const ofProjects = [addRuns, addShow, addCompare, addTrend, addRerun, addNote, addDelete, addCopies, addDoctor];
  for (const add of [...commands, ...ofProjects]) add(program);
  return program;
}
