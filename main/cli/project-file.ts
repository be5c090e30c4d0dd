import type { Command } from 'commander';
import { inputError } from '../../app/errors.ts';
import { type OpenOptions, Project } from '../db/project.ts';

export interface ProjectOption {
  readonly project: string;
}

export const addProjectOption = (command: Command): Command =>
  command.requiredOption('--project <file>', 'project file (*.quietboard)');

const OPTIONS: Readonly<Record<'read' | 'write' | 'create', OpenOptions>> = {
  read: { readOnly: true },
  write: {},
  create: { create: true },
};

/** Opens a project for one piece of work and closes it whatever happens; `create` makes it when it is absent. */
export async function withProject<T>(
  file: string,
  access: keyof typeof OPTIONS,
  work: (project: Project) => T | Promise<T>,
): Promise<T> {
  const project = Project.open(file, OPTIONS[access]);
  try {
    return await work(project);
  } finally {
    project.close();
  }
}

/** A run's number as typed: 7 or #7. */
export function runNumber(text: string): number {
  const digits = /^#?(\d{1,9})$/.exec(text.trim())?.[1];
  const run = Number(digits ?? Number.NaN);
  if (!(run >= 1)) throw inputError('RUN', 'the number of a run, for example 7 (see "quietboard runs")', text);
  return run;
}
