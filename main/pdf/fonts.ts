import { createRequire } from 'node:module';
import { type Font, openSync } from 'fontkit';
import { visibleText } from '../../app/report/safe-text.ts';

/** Fonts of the printed report: embedded, so that a page looks the same everywhere. */

const require = createRequire(import.meta.url);
const fileOf = (name: string): string => require.resolve(`@expo-google-fonts/${name}.ttf`);

export const SANS = 'Sans';
export const MONO = 'Mono';
export type FontName = typeof SANS | typeof MONO;

const SANS_REGULAR = fileOf('noto-sans/400Regular/NotoSans_400Regular');
const SANS_BOLD = fileOf('noto-sans/600SemiBold/NotoSans_600SemiBold');
const MONO_REGULAR = fileOf('noto-sans-mono/400Regular/NotoSansMono_400Regular');
const MONO_BOLD = fileOf('noto-sans-mono/600SemiBold/NotoSansMono_600SemiBold');

export const FONT_FILES = {
  [SANS]: { normal: SANS_REGULAR, bold: SANS_BOLD },
  [MONO]: { normal: MONO_REGULAR, bold: MONO_BOLD },
};

/** Both weights of a family hold the same characters: a test looks at all of them. */
const opened = new Map<string, Font>();

function hasGlyph(file: string, codePoint: number): boolean {
  let font = opened.get(file);
  if (!font) {
    // Neither file is a collection of fonts.
    font = openSync(file) as Font;
    opened.set(file, font);
  }
  return font.hasGlyphForCodePoint(codePoint);
}

export interface FontRun {
  readonly text: string;
  readonly font: FontName;
}

/**
 * Text that prints as it reads, in pieces of one font: invisible characters and those that no embedded font holds are
 * written out (`\u{4e2d}`), never left to an empty box or a font of the reader's machine. Arrows and signs that the text
 * font lacks come from the other one.
 */
export function fontRuns(text: string, font: FontName = SANS): FontRun[] {
  const runs: { text: string; font: FontName }[] = [];
  for (const character of visibleText(text)) {
    const piece = pieceOf(character, font);
    const last = runs.at(-1);
    if (last?.font === piece.font) last.text += piece.text;
    else runs.push(piece);
  }
  return runs;
}

function pieceOf(character: string, font: FontName): { text: string; font: FontName } {
  const codePoint = character.codePointAt(0)!;
  const [own, other] = font === SANS ? [SANS_REGULAR, MONO_REGULAR] : [MONO_REGULAR, SANS_REGULAR];
  if (hasGlyph(own, codePoint)) return { text: character, font };
  if (hasGlyph(other, codePoint)) return { text: character, font: font === SANS ? MONO : SANS };
  return { text: `\\u{${codePoint.toString(16)}}`, font };
}

/** The same as one string, for what has no fonts: titles and bookmarks. */
export const printableText = (text: string): string =>
  fontRuns(text)
    .map((run) => run.text)
    .join('');
