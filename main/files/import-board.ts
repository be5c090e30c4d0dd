import { open } from 'node:fs/promises';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import type { ImportSummary } from '../../app/board/import-summary.ts';
import { AppError, fileError } from '../../app/errors.ts';
import { fileFailure } from './file-failure.ts';
import { importIpc2581 } from './ipc2581/import-ipc2581.ts';
import { encodingOf, isArchive, rootElementName } from './sniff.ts';

export interface ImportOptions {
  readonly onProgress?: (readBytes: number, totalBytes: number) => void;
}

const HEAD_BYTES = 64 * 1024;
const ACCEPTED = 'accepted are IPC-2581 files (XML, revisions A, B and C)';

/**
 * Reads a board in an open layout format, told by its content and never by its name. Throws AppError `file` when the
 * file cannot be opened, is of another format, or breaks the format: with the line where there is one.
 */
export async function importBoard(
  file: string,
  options: ImportOptions = {},
): Promise<{ board: BoardFileInput; summary: ImportSummary }> {
  const { head, totalBytes } = await readHead(file);
  if (totalBytes === 0) throw fileError(file, `is empty; ${ACCEPTED}`);
  if (isArchive(head)) throw fileError(file, `is compressed: unpack it first; ${ACCEPTED}`);
  const encoding = encodingOf(head);
  if (encoding === undefined) throw fileError(file, 'states an encoding that this program cannot read');
  const root = rootElementName(new TextDecoder(encoding).decode(head));
  if (root === undefined) throw fileError(file, `is not an XML file; ${ACCEPTED}`);
  if (root !== 'IPC-2581') throw fileError(file, `is an XML file of another kind (${root.slice(0, 40)}); ${ACCEPTED}`);
  const { onProgress } = options;
  return importIpc2581(file, {
    encoding,
    ...(onProgress === undefined ? {} : { onBytes: (readBytes) => onProgress(readBytes, totalBytes) }),
  });
}

/** First bytes and size. */
async function readHead(file: string): Promise<{ head: Buffer; totalBytes: number }> {
  try {
    const handle = await open(file, 'r');
    try {
      const state = await handle.stat();
      if (!state.isFile()) throw fileError(file, 'is a folder or a device, not a file');
      const { buffer, bytesRead } = await handle.read(Buffer.alloc(HEAD_BYTES), 0, HEAD_BYTES, 0);
      return { head: buffer.subarray(0, bytesRead), totalBytes: state.size };
    } finally {
      await handle.close();
    }
  } catch (error) {
    throw error instanceof AppError ? error : fileFailure(file, 'read', error);
  }
}
