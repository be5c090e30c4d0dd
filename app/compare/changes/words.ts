import { quantityText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';

/** Pieces of sentences: "rise time 1 → 3 ns". */

/** Relative difference below which two numbers of a file are the same: rounding of a conversion, never a choice. */
const SAME_NUMBER = 1e-9;

export function sameNumber(one: number | undefined, other: number | undefined): boolean {
  if (one === undefined || other === undefined) return one === other;
  return Math.abs(one - other) <= SAME_NUMBER * Math.max(Math.abs(one), Math.abs(other));
}

export type Words = string | undefined;

/** "1 → 3 ns": the unit once where both sides have it. */
export function fromTo(before: string, after: string): string {
  const unit = after.slice(after.lastIndexOf(' '));
  const hasUnit = unit.startsWith(' ') && before.endsWith(unit) && before.indexOf(' ') === before.length - unit.length;
  return `${hasUnit ? before.slice(0, -unit.length) : before} → ${after}`;
}

/** Four digits, or as many as it takes to tell both apart. */
function tellApart(text: (value: number, digits: number) => string, one: number, other: number): [string, string] {
  for (let digits = 4; digits < 15; digits++) {
    const texts: [string, string] = [text(one, digits), text(other, digits)];
    if (texts[0] !== texts[1]) return texts;
  }
  return [String(one), String(other)];
}

const signed = (text: string): string => text.replace('-', '−');

export const numberText = (value: number, digits = 4): string => signed(String(Number(value.toPrecision(digits))));

/** A quantity in the file's unit; `none` stands for an absent value. Empty when nothing changed. */
export function numberChange(
  what: string,
  before: number | undefined,
  after: number | undefined,
  unit: string,
  none = 'none',
): Words {
  if (sameNumber(before, after)) return undefined;
  const tail = unit === '' ? '' : ` ${unit}`;
  if (before === undefined || after === undefined) {
    const side = (value: number | undefined) => (value === undefined ? none : `${numberText(value)}${tail}`);
    return `${what} ${side(before)} → ${side(after)}`;
  }
  const [one, other] = tellApart((value, digits) => numberText(value, digits), before, after);
  return `${what} ${one} → ${other}${tail}`;
}

/** An impedance with its SI prefix: "900 Ω → 1.2 kΩ". */
export function ohmChange(what: string, before: number | undefined, after: number | undefined, none = 'none'): Words {
  if (sameNumber(before, after)) return undefined;
  const text = (value: number | undefined) => (value === undefined ? none : quantityText(value, 'Ω'));
  const [one, other] = [text(before), text(after)];
  return one === other ? numberChange(what, before, after, 'Ω', none) : `${what} ${fromTo(one, other)}`;
}

/** A choice or a name. */
export function wordChange(what: string, before: string | undefined, after: string | undefined, none = 'none'): Words {
  if (before === after) return undefined;
  const text = (value: string | undefined) => (value === undefined ? none : shortName(value));
  return `${what} ${text(before)} → ${text(after)}`;
}

/** What there is to say, in one piece; undefined when there is nothing. */
export function joined(parts: readonly Words[], between = '; '): Words {
  const said = parts.filter((part) => part !== undefined);
  return said.length === 0 ? undefined : said.join(between);
}

/** "A, B and C"; names after the third are counted. */
export function namesText(names: readonly string[]): string {
  const shown = names.slice(0, 3).map((name) => shortName(name));
  const more = names.length - shown.length;
  if (more > 0) return `${shown.join(', ')} and ${more} more`;
  return shown.length < 2 ? (shown[0] ?? '') : `${shown.slice(0, -1).join(', ')} and ${shown.at(-1)}`;
}

/** A place on the board as the file has it: "(40, 20) mm". */
export const placeMmText = ([xMm, yMm]: readonly [number, number] | readonly [number, number, number]): string =>
  `(${numberText(Math.round(xMm * 1e3) / 1e3, 7)}, ${numberText(Math.round(yMm * 1e3) / 1e3, 7)}) mm`;

/** A length to 0.1 mm, short ones to the micrometre. */
export const lengthMmText = (lengthMm: number): string =>
  numberText(lengthMm >= 1 ? Math.round(lengthMm * 10) / 10 : Math.round(lengthMm * 1e3) / 1e3, 7);
