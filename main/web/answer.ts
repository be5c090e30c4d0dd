import type { ServerResponse } from 'node:http';
import { JSON_TYPE } from '../../app/contract/framing.ts';
import type { Reply } from '../../app/contract/transport.ts';

/** Sends a reply as JSON; where the answer was begun already, as its rest. */
export function sendReply(response: ServerResponse, status: number, reply: Reply): void {
  const text = JSON.stringify(reply);
  if (!response.headersSent) {
    response.writeHead(status, { 'Content-Type': JSON_TYPE, 'Content-Length': Buffer.byteLength(text) });
  }
  response.end(text);
}

/** A refusal in words, as a reply. */
export const sendRefusal = (response: ServerResponse, status: number, message: string): void =>
  sendReply(response, status, { ok: false, error: { code: 'input', message } });
