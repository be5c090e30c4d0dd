import { connect } from 'node:net';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { TestHost } from '../../support/host.ts';

/** Callers who take their time, and too many windows. Oracle: the limits stated in main/web. */

let host: TestHost;
beforeAll(async () => {
  host = await TestHost.start();
});
afterAll(async () => {
  await host.stop();
});

test('who does not finish the head of a request is cut off within 15 s', async () => {
  const { port } = new URL(host.origin);
  const startMs = performance.now();
  const socket = connect(Number(port), '127.0.0.1');
  socket.write('GET / HTTP/1.1\r\nHost: 127.0.0.1\r\n');
  // One byte now and then, as a slow attacker would.
  const drip = setInterval(() => socket.write('X-Slow: 1\r\n'), 1000);
  await new Promise((resolve) =>
    socket
      .on('close', resolve)
      .on('error', () => undefined)
      .resume(),
  );
  clearInterval(drip);
  expect(performance.now() - startMs).toBeLessThan(15_000);
});

test('a browser keeps connections to call with: the fifth window is refused in words', async () => {
  const ending = new AbortController();
  for (let i = 0; i < 4; i++) await host.listen(() => undefined, ending.signal);
  const headers = { Authorization: `Bearer ${host.token}` };
  const fifth = await fetch(`${host.origin}/events`, { headers });
  expect(fifth.status).toBe(503);
  expect(await fifth.json()).toEqual({
    ok: false,
    error: { code: 'busy', message: 'this program is open in 4 windows already: close one of them' },
  });
  ending.abort();
  await expect
    .poll(async () => {
      const again = new AbortController();
      const { status } = await fetch(`${host.origin}/events`, { headers, signal: again.signal });
      again.abort();
      return status;
    })
    .toBe(200);
});
