import type { ServerResponse } from 'node:http';
import type { EventBus } from '../rpc/event-bus.ts';
import { sendReply } from './answer.ts';

/**
 * A browser keeps at most six connections to one host; every window holds one for its events, so more windows than this
 * would leave none to call with.
 */
const MOST_STREAMS = 4;
const KEEP_ALIVE_MS = 15_000;
/** A window that reads nothing is cut off before its unread events fill the memory; it connects again and loads anew. */
const MAX_UNREAD_BYTES = 64e6;

/** The windows that listen: `GET /events`, one open answer each. */
export class EventStreams {
  readonly #events: EventBus;
  readonly #open = new Set<ServerResponse>();
  /** Called with the number of windows after each change. */
  readonly #onCount: (count: number) => void;

  constructor(events: EventBus, onCount: (count: number) => void) {
    this.#events = events;
    this.#onCount = onCount;
  }

  open(response: ServerResponse): void {
    if (this.#open.size >= MOST_STREAMS) {
      const message = `this program is open in ${MOST_STREAMS} windows already: close one of them`;
      sendReply(response, 503, { ok: false, error: { code: 'busy', message } });
      return;
    }
    response.writeHead(200, { 'Content-Type': 'text/event-stream', 'Cache-Control': 'no-store' });
    const write = (text: string) => {
      if (response.writableLength > MAX_UNREAD_BYTES) response.destroy();
      else response.write(text);
    };
    // Something must be sent for the caller to learn that it listens.
    write(': listening\n\n');
    const end = this.#events.subscribe((name, payload) =>
      write(`event: ${name}\ndata: ${JSON.stringify(payload)}\n\n`),
    );
    const keepAlive = setInterval(() => write(': still here\n\n'), KEEP_ALIVE_MS);
    this.#open.add(response);
    this.#onCount(this.#open.size);
    response.on('close', () => {
      end();
      clearInterval(keepAlive);
      this.#open.delete(response);
      this.#onCount(this.#open.size);
    });
  }

  closeAll(): void {
    for (const response of this.#open) response.end();
  }
}
