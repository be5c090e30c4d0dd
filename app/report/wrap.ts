import { terminalWidth } from './safe-text.ts';

/** Breaks text at spaces into lines of at most `width` columns; a longer word is broken where it must be. */
export function wrapText(text: string, width: number, firstIndent = '', indent = firstIndent): string[] {
  const lines: string[] = [];
  let line = firstIndent;
  let isEmpty = true;
  for (const word of text.split(' ').filter((part) => part !== '')) {
    let rest = word;
    if (!isEmpty && terminalWidth(line) + 1 + terminalWidth(rest) > width) {
      lines.push(line);
      line = indent;
      isEmpty = true;
    }
    while (terminalWidth(line) + (isEmpty ? 0 : 1) + terminalWidth(rest) > width) {
      const [head, tail] = splitAt(rest, width - terminalWidth(line));
      lines.push(line + head);
      line = indent;
      rest = tail;
    }
    line += isEmpty ? rest : ` ${rest}`;
    isEmpty = false;
  }
  if (!isEmpty) lines.push(line);
  return lines;
}

/** The longest head of at most `width` columns, but at least one character. */
function splitAt(word: string, width: number): [head: string, tail: string] {
  let head = '';
  for (const character of word) {
    if (head !== '' && terminalWidth(head + character) > width) break;
    head += character;
  }
  return [head, word.slice(head.length)];
}

/** Fills up with spaces to `width` columns. */
export const padEnd = (text: string, width: number): string =>
  text + ' '.repeat(Math.max(0, width - terminalWidth(text)));
export const padStart = (text: string, width: number): string =>
  ' '.repeat(Math.max(0, width - terminalWidth(text))) + text;
