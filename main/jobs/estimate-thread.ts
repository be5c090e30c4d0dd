import { Worker } from 'node:worker_threads';
import { AppError } from '../../app/errors.ts';
import type { UnitLevels } from '../../app/estimate/estimate.ts';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import type { EstimateMessage, EstimateQuestion } from './estimate-messages.ts';
import type { EstimateJob } from './job.ts';

type Progress = (done: number, levels: readonly LineLevel[]) => void;
type Answer = Exclude<EstimateMessage, { kind: 'progress' | 'failed' }>;

/**
 * A board modelled in a thread of its own, which solves units of the work one at a time.
 * The worker is built JavaScript beside this file: Node 20 runs no TypeScript.
 */
export class EstimateThread {
  readonly #worker: Worker;
  #onProgress: Progress = () => {};
  #resolve: (answer: Answer) => void = () => {};
  #reject: (error: unknown) => void = () => {};
  #end: unknown = null;

  constructor(job: EstimateJob) {
    this.#worker = new Worker(new URL('./estimate-worker.js', import.meta.url), { workerData: job });
    this.#worker.on('message', (message: EstimateMessage) => {
      if (message.kind === 'progress') this.#onProgress(message.done, message.levels);
      else if (message.kind === 'failed') this.#reject(new AppError(message.code, message.message, message.path));
      else this.#resolve(message);
    });
    this.#worker.on('error', (error) => this.end(error));
    this.#worker.on('exit', () => this.end(new AppError('internal', "an estimate's thread ended early")));
  }

  /** Lines of every unit of the work, once the board is modelled. Throws `input` when it cannot be. */
  async ready(): Promise<readonly number[]> {
    const answer = await this.#next();
    return answer.kind === 'ready' ? answer.unitLines : outOfTurn();
  }

  async solve(index: number, onProgress: Progress): Promise<UnitLevels> {
    this.#onProgress = onProgress;
    const answer = await this.#ask({ kind: 'unit', index });
    return answer.kind === 'unit' ? answer.levels : outOfTurn();
  }

  async finish(levels: readonly LineLevel[]): Promise<EstimateResult> {
    const answer = await this.#ask({ kind: 'finish', levels });
    return answer.kind === 'result' ? answer.result : outOfTurn();
  }

  /** Ends the thread at once; whoever waits or asks later gets the reason. */
  end(reason: unknown): void {
    this.#end ??= reason;
    this.#reject(this.#end);
    void this.#worker.terminate();
  }

  #ask(question: EstimateQuestion): Promise<Answer> {
    const answer = this.#next();
    this.#worker.postMessage(question);
    return answer;
  }

  #next(): Promise<Answer> {
    if (this.#end !== null) return Promise.reject(this.#end);
    return new Promise((resolve, reject) => {
      this.#resolve = resolve;
      this.#reject = reject;
    });
  }
}

function outOfTurn(): never {
  throw new AppError('internal', "an estimate's thread answered out of turn");
}
