import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { safeTerminalText, terminalWidth, visibleText } from '../../app/report/safe-text.ts';

/** Code points that ECMA-48 and the Unicode bidi and zero-width lists forbid in a line of output, spelled out by hand. */
const DANGEROUS =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
  /[\u0000-\u001f\u007f-\u009f\u00ad\u061c\u200b-\u200f\u2028-\u202e\u2060-\u2064\u2066-\u206f\ufeff\u{e0001}-\u{e007f}]/u;

describe('visibleText', () => {
  it('writes out control, escape and bidirectional characters', () => {
    expect(visibleText('a\x1b[31mred\x07')).toBe('a\\x1b[31mred\\x07');
    expect(visibleText('x\u202egnp.exe')).toBe('x\\u{202e}gnp.exe');
    expect(visibleText('one\ntwo\r\tthree')).toBe('one\\ntwo\\r\\tthree');
    expect(visibleText('\u009b2J')).toBe('\\x9b2J');
    expect(visibleText('\ud800')).toBe('\\u{d800}');
  });

  it('leaves letters of any script, units and one or two accents alone', () => {
    for (const name of ['CLK_25M', '電源', 'µ-Ω', 'Größe', 'n\u0303\u0301', 'שלום'])
      expect(visibleText(name)).toBe(name);
  });

  it('writes out the third of stacked accents and all after it', () => {
    expect(visibleText('a\u0301\u0302\u0303\u0304b')).toBe('a\u0301\u0302\\u{303}\\u{304}b');
  });

  it('is the same when applied twice', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        expect(visibleText(visibleText(text))).toBe(visibleText(text));
      }),
      { seed: 71 },
    );
  });
});

describe('safeTerminalText', () => {
  it('counts wide characters as two columns and accents as none', () => {
    // Unicode Standard Annex 11, East Asian Width: CJK ideographs, Hangul, fullwidth forms and emoji are wide.
    expect(terminalWidth('電源')).toBe(4);
    expect(terminalWidth('한글')).toBe(4);
    expect(terminalWidth('Ａ')).toBe(2);
    expect(terminalWidth('🚀')).toBe(2);
    expect(terminalWidth('e\u0301')).toBe(1);
    expect(terminalWidth('dBµV/m Ω')).toBe(8);
  });

  it('keeps what fits and drops the middle of what does not', () => {
    expect(safeTerminalText('DATA0', 5)).toBe('DATA0');
    expect(safeTerminalText('MEMORY_BUS_DATA_17', 10)).toBe('MEMORY…_17');
    expect(safeTerminalText('電源電源電源', 5)).toBe('電…源');
    expect(safeTerminalText('', 5)).toBe('');
    expect(safeTerminalText('abc', 0)).toBe('');
    expect(safeTerminalText('abc', 1)).toBe('…');
  });

  it('never exceeds its width, never lets a dangerous character through, whatever the name', () => {
    const nasty = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 200 }),
      fc.string({
        unit: fc.constantFrom('\x1b', '\u202e', '\u0301', '電', 'a', '\u{e0041}', '🚀', '\r'),
        maxLength: 300,
      }),
    );
    fc.assert(
      fc.property(nasty, fc.integer({ min: 0, max: 60 }), (name, width) => {
        const text = safeTerminalText(name, width);
        expect(terminalWidth(text)).toBeLessThanOrEqual(width);
        expect(DANGEROUS.test(text)).toBe(false);
      }),
      { seed: 72, numRuns: 400 },
    );
  });

  it('shows the whole name when the escaped name fits', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme-ascii', maxLength: 20 }), (name) => {
        expect(safeTerminalText(name, 20)).toBe(name);
      }),
      { seed: 73 },
    );
  });

  it('cuts ten thousand characters at once', () => {
    expect(safeTerminalText(`${'\x1b'.repeat(5_000)}${'z'.repeat(5_000)}`, 12)).toBe('\\x1b\\x1…zzzz');
  });
});
