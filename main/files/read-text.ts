import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { open } from 'node:fs/promises';
import { extname } from 'node:path';
import { AppError, fileError } from '../../app/errors.ts';
import { findJsonFault } from '../../app/schema/json-position.ts';
import { fileFailure } from './file-failure.ts';

/** Largest JSON file read, bytes: the engine's longest text is about 500 MB. */
const MAX_JSON_BYTES = 200e6;

/** All bytes of a regular file of at most `maxBytes`. Throws `file`. */
export async function readBytes(file: string, maxBytes: number): Promise<Buffer> {
  try {
    const handle = await open(file, 'r');
    try {
      const stats = await handle.stat();
      if (stats.isFile() && stats.size > maxBytes) throw tooLarge(file, stats.size, maxBytes);
      const bytes = await handle.readFile();
      if (bytes.length > maxBytes) throw tooLarge(file, bytes.length, maxBytes);
      return bytes;
    } finally {
      await handle.close();
    }
  } catch (error) {
    throw error instanceof AppError ? error : fileFailure(file, 'read', error);
  }
}

const tooLarge = (file: string, size: number, maxBytes: number) =>
  fileError(file, `must be at most ${maxBytes / 1e6} MB; received ${(size / 1e6).toFixed(1)} MB`);

/** UTF-8 text without its byte order mark. Throws `file` when the bytes are no UTF-8. */
export function decodeText(file: string, bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch (error) {
    throw fileError(file, 'must be UTF-8 text; received bytes that are not', { cause: error });
  }
}

/** Parsed JSON. Throws `file` with line and column. */
function parseJsonText(file: string, text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    const fault = findJsonFault(text);
    if (fault === null) throw fileError(file, `cannot be read: ${(error as Error).message}`, { cause: error });
    const found = text.trim() === '' ? 'an empty file' : `${JSON.stringify(lineAt(text, fault.line, fault.column))}`;
    throw fileError(file, `line ${fault.line}, column ${fault.column} must be ${fault.expected}; received ${found}`);
  }
}

/** The rest of a line from a column on, cut. */
function lineAt(text: string, line: number, column: number): string {
  const rest = text.split('\n', line)[line - 1]!.slice(column - 1);
  return rest === '' ? '(end of line)' : rest.slice(0, 20);
}

/** JSON of a file and the SHA-256 of its bytes (hexadecimal). Throws `file`. */
export async function readJson(file: string): Promise<{ json: unknown; sha256: string }> {
  const bytes = await readBytes(file, MAX_JSON_BYTES);
  return { json: parseJsonText(file, decodeText(file, bytes)), sha256: sha256Of(bytes) };
}

const sha256Of = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

/** SHA-256 of a file of any size, hexadecimal. Throws `file`. */
export async function sha256OfFile(file: string): Promise<string> {
  const hash = createHash('sha256');
  try {
    for await (const chunk of createReadStream(file)) hash.update(chunk as Buffer);
  } catch (error) {
    throw fileFailure(file, 'read', error);
  }
  return hash.digest('hex');
}

/** Whether a file is meant as JSON: by its name, or because it begins with a brace. Throws `file`. */
export async function isJsonFile(file: string): Promise<boolean> {
  if (extname(file).toLowerCase() === '.json') return true;
  return /^\ufeff?\s*(?:\{|$)/.test((await readBeginning(file)).toString('utf8'));
}

/** The first bytes. Throws `file`. */
export async function readBeginning(file: string): Promise<Buffer> {
  try {
    const handle = await open(file, 'r');
    try {
      const { buffer, bytesRead } = await handle.read(Buffer.alloc(256), 0, 256, 0);
      return buffer.subarray(0, bytesRead);
    } finally {
      await handle.close();
    }
  } catch (error) {
    throw fileFailure(file, 'read', error);
  }
}
