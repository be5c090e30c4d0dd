import { closeSync, openSync, readSync } from 'node:fs';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from './file-failure.ts';

const CHUNK_BYTES = 1 << 20;

/**
 * Reads a JSON file of any size: entries of the lists at the given places (`runs`, `documents.result`) go one by one to
 * `onItem`; returned is the rest, with those lists empty. Throws `file`, and what `onItem` throws.
 */
export function readJsonLists(
  file: string,
  places: ReadonlySet<string>,
  onItem: (place: string, item: unknown) => void,
): unknown {
  const scanner = new ListScanner(file, places, onItem);
  const decoder = new TextDecoder('utf-8', { fatal: true });
  try {
    const handle = openSync(file, 'r');
    try {
      const chunk = Buffer.alloc(CHUNK_BYTES);
      for (let length = readSync(handle, chunk); length > 0; length = readSync(handle, chunk)) {
        scanner.add(decoder.decode(chunk.subarray(0, length), { stream: true }));
      }
      scanner.add(decoder.decode());
    } finally {
      closeSync(handle);
    }
  } catch (error) {
    if (error instanceof AppError) throw error;
    if (error instanceof TypeError) throw fileError(file, 'must be UTF-8 text; received bytes that are not');
    throw (error as NodeJS.ErrnoException).syscall === undefined ? error : fileFailure(file, 'read', error);
  }
  return scanner.rest();
}

const [QUOTE, BACKSLASH, COMMA, COLON] = [0x22, 0x5c, 0x2c, 0x3a];
const [OPEN_OBJECT, CLOSE_OBJECT, OPEN_LIST, CLOSE_LIST] = [0x7b, 0x7d, 0x5b, 0x5d];

/** Follows strings and brackets only; what lies between is for `JSON.parse`. */
class ListScanner {
  readonly #file: string;
  readonly #places: ReadonlySet<string>;
  readonly #onItem: (place: string, item: unknown) => void;
  /** Places of the open objects and lists outside of entries. */
  readonly #open: string[] = [];
  /** Everything outside of entries. */
  #rest = '';
  /** Text since the last cut: of the entry, or of the rest. */
  #text = '';
  /** The last finished string outside of entries, quoted: a key when a colon follows. */
  #lastString = '';
  #stringFrom = -1;
  #key = '';
  #isEscaped = false;
  /** The list whose entries are read, how many came, and the brackets open in this one. */
  #list: string | undefined;
  #items = 0;
  #depth = 0;

  constructor(file: string, places: ReadonlySet<string>, onItem: (place: string, item: unknown) => void) {
    this.#file = file;
    this.#places = places;
    this.#onItem = onItem;
  }

  add(chunk: string): void {
    const before = this.#text.length;
    this.#text += chunk;
    let from = 0;
    const text = this.#text;
    for (let at = before; at < text.length; at++) {
      const code = text.charCodeAt(at);
      if (this.#stringFrom >= 0) {
        if (this.#isEscaped) this.#isEscaped = false;
        else if (code === BACKSLASH) this.#isEscaped = true;
        else if (code === QUOTE) {
          if (this.#list === undefined) this.#lastString = text.slice(this.#stringFrom, at + 1);
          this.#stringFrom = -1;
        }
      } else if (code === QUOTE) this.#stringFrom = at;
      else if (this.#list === undefined) from = this.#outside(code, text, from, at);
      else from = this.#inside(code, text, from, at);
    }
    this.#text = text.slice(from);
    if (this.#stringFrom >= 0) this.#stringFrom -= from;
  }

  /** Both return where the text not yet cut begins. */
  #outside(code: number, text: string, from: number, at: number): number {
    if (code === COLON) this.#key = JSON.parse(this.#lastString || '""') as string;
    else if (code === OPEN_OBJECT || code === OPEN_LIST) {
      const parent = this.#open.at(-1);
      const place = parent === undefined ? '' : parent === '' ? this.#key : `${parent}.${this.#key}`;
      this.#open.push(place);
      if (code === OPEN_LIST && this.#places.has(place)) {
        this.#list = place;
        this.#items = 0;
        this.#rest += text.slice(from, at + 1);
        return at + 1;
      }
    } else if (code === CLOSE_OBJECT || code === CLOSE_LIST) this.#open.pop();
    return from;
  }

  #inside(code: number, text: string, from: number, at: number): number {
    if (code === OPEN_OBJECT || code === OPEN_LIST) this.#depth++;
    else if (this.#depth > 0) {
      if (code === CLOSE_OBJECT || code === CLOSE_LIST) this.#depth--;
    } else if (code === COMMA || code === CLOSE_LIST) {
      const item = text.slice(from, at);
      const isEmptyList = code === CLOSE_LIST && this.#items === 0 && item.trim() === '';
      if (!isEmptyList) this.#emit(item);
      if (code === COMMA) return at + 1;
      this.#list = undefined;
      this.#open.pop();
      return at;
    }
    return from;
  }

  #emit(text: string): void {
    const item = this.#parse(text, `${this.#list}[${this.#items}]`);
    this.#items++;
    this.#onItem(this.#list!, item);
  }

  rest(): unknown {
    return this.#parse(this.#rest + this.#text, 'the whole');
  }

  #parse(text: string, what: string): unknown {
    try {
      return JSON.parse(text) as unknown;
    } catch (error) {
      throw fileError(this.#file, `must be JSON; ${what} is not: ${(error as Error).message}`, { cause: error });
    }
  }
}
