import { realpath } from 'node:fs/promises';
import { resolve } from 'node:path';
import { AppError } from '../../app/errors.ts';
import { requireWritable, writeBytes, writeText } from '../files/write-text.ts';

/** A file to write, or `-` for standard output. */
export const STDOUT = '-';

/** Where the output options send things; `-` is for JSON only. */
export type OutputFiles = Readonly<Record<string, string | undefined>>;

/**
 * Checks every output file before anything is computed: it can be written, is no input of this run and not named twice.
 * Throws `input` or `file`.
 */
export async function checkOutputs(outputs: OutputFiles, inputs: readonly (string | undefined)[]): Promise<void> {
  const usedBy = new Map<string, string>();
  for (const input of inputs) if (input !== undefined) usedBy.set(await realOf(input), 'an input file of this run');
  for (const [option, file] of Object.entries(outputs)) {
    if (file === undefined) continue;
    if (file === STDOUT) {
      if (option === '--json') continue;
      throw new AppError('input', `${option} must be a file; received "-" (only --json writes to standard output)`);
    }
    if (file === '') throw new AppError('input', `${option} must be the name of a file; received nothing`);
    await requireWritable(file);
    const real = await realOf(file);
    const user = usedBy.get(real);
    if (user !== undefined && !real.startsWith('/dev/')) {
      throw new AppError('input', `${option} must be another file; received ${file}, which is ${user}`);
    }
    usedBy.set(real, `already the file of ${option}`);
  }
}

const realOf = (file: string): Promise<string> => realpath(file).catch(() => resolve(file));

/** Writes one output, when it was asked for. */
export async function writeOutput(file: string | undefined, makeText: () => string): Promise<void> {
  if (file === undefined) return;
  if (file === STDOUT) process.stdout.write(makeText());
  else await writeText(file, makeText());
}

/** The same for a file of bytes. */
export const writeBytesOutput = (file: string, bytes: Uint8Array): Promise<void> => writeBytes(file, bytes);

/** Columns to fill: the terminal's, or 80. */
export const outputWidth = (): number => (process.stdout.isTTY ? (process.stdout.columns ?? 80) : 80);
