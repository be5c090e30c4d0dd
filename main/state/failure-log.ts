import { appendFileSync, renameSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { makeFolder } from './home.ts';

const MAX_BYTES = 2e6;

/** Unexpected failures, in a file that somebody who reports one can send. */
export class FailureLog {
  readonly file: string;
  #count = 0;

  constructor(folder: string) {
    this.file = join(makeFolder(folder), 'failures.log');
  }

  /** Keeps a failure and returns its number, unique with the time beside it. A log that cannot be written goes to stderr. */
  add(where: string, error: unknown): number {
    this.#count += 1;
    const text = error instanceof Error ? (error.stack ?? error.message) : String(error);
    const entry = `${new Date().toISOString()} failure ${this.#count} in ${where}: ${text}\n`;
    try {
      if ((statSync(this.file, { throwIfNoEntry: false })?.size ?? 0) > MAX_BYTES) {
        renameSync(this.file, `${this.file}.old`);
      }
      appendFileSync(this.file, entry, { mode: 0o600 });
    } catch {
      process.stderr.write(entry);
    }
    return this.#count;
  }
}
