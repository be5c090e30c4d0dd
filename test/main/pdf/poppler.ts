import { spawnSync } from 'node:child_process';
import { it, type TestFunction } from 'vitest';

/** An independent reader of PDF files: poppler's command-line tools, where they are installed. */

const isThere = ['pdftotext', 'pdffonts'].every((tool) => spawnSync(tool, ['-v']).status === 0);
if (!isThere) console.warn('poppler-utils is not installed: tests that read printed reports back are skipped');

export const itNeedsPoppler = (name: string, test: TestFunction): void => {
  it.runIf(isThere)(name, test);
};

function run(tool: string, args: readonly string[], pdf: Uint8Array): string {
  const { status, stdout, stderr } = spawnSync(tool, args, { input: pdf, maxBuffer: 1 << 28, encoding: 'utf8' });
  if (status !== 0) throw new Error(`${tool}: ${stderr}`);
  return stdout;
}

/** Text of every page, in reading order. */
export const pageTexts = (pdf: Uint8Array): string[] =>
  run('pdftotext', ['-layout', '-', '-'], pdf).split('\f').slice(0, -1);

export interface Word {
  readonly text: string;
  readonly xMin: number;
  readonly yMin: number;
  readonly xMax: number;
  readonly yMax: number;
}

/** Words of every page with their boxes, points from the upper left corner. */
export function pageWords(pdf: Uint8Array): Word[][] {
  const pages = run('pdftotext', ['-bbox', '-', '-'], pdf).split('<page ').slice(1);
  const word = /<word xMin="([^"]+)" yMin="([^"]+)" xMax="([^"]+)" yMax="([^"]+)">(.*?)<\/word>/g;
  return pages.map((page) =>
    [...page.matchAll(word)].map(([, xMin, yMin, xMax, yMax, text]) => ({
      text: text!,
      xMin: Number(xMin),
      yMin: Number(yMin),
      xMax: Number(xMax),
      yMax: Number(yMax),
    })),
  );
}

/** Font name, whether it is embedded, whether its characters can be read back. */
export const fontRows = (pdf: Uint8Array): { name: string; isEmbedded: boolean; hasUnicode: boolean }[] =>
  run('pdffonts', ['-'], pdf)
    .trim()
    .split('\n')
    .slice(2)
    .map((row) => {
      const [name] = row.split(/\s+/);
      const [embedded, , unicode] = row.trim().split(/\s+/).slice(-5);
      return { name: name!, isEmbedded: embedded === 'yes', hasUnicode: unicode === 'yes' };
    });
