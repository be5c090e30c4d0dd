import { type Command, Option } from 'commander';
import { AppError } from '../../app/errors.ts';

/** Options of the contract that a later version brings, and what they need. */
const BRINGS = new Map([['--waveform-at', 'waveforms at a point']]);

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
