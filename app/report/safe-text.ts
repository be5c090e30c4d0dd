/**
 * Names from a layout file are hostile text: they may carry terminal control sequences, bidirectional overrides that
 * reorder a line, or ten thousand letters. What is shown of them goes through here.
 */

/** Control, format (bidi, zero width, tags), lone surrogates, line and paragraph separators. */
const UNPRINTABLE = /[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/gu;

/** A third combining mark on one letter and all that follow: stacked marks run over the neighbouring lines. */
const STACKED_MARKS = /(?<=\p{M}{2})\p{M}+/gu;

const SHORT_ESCAPES = new Map([
  ['\n', '\\n'],
  ['\r', '\\r'],
  ['\t', '\\t'],
]);

/** The same text with everything that cannot be seen, or that moves its surroundings, written out: `\x1b`, `\u{202e}`. */
export function visibleText(text: string): string {
  return text.replace(UNPRINTABLE, escapeOf).replace(STACKED_MARKS, (marks) => Array.from(marks, escapeOf).join(''));
}

function escapeOf(character: string): string {
  const short = SHORT_ESCAPES.get(character);
  if (short) return short;
  const code = character.codePointAt(0)!;
  return code < 0x100 ? `\\x${code.toString(16).padStart(2, '0')}` : `\\u{${code.toString(16)}}`;
}

/** Ranges whose characters take two columns of a terminal (East Asian wide and fullwidth, emoji), roughly. */
const WIDE =
  /[\u{1100}-\u{115f}\u{2e80}-\u{303e}\u{3041}-\u{a4cf}\u{a960}-\u{a97c}\u{ac00}-\u{d7a3}\u{f900}-\u{faff}\u{fe30}-\u{fe6f}\u{ff00}-\u{ff60}\u{ffe0}-\u{ffe6}\u{1f000}-\u{1faff}\u{20000}-\u{3fffd}\p{Emoji_Presentation}]/u;
const MARK = /\p{M}/u;

/** Columns one character takes in a terminal: 0 (combining mark), 1 or 2; a good guess, terminals differ. */
function characterWidth(character: string): number {
  if (character.codePointAt(0)! < 0x300) return 1;
  if (MARK.test(character)) return 0;
  return WIDE.test(character) ? 2 : 1;
}

/** Columns a text without control characters takes in a terminal. */
export function terminalWidth(text: string): number {
  let width = 0;
  for (const character of text) width += characterWidth(character);
  return width;
}

/**
 * Text from a file made safe for a terminal: unprintable characters written out, cut to `maxWidth` columns.
 * A cut drops the middle and leaves "…": names of a bus differ at their ends.
 */
export function safeTerminalText(text: string, maxWidth: number): string {
  if (maxWidth < 1) return '';
  // Far more than can be shown need not be escaped; no character is left out of a text that would have fitted.
  const reach = 8 * maxWidth + 16;
  const isHuge = text.length > 2 * reach;
  const visible = visibleText(isHuge ? `${text.slice(0, reach)}${text.slice(-reach)}` : text);
  if (!isHuge && terminalWidth(visible) <= maxWidth) return visible;
  const characters = Array.from(visible);
  const head = take(characters, Math.ceil((maxWidth - 1) * 0.6));
  const tail = take(characters.toReversed(), maxWidth - 1 - terminalWidth(head.join(''))).toReversed();
  while (tail.length > 0 && MARK.test(tail[0]!)) tail.shift();
  return `${head.join('')}…${tail.join('')}`;
}

function take(characters: readonly string[], maxWidth: number): string[] {
  const taken: string[] = [];
  let width = 0;
  for (const character of characters) {
    width += characterWidth(character);
    if (width > maxWidth) break;
    taken.push(character);
  }
  return taken;
}
