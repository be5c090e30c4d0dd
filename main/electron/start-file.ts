import { resolve } from 'node:path';
import { PROJECT_ENDING } from '../rpc/new-project-file.ts';

/**
 * The project named on a command line: the last argument that is one, from the folder the command was given in. Under a
 * system's file manager it is the file that was double-clicked.
 */
export function startFileOf(commandLine: readonly string[], folder: string): string | undefined {
  const given = commandLine
    .slice(1)
    .filter((argument) => !argument.startsWith('-') && argument.toLowerCase().endsWith(PROJECT_ENDING))
    .at(-1);
  return given === undefined ? undefined : resolve(folder, given);
}
