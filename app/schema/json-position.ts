/** Where a text stops being JSON. */
export interface JsonFault {
  /** 1-based; the column counts UTF-16 units. */
  readonly line: number;
  readonly column: number;
  readonly expected: string;
}

const SPACE = /[ \t\n\r]*/y;
const ESCAPE = /\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4})/y;
const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const WORD = /true|false|null/y;

/**
 * First place where `text` breaks the JSON grammar (RFC 8259), or null when it does not. The engine's own parser often
 * gives no position. Iterative, so no nesting is too deep.
 */
export function findJsonFault(text: string): JsonFault | null {
  const open: ('{' | '[')[] = [];
  let at = 0;
  let expected = 'a value';
  const skip = (pattern: RegExp): boolean => {
    pattern.lastIndex = at;
    const isThere = pattern.test(text);
    if (isThere) at = pattern.lastIndex;
    return isThere;
  };
  const take = (character: string): boolean => {
    if (text[at] !== character) return false;
    at += 1;
    return true;
  };
  /** A text, character by character: a pattern would need a step of its stack for each. Stops where it breaks. */
  const skipString = (): boolean => {
    if (!take('"')) return false;
    for (;;) {
      if (take('"')) return true;
      if (text[at] === '\\') {
        if (!skip(ESCAPE)) return false;
      } else if (at >= text.length || text.charCodeAt(at) < 0x20) {
        return false;
      } else {
        at += 1;
      }
    }
  };
  /** After a key's opening brace or comma: the key and its colon. */
  const key = (): boolean => {
    skip(SPACE);
    expected = 'a key in double quotes';
    if (!skipString()) return false;
    skip(SPACE);
    expected = '":" after the key';
    return take(':');
  };
  const fault = (): JsonFault => {
    const before = text.slice(0, at);
    const lineStart = before.lastIndexOf('\n') + 1;
    return { line: before.split('\n').length, column: at - lineStart + 1, expected };
  };

  for (;;) {
    skip(SPACE);
    expected = 'a value';
    let isClosed = false;
    if (take('{')) {
      open.push('{');
      skip(SPACE);
      isClosed = text[at] === '}';
      if (!isClosed) {
        if (!key()) return fault();
        continue;
      }
    } else if (take('[')) {
      open.push('[');
      skip(SPACE);
      isClosed = text[at] === ']';
      if (!isClosed) continue;
    } else if (text[at] === '"') {
      expected = 'a text that ends with a double quote and has no raw line breaks or unknown escapes';
      if (!skipString()) return fault();
    } else if (!skip(NUMBER) && !skip(WORD)) {
      return fault();
    }
    // A value has ended: close what closes, then go on after a comma.
    for (;;) {
      skip(SPACE);
      const inside = open.at(-1);
      if (inside === undefined) {
        expected = 'the end of the file';
        return at === text.length ? null : fault();
      }
      const closing = inside === '{' ? '}' : ']';
      if (take(closing)) {
        open.pop();
        continue;
      }
      expected = `"," or "${closing}"`;
      if (!take(',')) return fault();
      if (inside === '{' && !key()) return fault();
      break;
    }
  }
}
