import { GlobalWorkerOptions, getDocument, type PDFDocumentProxy } from 'pdfjs-dist';

GlobalWorkerOptions.workerPort = new Worker(new URL('pdfjs-dist/build/pdf.worker.min.mjs', import.meta.url), {
  type: 'module',
});

/** The pages of a PDF, ready to be drawn. The bytes are used up. */
export const openPages = (bytes: Uint8Array): Promise<PDFDocumentProxy> =>
  getDocument({ data: bytes, isEvalSupported: false, useWasm: false }).promise;

/** Draws one page (from 1) on a canvas, so many device pixels wide. */
export async function drawPage(
  pages: PDFDocumentProxy,
  number: number,
  canvas: HTMLCanvasElement,
  widthPx: number,
): Promise<void> {
  const page = await pages.getPage(number);
  const natural = page.getViewport({ scale: 1 });
  const viewport = page.getViewport({ scale: widthPx / natural.width });
  // Drawn aside and shown at once: a page never stands half drawn, and two drawings never share a canvas.
  const aside = document.createElement('canvas');
  aside.width = Math.round(viewport.width);
  aside.height = Math.round(viewport.height);
  await page.render({ canvas: aside, viewport }).promise;
  canvas.width = aside.width;
  canvas.height = aside.height;
  canvas.getContext('2d')!.drawImage(aside, 0, 0);
}

/** What a page says, for readers who cannot see it. */
export async function pageText(pages: PDFDocumentProxy, number: number): Promise<string> {
  const page = await pages.getPage(number);
  const { items } = await page.getTextContent();
  return items.map((item) => ('str' in item ? item.str + (item.hasEOL ? '\n' : '') : '')).join(' ');
}
