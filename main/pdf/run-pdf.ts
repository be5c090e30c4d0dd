import { renderPdf } from './render-pdf.ts';
import { type RunReport, runDocument } from './run-document.ts';

/** The printed report of one run as a PDF. The same input gives the same bytes. */
export const runPdf = (report: RunReport): Promise<Uint8Array> => renderPdf(runDocument(report));
