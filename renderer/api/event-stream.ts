/** One event of a `text/event-stream`. */
export interface StreamEvent {
  readonly name: string;
  readonly data: string;
}

/**
 * Splits the text of an event stream into events, however its pieces arrive (WHATWG HTML, 9.2.6, as far as our host uses it:
 * `event`, `data`, comments, blank line ends an event).
 */
export class EventStreamParser {
  #rest = '';

  /** Events that are complete with this piece. */
  push(piece: string): StreamEvent[] {
    const blocks = (this.#rest + piece).replaceAll('\r\n', '\n').split('\n\n');
    this.#rest = blocks.pop()!;
    return blocks.flatMap((block) => {
      const data = fieldsOf(block, 'data');
      return data.length === 0 ? [] : [{ name: fieldsOf(block, 'event').at(-1) ?? 'message', data: data.join('\n') }];
    });
  }
}

const fieldsOf = (block: string, field: string): string[] =>
  block
    .split('\n')
    .filter((line) => line.startsWith(`${field}:`))
    .map((line) => line.slice(field.length + 1).replace(/^ /, ''));
