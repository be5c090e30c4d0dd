import type { ErrorCode } from '../errors.ts';
import type { EventName } from './events.ts';
import type { ProcedureName } from './procedures.ts';

/** Every answer of a host: a value, or a failure in words. There is no second way for errors. */
export type Reply =
  | { readonly ok: true; readonly value: unknown }
  | {
      readonly ok: false;
      readonly error: { readonly code: ErrorCode; readonly message: string; readonly path?: string };
    };

/** What a host offers the window, and all of it. */
export interface Transport {
  call(name: ProcedureName, input: unknown): Promise<Reply>;
  /** Calls back for every event of the name; the returned function ends it. */
  on(name: EventName, listener: (payload: unknown) => void): () => void;
}
