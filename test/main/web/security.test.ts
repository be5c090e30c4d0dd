import { type IncomingMessage, request } from 'node:http';
import { connect } from 'node:net';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Reply } from '../../../app/contract/transport.ts';
import { TestHost } from '../../support/host.ts';

/** The loopback host against those who are not its window. Oracle: the brief (refused, and with what), RFC 9110 for statuses. */

let host: TestHost;
beforeAll(async () => {
  host = await TestHost.start();
});
afterAll(async () => {
  await host.stop();
});

interface Answer {
  readonly status: number;
  readonly headers: IncomingMessage['headers'];
  readonly text: string;
}

/** A request with headers that `fetch` would not let one set. */
function send(
  method: string,
  path: string,
  headers: Record<string, string> = {},
  body?: string | Uint8Array,
): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const { port } = new URL(host.origin);
    const length = body === undefined ? {} : { 'Content-Length': String(Buffer.byteLength(body)) };
    const outgoing = request(
      { host: '127.0.0.1', port, method, path, headers: { ...length, ...headers } },
      (incoming) => {
        let text = '';
        incoming.setEncoding('utf8').on('data', (piece: string) => (text += piece));
        incoming.on('end', () => resolve({ status: incoming.statusCode!, headers: incoming.headers, text }));
      },
    );
    outgoing.on('error', reject);
    outgoing.end(body);
  });
}

const json = { 'Content-Type': 'application/json' };
const known = () => ({ ...json, Authorization: `Bearer ${host.token}` });
const refusalOf = ({ text }: Answer) => (JSON.parse(text) as Extract<Reply, { ok: false }>).error;

test('the address has a port of 127.0.0.1 and a token of at least 128 bit', () => {
  expect(host.address).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/#[\w-]{22,}$/);
  // 43 digits of base64 are 256 bit.
  expect(Buffer.from(host.token, 'base64url')).toHaveLength(32);
});

test('it listens on the loopback address only', async () => {
  const { port } = new URL(host.origin);
  // Another address of the loopback network reaches programs that listen on all addresses.
  const reached = await new Promise<boolean>((resolve) => {
    const socket = connect(Number(port), '127.0.0.2');
    socket.on('connect', () => resolve(true));
    socket.on('error', () => resolve(false));
  });
  expect(reached).toBe(false);
});

test.each([
  ['none', undefined],
  ['a wrong one', 'Bearer AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA'],
  ['the beginning of the right one', () => `Bearer ${host.token.slice(0, 20)}`],
  ['the right one with more', () => `Bearer ${host.token}x`],
  ['the right one in another scheme', () => `Basic ${host.token}`],
])('token: %s', async (_name, given) => {
  const authorization = typeof given === 'function' ? given() : given;
  const headers = { ...json, ...(authorization !== undefined && { Authorization: authorization }) };
  for (const path of ['/rpc/app.info', '/events']) {
    const answer = await send(path === '/events' ? 'GET' : 'POST', path, headers, '{}');
    expect(answer.status).toBe(401);
    expect(refusalOf(answer).message).toContain('token');
  }
});

test('a token in the address counts for nothing', async () => {
  const answer = await send('POST', `/rpc/app.info?token=${host.token}`, json, '{}');
  expect(answer.status).toBe(401);
});

test.each(['example.com', 'localhost', '127.0.0.1', 'rebound.example:80'])('foreign host %s', async (name) => {
  for (const path of ['/', '/rpc/app.info', '/events']) {
    const answer = await send('POST', path, { ...known(), Host: name }, '{}');
    expect(answer.status).toBe(403);
    expect(answer.text).not.toContain('version');
  }
});

test.each(['https://example.com', 'null', 'http://127.0.0.1:1', 'http://localhost:80'])(
  'foreign origin %s',
  async (origin) => {
    const answer = await send('POST', '/rpc/app.info', { ...known(), Origin: origin }, '{}');
    expect(answer.status).toBe(403);
  },
);

