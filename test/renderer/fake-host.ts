import type { Input, Output, ProcedureName } from '../../app/contract/procedures.ts';
import type { Reply } from '../../app/contract/transport.ts';
import { AppError } from '../../app/errors.ts';
import { connect } from '../../renderer/api/api.ts';

type Answers = { [N in ProcedureName]?: (input: Input<N>) => Output<N> | Promise<Output<N>> };

/** A host made of the answers a test gives; it keeps every call. */
export class FakeHost {
  readonly calls: { readonly name: ProcedureName; readonly input: unknown }[] = [];
  #answers: Answers;

  constructor(answers: Answers) {
    this.#answers = answers;
    connect({ call: (name, input) => this.#call(name, input), on: () => () => {} });
  }

  answer(more: Answers): void {
    this.#answers = { ...this.#answers, ...more };
  }

  /** Inputs of all calls of one procedure. */
  inputs<N extends ProcedureName>(name: N): Input<N>[] {
    return this.calls.filter((call) => call.name === name).map(({ input }) => input as Input<N>);
  }

  async #call(name: ProcedureName, input: unknown): Promise<Reply> {
    this.calls.push({ name, input });
    try {
      const answer = this.#answers[name] as ((input: unknown) => unknown) | undefined;
      if (answer === undefined) throw new AppError('internal', `the test gives no answer to ${name}`);
      return { ok: true, value: await answer(input) };
    } catch (error) {
      if (!(error instanceof AppError)) throw error;
      const { code, message, path } = error;
      return { ok: false, error: { code, message, ...(path !== undefined && { path }) } };
    }
  }
}

/** A promise that is settled from outside. */
export function later<T>(): { promise: Promise<T>; resolve: (value: T) => void; reject: (error: unknown) => void } {
  let resolve!: (value: T) => void;
  let reject!: (error: unknown) => void;
  const promise = new Promise<T>((accept, refuse) => {
    resolve = accept;
    reject = refuse;
  });
  return { promise, resolve, reject };
}
