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

/**
 * What a host offers the window, and all of it.
 *
 * *Electron*: the preload script puts a `Transport` at `window.quietboard`; without it, the page was served over HTTP.
 *
 * *HTTP* (loopback host): the page's address ends in `#TOKEN`; every call carries `Authorization: Bearer TOKEN`.
 *
 * - `POST /rpc/<name>`: the input as `application/json`, or, where it has a `bytes` key, as `FRAMED_TYPE` (see
 *   `framing.ts`) with the input without `bytes` as the JSON part. The answer is a `Reply` as JSON (with white space
 *   before it when it took long), or `FRAMED_TYPE` with the `Reply`, without `value.bytes`, as the JSON part. Every answer to
 *   this path is a `Reply`, whatever its status; the status is 200 once the procedure was reached. When the caller
 *   goes away, the job it waited for is stopped.
 * - `GET /events`: `text/event-stream`, read by `fetch` because it carries the header: `event:` is the name, `data:` the
 *   payload as JSON on one line; comments keep it alive. A window that was cut off connects again and loads anew what
 *   it shows. A status other than 200 comes with a `Reply` in words.
 */
export interface Transport {
  call(name: ProcedureName, input: unknown): Promise<Reply>;
  /** Calls back for every event of the name; the returned function ends it. */
  on(name: EventName, listener: (payload: unknown) => void): () => void;
}
