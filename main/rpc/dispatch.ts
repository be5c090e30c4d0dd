import type { z } from 'zod';
import { type Handlers, type ProcedureName, procedures } from '../../app/contract/procedures.ts';
import type { Reply } from '../../app/contract/transport.ts';
import { AppError, inputError } from '../../app/errors.ts';
import { parseWith } from '../../app/schema/parse-with.ts';

export type Dispatch = (name: string, input: unknown) => Promise<Reply>;

/**
 * The one way to a handler, for every host: looks the name up, checks what goes in, calls, checks what comes out. Never
 * rejects. `logFailure` keeps an unexpected failure and answers with the number it is found under: its words are for us
 * and may hold anything, so the caller gets only the number.
 */
export function createDispatch(handlers: Handlers, logFailure: (name: string, error: unknown) => number): Dispatch {
  return async (name, input) => {
    try {
      if (!isProcedure(name)) throw inputError('procedure', 'one of the contract', name);
      const received = parseWith(procedures[name].input, input);
      const handler = handlers[name] as (input: unknown) => Promise<unknown>;
      return { ok: true, value: checkedOutput(name, await handler(received)) };
    } catch (error) {
      return refusal(error, (unexpected) => logFailure(isProcedure(name) ? name : 'unknown procedure', unexpected));
    }
  };
}

// Own keys only: "constructor" and the like are no procedures.
const isProcedure = (name: string): name is ProcedureName => Object.hasOwn(procedures, name);

function checkedOutput(name: ProcedureName, value: unknown): unknown {
  const schema: z.ZodType = procedures[name].output;
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw new Error(`the answer of ${name} breaks its contract: ${parsed.error.message}`, { cause: parsed.error });
}

/** A failure as a reply: expected ones in their own words, all others by number. */
export function refusal(error: unknown, logFailure: (error: unknown) => number): Reply & { readonly ok: false } {
  if (error instanceof AppError && error.code !== 'internal') {
    const { code, message, path } = error;
    return { ok: false, error: { code, message, ...(path !== undefined && { path }) } };
  }
  const number = logFailure(error);
  return {
    ok: false,
    error: { code: 'internal', message: `unexpected failure number ${number}; its details are in the failure log` },
  };
}
