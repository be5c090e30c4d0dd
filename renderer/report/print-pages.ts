import type { PDFDocumentProxy } from 'pdfjs-dist';
import { drawPage } from './open-pages.ts';
import css from './report.module.css';

/** Fine enough for hairlines and small print. */
const PRINT_DPI = 200;
const POINTS_PER_INCH = 72;

/** Prints the pages as they are, one to a sheet, and nothing else of the window. */
export async function printPages(pages: PDFDocumentProxy): Promise<void> {
  const sheets = document.createElement('div');
  sheets.className = css.sheets!;
  try {
    for (let number = 1; number <= pages.numPages; number++) {
      const canvas = document.createElement('canvas');
      const { width } = (await pages.getPage(number)).getViewport({ scale: 1 });
      await drawPage(pages, number, canvas, Math.round((width / POINTS_PER_INCH) * PRINT_DPI));
      sheets.append(canvas);
    }
    document.body.append(sheets);
    document.documentElement.dataset.printing = 'pages';
    print();
  } finally {
    delete document.documentElement.dataset.printing;
    sheets.remove();
  }
}
