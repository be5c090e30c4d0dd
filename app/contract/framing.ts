import { AppError } from '../errors.ts';

/**
 * JSON and bytes in one body, both ways over HTTP: 4 bytes with the length of the JSON (big-endian), the JSON as UTF-8,
 * then the bytes.
 */

export const FRAMED_TYPE = 'application/vnd.quietboard.framed';
export const JSON_TYPE = 'application/json';

const LENGTH_BYTES = 4;

export interface Framed {
  readonly json: unknown;
  readonly bytes: Uint8Array;
}

export function packFramed({ json, bytes }: Framed): Uint8Array<ArrayBuffer> {
  const text = new TextEncoder().encode(JSON.stringify(json));
  const body = new Uint8Array(LENGTH_BYTES + text.length + bytes.length);
  new DataView(body.buffer).setUint32(0, text.length);
  body.set(text, LENGTH_BYTES);
  body.set(bytes, LENGTH_BYTES + text.length);
  return body;
}

/** Inverse of `packFramed`; the bytes are a view of the body. Throws `input` when the body is not of this form. */
export function unpackFramed(body: Uint8Array): Framed {
  const view = new DataView(body.buffer, body.byteOffset, body.byteLength);
  const textEnd = body.length < LENGTH_BYTES ? Number.POSITIVE_INFINITY : LENGTH_BYTES + view.getUint32(0);
  if (textEnd > body.length) throw badBody('a JSON part of the length it states');
  return { json: parseJson(body.subarray(LENGTH_BYTES, textEnd)), bytes: body.subarray(textEnd) };
}

/** JSON of a body in UTF-8. Throws `input`. */
export function parseJson(body: Uint8Array): unknown {
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(body));
  } catch (error) {
    throw badBody('JSON in UTF-8', { cause: error });
  }
}

const badBody = (must: string, options?: ErrorOptions): AppError =>
  new AppError('input', `the body must be ${must}; received something else`, 'body', options);