test('a page of another site is refused even without an origin', async () => {
  const answer = await send('POST', '/rpc/app.info', { ...known(), 'Sec-Fetch-Site': 'cross-site' }, '{}');
  expect(answer.status).toBe(403);
});

test('its own origin is let in; no answer allows another one', async () => {
  const answer = await send('POST', '/rpc/app.info', { ...known(), Origin: host.origin }, '{}');
  expect(answer.status).toBe(200);
  expect(Object.keys(answer.headers).filter((name) => name.startsWith('access-control'))).toEqual([]);
  const preflight = await send('OPTIONS', '/rpc/app.info', {
    Origin: 'https://example.com',
    'Access-Control-Request-Method': 'POST',
  });
  expect(preflight.status).toBe(403);
});

test.each([
  '/../package.json',
  '/assets/../../../package.json',
  '/%2e%2e/package.json',
  '/..%2fpackage.json',
  '/%2e%2e%2f%2e%2e%2fpackage.json',
  '/..%5c..%5cpackage.json',
  '/..;/package.json',
  '/%252e%252e%252fpackage.json',
  '/assets%2f..%2f..%2f..%2fpackage.json',
  '//etc/passwd',
  '/etc/passwd',
  '/index.html/../../../package.json',
  '/index.html%00.js',
  '/%',
  '/%ff',
  '/.git/config',
])('a path that leads out: %s', async (path) => {
  const answer = await send('GET', path);
  expect(answer.status).toBe(404);
  expect(answer.text).toBe('There is no such file here.\n');
});

test('an address in absolute form is no way around', async () => {
  const answer = await send('GET', `http://example.com/../../package.json`);
  expect(answer.status).toBe(404);
});

test('the page comes with a policy that lets nothing in from outside', async () => {
  const answer = await send('GET', '/');
  expect(answer.status).toBe(200);
  expect(answer.headers['content-type']).toBe('text/html; charset=utf-8');
  const policy = new Map(
    String(answer.headers['content-security-policy'])
      .split('; ')
      .map((rule) => {
        const [name, ...sources] = rule.split(' ');
        return [name!, sources.join(' ')];
      }),
  );
  expect(policy.get('default-src')).toBe("'none'");
  expect(policy.get('script-src')).toBe("'self'");
  expect(policy.get('style-src')).toBe("'self'");
  expect(policy.get('connect-src')).toBe("'self'");
  expect(policy.get('frame-ancestors')).toBe("'none'");
  expect(policy.get('base-uri')).toBe("'none'");
  expect(answer.headers['content-security-policy']).not.toMatch(/unsafe|\*|https?:/);
  expect(answer.headers['x-content-type-options']).toBe('nosniff');
  expect(answer.headers['referrer-policy']).toBe('no-referrer');
  expect(answer.headers['cache-control']).toBe('no-store');
  // Nothing in the page itself: it would need leave that the policy does not give.
  expect(answer.text).not.toMatch(/<script(?![^>]*\ssrc=)|<style|\sstyle=|\son\w+=/i);
  expect(answer.text).not.toContain(host.token);
});

test.each(['GET', 'PUT', 'DELETE', 'PATCH', 'HEAD'])('a procedure is not called with %s', async (method) => {
  const answer = await send(method, '/rpc/app.info', known());
  expect(answer.status).toBe(405);
  expect(answer.headers.allow).toBe('POST');
});

test.each(['POST', 'PUT', 'DELETE'])('a file is not changed with %s', async (method) => {
  expect((await send(method, '/index.html', known(), 'x')).status).toBe(405);
  expect((await send(method, '/new.html', known(), 'x')).status).toBe(405);
});

test.each(['application/x-www-form-urlencoded', 'text/plain', 'multipart/form-data; boundary=x'])(
  'a body that a form could send (%s) is refused',
  async (type) => {
    const answer = await send('POST', '/rpc/app.info', { ...known(), 'Content-Type': type }, '{}');
    expect(answer.status).toBe(415);
  },
);

