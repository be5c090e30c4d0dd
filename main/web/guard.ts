import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';
import type { IncomingMessage } from 'node:http';

/** Why a request is turned away. */
export interface Refusal {
  readonly status: number;
  readonly message: string;
}

/** 256 bits. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/**
 * Another site's page may reach this address through the user's browser, by name or by number, but its requests state
 * where they go and come from. Every request must name this very address.
 */
export function refusePlace(request: IncomingMessage, address: string): Refusal | null {
  const { host, origin } = request.headers;
  if (host !== address) return { status: 403, message: 'this host answers to its own address only' };
  if (origin !== undefined && origin !== `http://${address}`) {
    return { status: 403, message: 'this host answers to its own pages only' };
  }
  return null;
}

/** Calls and events are for those who know the token. */
export function refuseCaller(request: IncomingMessage, token: string): Refusal | null {
  const site = request.headers['sec-fetch-site'];
  if (site !== undefined && site !== 'same-origin') {
    return { status: 403, message: 'this host answers to its own pages only' };
  }
  const given = /^Bearer (.+)$/.exec(request.headers.authorization ?? '')?.[1] ?? '';
  if (isSame(given, token)) return null;
  return { status: 401, message: 'the token is missing or wrong: open the address that the program printed' };
}

/** In a time that says nothing about where they differ. */
function isSame(a: string, b: string): boolean {
  const digest = (text: string) => createHash('sha256').update(text).digest();
  return timingSafeEqual(digest(a), digest(b));
}
