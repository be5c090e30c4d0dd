import { AppError } from '../../app/errors.ts';

/** Runs a step on a file's content; an input error then says which file. */
export function inFile<T>(file: string, step: () => T): T {
  try {
    return step();
  } catch (error) {
    if (!(error instanceof AppError) || error.code !== 'input') throw error;
    const lines = error.message.split('\n');
    const text = lines.length === 1 ? `${file}: ${lines[0]}` : [`${file}:`, ...lines].join('\n  ');
    throw new AppError('input', text, error.path, { cause: error });
  }
}
