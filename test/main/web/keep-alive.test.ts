import { expect, test } from 'vitest';
import { FRAMED_TYPE, unpackFramed } from '../../../app/contract/framing.ts';
import { EventBus } from '../../../main/rpc/event-bus.ts';
import type { Host } from '../../../main/rpc/host.ts';
import { AppState } from '../../../main/state/app-state.ts';
import { startWebServer } from '../../../main/web/server.ts';
import { testFolder } from '../../support/run-cli.ts';

/** Answers that take longer than the time after which a JSON one is begun (15 s). Oracle: the contract's transport. */

const SLOW_MS = 16_500;

test('slow answers arrive whole: JSON behind white space, bytes framed', async () => {
  const { folder } = testFolder();
  const host: Host = {
    dispatch: async (name) => {
      await new Promise((resolve) => setTimeout(resolve, SLOW_MS));
      const value = name === 'report.render' ? { name: 'a', bytes: new Uint8Array([1, 2, 3]) } : { checks: [] };
      return { ok: true, value };
    },
    events: new EventBus(),
    state: new AppState(folder),
    stopJob: () => undefined,
    isBusy: () => false,
    logFailure: () => 0,
    close: async () => undefined,
  };
  const server = await startWebServer({ host, rendererFolder: folder, port: 0 });
  const call = (name: string) =>
    fetch(`${server.origin}/rpc/${name}`, {
      method: 'POST',
      headers: { Authorization: `Bearer ${server.token}`, 'Content-Type': 'application/json' },
      body: '{}',
    });
  const startMs = performance.now();
  const answers = [call('validate.run'), call('report.render')];
  const json = await answers[0]!;
  // Begun before it is known.
  expect(performance.now() - startMs).toBeLessThan(SLOW_MS);
  const text = await json.text();
  expect(text).toMatch(/^ +\{/);
  expect(JSON.parse(text)).toEqual({ ok: true, value: { checks: [] } });
  const framed = await answers[1]!;
  expect(framed.headers.get('content-type')).toBe(FRAMED_TYPE);
  expect(unpackFramed(new Uint8Array(await framed.arrayBuffer()))).toEqual({
    json: { ok: true, value: { name: 'a' } },
    bytes: new Uint8Array([1, 2, 3]),
  });
  await server.close();
});
