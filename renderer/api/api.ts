import type { EventName, EventOf } from '../../app/contract/events.ts';
import type { Input, Output, ProcedureName } from '../../app/contract/procedures.ts';
import type { Transport } from '../../app/contract/transport.ts';
import { AppError } from '../../app/errors.ts';

/** The window's one way to its host. `connect` once at the start; everything else calls `call` and `on`. */

let current: Transport | null = null;

export function connect(transport: Transport): void {
  current = transport;
}

function host(): Transport {
  if (current === null) throw new AppError('internal', 'the window is not connected to its host yet');
  return current;
}

/** Calls a procedure of the host. Throws `AppError` with the host's words. */
export async function call<N extends ProcedureName>(name: N, input: Input<N>): Promise<Output<N>> {
  const reply = await host().call(name, input);
  if (reply.ok) return reply.value as Output<N>;
  const { code, message, path } = reply.error;
  throw new AppError(code, message, path);
}

/** Listens to an event of the host; the returned function ends it. */
export const on = <N extends EventName>(name: N, listener: (event: EventOf<N>) => void): (() => void) =>
  host().on(name, (payload) => listener(payload as EventOf<N>));