test.each(['nothing', '__proto__', 'constructor', 'toString', 'hasOwnProperty', 'app', 'app.info%2f..', '%2e%2e'])(
  'unknown procedure %s',
  async (name) => {
    const answer = await send('POST', `/rpc/${name}`, known(), '{}');
    expect(answer.status).toBe(200);
    expect(refusalOf(answer)).toMatchObject({ code: 'input', path: 'procedure' });
  },
);

test.each([
  ['no JSON', '{'],
  ['nothing', ''],
  ['bytes that are no UTF-8', Buffer.from([0x22, 0xff, 0x22])],
])('a body of %s', async (_name, body) => {
  const answer = await send('POST', '/rpc/app.info', known(), body);
  expect(answer.status).toBe(400);
  expect(refusalOf(answer)).toEqual({
    code: 'input',
    message: 'the body must be JSON in UTF-8; received something else',
    path: 'body',
  });
});

test('keys that reach for prototypes are unknown keys', async () => {
  const answer = await send('POST', '/rpc/app.info', known(), '{"__proto__":{"polluted":1}}');
  expect(answer.status).toBe(200);
  expect(({} as { polluted?: number }).polluted).toBeUndefined();
  const reply = await host.reply('settings.get', { projectId: null, key: '__proto__' });
  expect(reply).toEqual({ ok: true, value: { value: null } });
});

test('a framed body that lies about its length', async () => {
  const type = { ...known(), 'Content-Type': 'application/vnd.quietboard.framed' };
  const long = await send('POST', '/rpc/file.upload', type, Buffer.from([0xff, 0xff, 0xff, 0xff, 0x7b, 0x7d]));
  expect(long.status).toBe(400);
  const short = await send('POST', '/rpc/file.upload', type, Buffer.from([0, 0]));
  expect(short.status).toBe(400);
  const list = await send('POST', '/rpc/file.upload', type, Buffer.from([0, 0, 0, 2, 0x5b, 0x5d]));
  expect(list.status).toBe(400);
});

test('a body that says it is too large is refused before it is sent', async () => {
  const { port } = new URL(host.origin);
  const answer = await new Promise<string>((resolve, reject) => {
    const socket = connect(Number(port), '127.0.0.1');
    socket.write(
      `POST /rpc/app.info HTTP/1.1\r\nHost: 127.0.0.1:${port}\r\nAuthorization: Bearer ${host.token}\r\nContent-Type: application/json\r\nContent-Length: 99000000\r\n\r\n{`,
    );
    let text = '';
    socket.on('data', (piece) => (text += piece.toString()));
    socket.on('close', () => resolve(text));
    socket.on('error', reject);
  });
  expect(answer).toMatch(/^HTTP\/1\.1 413 /);
  expect(answer).toContain('the body must be at most 64 MB');
});

test('a body of unknown length is cut off at the limit', async () => {
  const { port } = new URL(host.origin);
  const chunk = Buffer.alloc(1e6, 0x20);
  let sent = 0;
  const status = await new Promise<number>((resolve, reject) => {
    const headers = { ...known(), 'Transfer-Encoding': 'chunked' };
    const outgoing = request(
      { host: '127.0.0.1', port, method: 'POST', path: '/rpc/app.info', headers },
      (incoming) => {
        resolve(incoming.statusCode!);
        outgoing.destroy();
      },
    );
    outgoing.on('error', reject);
    const feed = () => {
      while (!outgoing.destroyed && sent < 200e6) {
        sent += chunk.length;
        if (!outgoing.write(chunk)) {
          outgoing.once('drain', feed);
          return;
        }
      }
    };
    feed();
  });
  expect(status).toBe(413);
  // What lies in buffers on the way is all that went beyond.
  expect(sent).toBeLessThan(100e6);
  expect((await host.reply('app.info', {})).ok).toBe(true);
});

test('headers beyond their limit are refused', async () => {
  const answer = await send('GET', '/', { 'X-Long': 'x'.repeat(20_000) });
  expect(answer.status).toBe(431);
});
