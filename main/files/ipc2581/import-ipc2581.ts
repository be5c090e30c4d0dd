import { basename, extname } from 'node:path';
import type { BoardFileInput } from '../../../app/board/board-file.ts';
import type { ImportSummary } from '../../../app/board/import-summary.ts';
import { fileError } from '../../../app/errors.ts';
import { ContentError } from './attributes.ts';
import { buildBoard } from './build/build-board.ts';
import { readDocument } from './read-document.ts';
import type { XmlOptions } from './xml-reader.ts';

/** Board and summary of an IPC-2581 file, revisions A, B and C. Throws AppError `file`; nothing is imported by halves. */
export async function importIpc2581(
  file: string,
  options: XmlOptions = {},
): Promise<{ board: BoardFileInput; summary: ImportSummary }> {
  const { document, xml } = await readDocument(file, options);
  try {
    return buildBoard(document, basename(file, extname(file)), xml.damagedChunks);
  } catch (error) {
    if (error instanceof ContentError) throw fileError(file, error.message, { cause: error });
    throw error;
  }
}
