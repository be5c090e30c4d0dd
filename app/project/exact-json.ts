import { inputError } from '../errors.ts';

/** Deeper data is no document of ours. */
const MOST_LEVELS = 200;

/**
 * JSON text from which `JSON.parse` gives back the same data bit for bit: like `JSON.stringify`, but −0 stays −0 and what
 * JSON cannot hold is refused, not turned into null. Keys keep their order; keys with `undefined` are left out.
 * Throws `input` for numbers that are not finite, for values that are no data, and for more than 200 levels.
 */
export function exactJson(value: unknown): string {
  return textOf(value, []);
}

/** The same data with the keys of every object in code-unit order. Throws `input` for more than 200 levels. */
export function sortedKeys(value: unknown, level = 0): unknown {
  if (typeof value !== 'object' || value === null) return value;
  if (level >= MOST_LEVELS) throw tooDeep();
  if (Array.isArray(value)) return value.map((item) => sortedKeys(item, level + 1));
  const entries = Object.entries(value).sort(([one], [other]) => (one < other ? -1 : 1));
  // Defined, not assigned: an own key "__proto__" stays one.
  return Object.fromEntries(entries.map(([key, item]) => [key, sortedKeys(item, level + 1)]));
}

/** One text for equal data, whatever the order of keys: what documents are hashed by. Throws as `exactJson` does. */
export const canonicalJson = (value: unknown): string => exactJson(sortedKeys(value));

/** `path`: keys from the whole down to the value; the caller's own list, as it was again on return. */
function textOf(value: unknown, path: (string | number)[]): string {
  switch (typeof value) {
    case 'string':
      return JSON.stringify(value);
    case 'boolean':
      return String(value);
    case 'number':
      if (!Number.isFinite(value)) throw inputError(placeOf(path), 'a finite number', String(value));
      return Object.is(value, -0) ? '-0' : String(value);
    case 'object':
      if (value === null) return 'null';
      if (path.length >= MOST_LEVELS) throw tooDeep();
      return Array.isArray(value) ? listText(value, path) : objectText(value, path);
    default:
      throw inputError(placeOf(path), 'a text, number, true, false, null, list or object', typeof value);
  }
}

function listText(list: readonly unknown[], path: (string | number)[]): string {
  const items = list.map((item, i) => {
    path.push(i);
    const text = textOf(item, path);
    path.pop();
    return text;
  });
  return `[${items.join(',')}]`;
}

function objectText(object: object, path: (string | number)[]): string {
  const members: string[] = [];
  for (const [key, item] of Object.entries(object)) {
    if (item === undefined) continue;
    path.push(key);
    members.push(`${JSON.stringify(key)}:${textOf(item, path)}`);
    path.pop();
  }
  return `{${members.join(',')}}`;
}

const tooDeep = () => inputError('the data', `nested at most ${MOST_LEVELS} levels deep`, 'more');

const placeOf = (path: readonly (string | number)[]): string =>
  path.length === 0
    ? 'the data'
    : path.map((key, i) => (typeof key === 'number' ? `[${key}]` : `${i > 0 ? '.' : ''}${key}`)).join('');
