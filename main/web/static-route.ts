import { readFile } from 'node:fs/promises';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { StaticFiles } from './static-files.ts';

/** The window's own files; no token, as they are the same for everybody. */
export async function answerFile(
  files: StaticFiles,
  address: string,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    return sendText(response, 405, 'Only GET and HEAD.', { Allow: 'GET, HEAD' });
  }
  const file = files.find(address);
  if (file === undefined) return sendText(response, 404, 'There is no such file here.');
  const content = await readFile(file.path).catch(() => null);
  if (content === null) return sendText(response, 404, 'There is no such file here.');
  response.writeHead(200, {
    'Content-Type': file.mediaType,
    'Content-Length': content.length,
    'Cache-Control': file.cacheControl,
  });
  response.end(request.method === 'HEAD' ? undefined : content);
}

export function sendText(
  response: ServerResponse,
  status: number,
  text: string,
  headers: Readonly<Record<string, string>> = {},
): void {
  response.writeHead(status, { ...headers, 'Content-Type': 'text/plain; charset=utf-8', 'Cache-Control': 'no-store' });
  response.end(`${text}\n`);
}
