import { type Font, openSync } from 'fontkit';
import { describe, expect, it } from 'vitest';
import { CAUTIONS } from '../../../app/report/cautions.ts';
import { FONT_FILES, fontRuns, MONO, printableText, SANS } from '../../../main/pdf/fonts.ts';
import { HOSTILE_NAMES } from '../../support/hostile-names.ts';

const open = (file: string): Font => openSync(file) as Font;

describe('fonts', () => {
  it('hold the same characters in both weights, so that one look is enough', () => {
    for (const { normal, bold } of Object.values(FONT_FILES)) {
      const [one, other] = [open(normal), open(bold)];
      expect(new Set(one.characterSet)).toEqual(new Set(other.characterSet));
      expect(one.characterSet.length).toBeGreaterThan(3000);
    }
  });

  it('print units, Greek, Cyrillic and accents in one run', () => {
    const text = '12 µV/m −3.1 dB·Ω ±6.3 ° – — … ΔΣ_ΜΟΔ Сигнал_тактовый Ünïcødé ½';
    expect(fontRuns(text)).toEqual([{ text, font: SANS }]);
  });

  it('take arrows and signs from the other font', () => {
    expect(fontRuns('1 → 3 ns')).toEqual([
      { text: '1 ', font: SANS },
      { text: '→', font: MONO },
      { text: ' 3 ns', font: SANS },
    ]);
    expect(fontRuns('≤ 5', MONO)).toEqual([{ text: '≤ 5', font: MONO }]);
  });

  it('write out what no embedded font holds, and what cannot be seen', () => {
    expect(printableText('中文')).toBe('\\u{4e2d}\\u{6587}');
    expect(printableText('😀')).toBe('\\u{1f600}');
    expect(printableText('שלום')).toBe('\\u{5e9}\\u{5dc}\\u{5d5}\\u{5dd}');
    expect(printableText('a\u202eb\x07\n')).toBe('a\\u{202e}b\\x07\\n');
    expect(printableText('\ud800')).toBe('\\u{d800}');
  });

  it('have a glyph for every character that is printed', () => {
    const fonts = new Map([
      [SANS, open(FONT_FILES[SANS].normal)],
      [MONO, open(FONT_FILES[MONO].normal)],
    ]);
    for (const text of [...HOSTILE_NAMES, ...CAUTIONS]) {
      for (const run of fontRuns(text.slice(0, 500))) {
        for (const character of run.text) {
          expect(fonts.get(run.font)!.hasGlyphForCodePoint(character.codePointAt(0)!)).toBe(true);
        }
      }
    }
  });
});
