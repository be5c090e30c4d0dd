import { type Command, Option } from 'commander';
import { AppError } from '../../app/errors.ts';

/** Options of the contract that a later version brings, and what they need. */
const BRINGS = new Map([
  ['--project', 'the project database'],
  ['--pdf', 'reports as PDF'],
  ['--waveform-at', 'waveforms at a point'],
]);
/** The same for commands. */
const LATER_COMMANDS = new Map([
  ['runs', 'the project database'],
  ['compare', 'the project database'],
  ['trend', 'the project database'],
]);

/** Knows the options, so that they are refused with a sentence and not as a typing error. Not in the help. */
export function addLaterOptions(command: Command, names: readonly string[]): void {
  for (const name of names) command.addOption(new Option(`${name} <value>`).hideHelp());
}

/** Throws `input` when one of them is given. */
export function refuseLaterOptions(command: Command, names: readonly string[]): void {
  for (const name of names) {
    const option = command.options.find((candidate) => candidate.long === name)!;
    if (command.getOptionValue(option.attributeName()) === undefined) continue;
    throw new AppError('input', `${name} is not in this version: ${BRINGS.get(name)} comes with a later one`, name);
  }
}

/** Commands of the contract that are not here yet: refused with a sentence, not in the help. */
export function addLaterCommands(program: Command): void {
  for (const [name, what] of LATER_COMMANDS) {
    program
      .command(name, { hidden: true })
      .allowUnknownOption()
      .allowExcessArguments()
      .action(() => {
        throw new AppError('input', `${name} is not in this version: ${what} comes with a later one`, name);
      });
  }
}
