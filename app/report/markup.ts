import { visibleText } from './safe-text.ts';

/** A piece of HTML or SVG that may go into a page as it is. Only `markup` makes one. */
export class Markup {
  readonly source: string;
  constructor(source: string) {
    this.source = source;
  }
}

export type Insert = string | number | Markup | false | undefined | readonly Insert[];

/**
 * Template for HTML and SVG: every inserted string is escaped (for content and for quoted attributes alike, with control
 * and bidirectional characters written out), so text from a file cannot leave its place. `false` and `undefined` insert nothing.
 */
export function markup(parts: TemplateStringsArray, ...inserts: readonly Insert[]): Markup {
  let source = parts[0]!;
  for (let i = 0; i < inserts.length; i++) source += sourceOf(inserts[i]!) + parts[i + 1]!;
  return new Markup(source);
}

function sourceOf(insert: Insert): string {
  if (insert === undefined || insert === false) return '';
  if (insert instanceof Markup) return insert.source;
  if (typeof insert === 'object') return insert.map(sourceOf).join('');
  return typeof insert === 'number' ? String(insert) : escapeMarkup(insert);
}

const ENTITIES = new Map([
  ['&', '&amp;'],
  ['<', '&lt;'],
  ['>', '&gt;'],
  ['"', '&quot;'],
  ["'", '&#39;'],
]);

function escapeMarkup(text: string): string {
  return visibleText(text).replace(/[&<>"']/g, (character) => ENTITIES.get(character)!);
}

/** Longest name shown in full; the JSON result holds the rest. */
const NAME_LENGTH = 64;

/** A name from a file, unprintable characters written out, cut in the middle. Not yet escaped: insert it into `markup`. */
export function shortName(name: string, length = NAME_LENGTH): string {
  const isHuge = name.length > 8 * length;
  const characters = Array.from(visibleText(isHuge ? name.slice(0, 2 * length) + name.slice(-2 * length) : name));
  if (!isHuge && characters.length <= length) return characters.join('');
  const head = Math.ceil((length - 1) * 0.6);
  return `${characters.slice(0, head).join('')}…${characters.slice(head + 1 - length).join('')}`;
}
