import { randomUUID } from 'node:crypto';
import { AppError } from '../../app/errors.ts';
import type { LeversThread } from '../jobs/levers-thread.ts';

/** Each may take 1 GB; a window has one. */
const MOST_KEPT = 2;

/** The levers that windows hold, by id. The one not asked for longest gives way to a new one. */
export class KeptLevers {
  /** Least recently asked first. */
  readonly #threads = new Map<string, LeversThread>();

  add(thread: LeversThread): string {
    const id = randomUUID();
    this.#threads.set(id, thread);
    const [oldest] = this.#threads.keys();
    if (this.#threads.size > MOST_KEPT) this.release(oldest!);
    return id;
  }

  /** Throws `input` for what was let go. */
  get(id: string): LeversThread {
    const thread = this.#threads.get(id);
    if (thread === undefined) throw new AppError('input', 'these responses were let go: solve them again', 'leversId');
    this.#threads.delete(id);
    this.#threads.set(id, thread);
    return thread;
  }

  release(id: string): void {
    this.#threads.get(id)?.end();
    this.#threads.delete(id);
  }

  releaseAll(): void {
    for (const id of [...this.#threads.keys()]) this.release(id);
  }
}
