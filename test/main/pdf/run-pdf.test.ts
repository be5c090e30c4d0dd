import { describe, expect, it, vi } from 'vitest';
import { roomOn } from '../../../main/pdf/page.ts';
import { runPdf } from '../../../main/pdf/run-pdf.ts';
import { fontRows, itNeedsPoppler, pageTexts, pageWords } from './poppler.ts';
import { crowdedReport, emptyReport, hostileReport, sampleReport } from './reports.ts';

/** Each report is laid out once. */
const once = <Value>(make: () => Promise<Value>): (() => Promise<Value>) => {
  let made: Promise<Value> | undefined;
  return () => {
    made ??= make();
    return made;
  };
};

const pdf = await runPdf(sampleReport());
const letterPdf = once(() => runPdf(sampleReport({ paper: 'Letter' })));
const hostilePdf = once(() => runPdf(hostileReport()));
const crowdedPdf = once(() => runPdf(crowdedReport()));
const source = Buffer.from(pdf).toString('latin1');
const count = (text: string, pattern: RegExp): number => (text.match(pattern) ?? []).length;

describe('PDF of a run', () => {
  it('gives the same bytes for the same input, at any time', async () => {
    vi.useFakeTimers({ toFake: ['Date'], now: new Date('1999-12-31T23:59:59Z') });
    const zone = process.env.TZ;
    process.env.TZ = 'Pacific/Auckland';
    try {
      expect(Buffer.compare(await runPdf(sampleReport()), pdf)).toBe(0);
    } finally {
      vi.useRealTimers();
      if (zone === undefined) delete process.env.TZ;
      else process.env.TZ = zone;
    }
    const other = await runPdf(sampleReport({ title: { ...sampleReport().title, author: 'B. Sample' } }));
    expect(Buffer.compare(other, pdf)).not.toBe(0);
  });

  it('leaves its input as it was', async () => {
    const report = sampleReport();
    const before = structuredClone(report);
    await runPdf(report);
    expect(report).toEqual(before);
  });

  it('is a whole file with its pages on the paper asked for', async () => {
    expect(source.startsWith('%PDF-1.7')).toBe(true);
    expect(source.trimEnd().endsWith('%%EOF')).toBe(true);
    const boxes = (text: string) => new Set([...text.matchAll(/\/MediaBox \[([^\]]*)\]/g)].map(([, box]) => box));
    expect(boxes(source)).toEqual(new Set(['0 0 595.28 841.89']));
    const letter = Buffer.from(await letterPdf()).toString('latin1');
    expect(boxes(letter)).toEqual(new Set(['0 0 612 792']));
    const pages = Number(source.match(/\/Type \/Pages\s+\/Count (\d+)/)![1]);
    expect(pages).toBe(count(source, /\/Type \/Page\b/g));
    expect(pages).toBeGreaterThanOrEqual(8);
    expect(pages).toBeLessThanOrEqual(12);
  });

  it('embeds every font and uses no other', () => {
    const described = count(source, /\/Type \/FontDescriptor\b/g);
    expect(described).toBeGreaterThanOrEqual(3);
    expect(count(source, /\/FontFile2 \d+ 0 R/g)).toBe(described);
    expect(count(source, /\/BaseFont \/[A-Z]{6}\+NotoSans/g)).toBe(count(source, /\/BaseFont /g));
  });

  it('has nothing that runs, links or leaves the file', () => {
    expect(source.search(/\/(URI|JavaScript|JS|Launch|GoToR|SubmitForm|EmbeddedFile|OpenAction|RichMedia)\b/)).toBe(-1);
    expect(source.search(/\/Outlines /)).toBeGreaterThan(0);
    expect(source).toContain('/Lang (en)');
  });

  it('holds boards of two hundred nets and three thousand readings', async () => {
    const crowded = await crowdedPdf();
    expect(crowded.length).toBeLessThan(5e6);
    expect(count(Buffer.from(crowded).toString('latin1'), /\/Type \/Page\b/g)).toBeLessThan(30);
  });
});

describe('PDF read back', () => {
  itNeedsPoppler('has all fonts embedded and text that can be copied', () => {
    const fonts = fontRows(pdf);
    expect(fonts.length).toBeGreaterThanOrEqual(3);
    for (const { name, isEmbedded, hasUnicode } of fonts) {
      expect(name).toContain('NotoSans');
      expect(isEmbedded && hasUnicode).toBe(true);
    }
    const text = pageTexts(pdf).join('\n');
    for (const said of ['dBµV/m', '25 Ω', '−2.3', '±6.3 dB', 'CLK_25M', '375 MHz']) expect(text).toContain(said);
  });

  itNeedsPoppler('has the summary, and all of it, on the first page', () => {
    const [first, second] = pageTexts(pdf);
    for (const title of ['Worst margin in each band', 'Strongest causes', 'Margin over frequency', 'How sure']) {
      expect(first).toContain(title);
    }
    expect(first).toContain('exceeds by 2.3 dB at 125 MHz');
    expect(first).toContain('caveats of');
    expect(second).toContain('Spectrum');
  });

  itNeedsPoppler('says its page and the number of pages on each', () => {
    const pages = pageTexts(pdf);
    for (const [i, text] of pages.entries()) expect(text).toContain(`page ${i + 1} of ${pages.length}`);
  });

  itNeedsPoppler('prints Greek, Cyrillic and µ in tables and on the board', async () => {
    const text = pageTexts(await crowdedPdf()).join('\n');
    for (const name of ['Сигнал_тактовый_0', 'ΔΣ_MOD_', 'µC/RESET_']) {
      expect(text.split(name).length).toBeGreaterThan(3);
    }
  });

  itNeedsPoppler('clips nothing: every word lies within the page, those of the text between its margins', async () => {
    const all: [Uint8Array, 'A4' | 'Letter'][] = [
      [pdf, 'A4'],
      [await letterPdf(), 'Letter'],
      [await hostilePdf(), 'A4'],
      [await crowdedPdf(), 'A4'],
      [await runPdf(emptyReport()), 'A4'],
    ];
    for (const [bytes, paper] of all) {
      const { widthPt, heightPt } = roomOn(paper);
      for (const { text, xMin, xMax, yMin, yMax } of pageWords(bytes).flat()) {
        const place = `${text} at ${xMin}, ${yMin}`;
        // A figure's text may stand a little over the edge of its picture; a quarter of the margin of 42 is for that.
        expect(xMin, place).toBeGreaterThan(42 - 12);
        expect(xMax, place).toBeLessThan(42 + widthPt + 12);
        expect(yMin, place).toBeGreaterThan(16);
        // The foot line stands in the lower margin of 46.
        expect(yMax, place).toBeLessThan(46 + heightPt + 30);
      }
    }
  });

  itNeedsPoppler('leaves no heading alone at the foot of a page', async () => {
    const titles = ['Spectrum', 'What radiates', 'Worst lines', 'Contributors', 'Board', 'Limit', 'Set-up', 'Sources'];
    titles.push('Drives', 'Loads', 'Cables', 'Waveforms', 'Notes', 'Cautions', 'Sign-off', 'Layers, from the top');
    for (const bytes of [pdf, await letterPdf(), await crowdedPdf(), await hostilePdf()]) {
      for (const text of pageTexts(bytes)) {
        const lines = text
          .split('\n')
          .map((line) => line.trim())
          .filter((line) => line !== '');
        expect(titles).not.toContain(lines.at(-2));
      }
    }
  });
});
