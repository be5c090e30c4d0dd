import type { IncomingMessage } from 'node:http';

/** A body over its limit. */
export class TooLarge extends Error {
  override readonly name = 'TooLarge';
  readonly maxBytes: number;

  constructor(maxBytes: number) {
    super(`the body must be at most ${maxBytes / 1e6} MB`);
    this.maxBytes = maxBytes;
  }
}

/** The whole body. Throws `TooLarge` as soon as its stated or its received length passes the limit. */
export async function readBody(request: IncomingMessage, maxBytes: number): Promise<Buffer> {
  if (Number(request.headers['content-length'] ?? 0) > maxBytes) throw new TooLarge(maxBytes);
  const chunks: Buffer[] = [];
  let length = 0;
  for await (const chunk of request.iterator({ destroyOnReturn: false })) {
    length += (chunk as Buffer).length;
    if (length > maxBytes) throw new TooLarge(maxBytes);
    chunks.push(chunk as Buffer);
  }
  return Buffer.concat(chunks);
}
