import { Worker } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import type { LeverAnswer } from '../../app/levers/levers.ts';
import type { LeversMessage, LeversQuestion, LeversStart } from './levers-messages.ts';

interface Waiting {
  readonly resolve: (message: LeversMessage) => void;
  readonly reject: (error: unknown) => void;
}

/** A board's kept responses in a thread of their own, to be asked again and again. */
export class LeversThread {
  readonly #worker: Worker;
  /** Callers in the order in which they asked. */
  readonly #waiting: Waiting[] = [];
  #end: unknown = null;

  private constructor(start: LeversStart, onProgress: (done: number, total: number) => void) {
    this.#worker = new Worker(new URL('./levers-worker.js', import.meta.url), { workerData: start });
    this.#worker.on('message', (message: LeversMessage) => {
      if (message.kind === 'progress') onProgress(message.done, message.total);
      else this.#waiting.shift()?.resolve(message);
    });
    this.#worker.on('error', (error) => this.#fail(error));
    this.#worker.on('exit', () => this.#fail(new AppError('cancelled', 'the kept responses were let go')));
  }

  /** Solves and keeps. Throws as `prepareLevers`; `cancelled` when `signal` ends it. */
  static async prepare(
    start: LeversStart,
    onProgress: (done: number, total: number) => void,
    signal: AbortSignal,
  ): Promise<LeversThread> {
    const thread = new LeversThread(start, onProgress);
    const end = () => thread.end();
    signal.addEventListener('abort', end, { once: true });
    try {
      if (signal.aborted) end();
      await thread.#next();
      return thread;
    } catch (error) {
      end();
      throw error;
    } finally {
      signal.removeEventListener('abort', end);
    }
  }

  /** Throws `input` for sources that cannot be estimated; `cancelled` once it was ended. */
  async try(question: LeversQuestion): Promise<LeverAnswer> {
    const answer = this.#next();
    this.#worker.postMessage(question);
    const message = await answer;
    if (message.kind !== 'answer') throw new AppError('internal', 'a levers thread answered out of turn');
    return message.answer;
  }

  end(): void {
    void this.#worker.terminate();
  }

  async #next(): Promise<LeversMessage> {
    if (this.#end !== null) throw this.#end;
    const message = await new Promise<LeversMessage>((resolve, reject) => this.#waiting.push({ resolve, reject }));
    if (message.kind === 'failed') throw new AppError(message.code, message.message, message.path);
    return message;
  }

  #fail(error: unknown): void {
    this.#end ??= error;
    for (const { reject } of this.#waiting.splice(0)) reject(this.#end);
  }
}
