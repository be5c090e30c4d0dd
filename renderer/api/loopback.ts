import { FRAMED_TYPE, JSON_TYPE, packFramed, unpackFramed } from '../../app/contract/framing.ts';
import type { Reply, Transport } from '../../app/contract/transport.ts';
import { EventStreamParser } from './event-stream.ts';

/** The host over HTTP, as `app/contract/transport.ts` describes it. */

const TOKEN_KEY = 'quietboard-token';
const RECONNECT_AFTER_MS = 1000;

/** The token of the address, taken out of the address bar and kept for this tab only. */
export function takeToken(): string {
  const fromAddress = location.hash.slice(1);
  if (fromAddress !== '') {
    sessionStorage.setItem(TOKEN_KEY, fromAddress);
    history.replaceState(null, '', location.pathname + location.search);
  }
  return sessionStorage.getItem(TOKEN_KEY) ?? '';
}

const failure = (message: string): Reply => ({ ok: false, error: { code: 'internal', message } });

const UNREACHABLE =
  'The program behind this window does not answer. It may have been closed: start it again and open the address it prints.';

export class LoopbackTransport implements Transport {
  readonly #authorization: string;
  readonly #listeners = new Map<string, Set<(payload: unknown) => void>>();
  readonly #onReconnected: () => void;

  /** `onReconnected` is called when events may have been missed. */
  constructor(token: string, onReconnected: () => void) {
    this.#authorization = `Bearer ${token}`;
    this.#onReconnected = onReconnected;
    void this.#listen();
  }

  async call(name: string, input: unknown): Promise<Reply> {
    const { bytes, ...json } = input as { bytes?: unknown };
    const isFramed = bytes instanceof Uint8Array;
    try {
      const response = await fetch(`/rpc/${name}`, {
        method: 'POST',
        headers: { Authorization: this.#authorization, 'Content-Type': isFramed ? FRAMED_TYPE : JSON_TYPE },
        body: isFramed ? packFramed({ json, bytes }) : JSON.stringify(json),
      });
      return await replyOf(response);
    } catch {
      return failure(UNREACHABLE);
    }
  }

  on(name: string, listener: (payload: unknown) => void): () => void {
    const ofName = this.#listeners.get(name) ?? new Set();
    this.#listeners.set(name, ofName.add(listener));
    return () => ofName.delete(listener);
  }

  async #listen(): Promise<void> {
    for (let isFirst = true; ; isFirst = false) {
      try {
        const response = await fetch('/events', { headers: { Authorization: this.#authorization } });
        // Refused for good: the calls say why.
        if (response.status === 401 || response.status === 403) return;
        if (response.ok && response.body !== null) {
          if (!isFirst) this.#onReconnected();
          await this.#read(response.body);
        }
      } catch {
        // Cut off: the next round tries again.
      }
      await new Promise((resolve) => setTimeout(resolve, RECONNECT_AFTER_MS));
    }
  }

  async #read(body: ReadableStream<Uint8Array<ArrayBuffer>>): Promise<void> {
    const parser = new EventStreamParser();
    const reader = body.pipeThrough(new TextDecoderStream()).getReader();
    for (let part = await reader.read(); !part.done; part = await reader.read()) {
      for (const { name, data } of parser.push(part.value)) {
        const payload: unknown = JSON.parse(data);
        for (const listener of this.#listeners.get(name) ?? []) listener(payload);
      }
    }
  }
}

async function replyOf(response: Response): Promise<Reply> {
  if (!response.headers.get('content-type')?.startsWith(FRAMED_TYPE)) return (await response.json()) as Reply;
  const { json, bytes } = unpackFramed(new Uint8Array(await response.arrayBuffer()));
  const reply = json as Reply;
  return reply.ok ? { ok: true, value: { ...(reply.value as object), bytes } } : reply;
}
