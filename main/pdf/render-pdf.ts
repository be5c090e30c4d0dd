import pdfmake from 'pdfmake';
import type { TDocumentDefinitions } from 'pdfmake/interfaces.js';
import { FONT_FILES } from './fonts.ts';

const ALLOWED_FILES = new Set(Object.values(FONT_FILES).flatMap(({ normal, bold }) => [normal, bold]));

/** Lays the document out. The same definition gives the same bytes; nothing is fetched, and no file read but the fonts. */
export async function renderPdf(definition: TDocumentDefinitions): Promise<Uint8Array> {
  pdfmake.setFonts(structuredClone(FONT_FILES));
  pdfmake.setUrlAccessPolicy(() => false);
  pdfmake.setLocalAccessPolicy((path) => ALLOWED_FILES.has(path));
  const document = await pdfmake.createPdf(definition).getStream();
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = [];
    document.on('data', (chunk: Buffer) => chunks.push(chunk));
    document.on('end', () => resolve(new Uint8Array(Buffer.concat(chunks))));
    document.on('error', reject);
    document.end();
  });
}
