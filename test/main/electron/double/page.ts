import { readFileSync } from 'node:fs';
import type { BrowserWindowConstructorOptions } from 'electron';
import type { Browser, Page } from 'playwright-core';

/** Chromium knows no schemes of ours: the page stands under an origin that nothing but the double answers for. */
const ORIGIN = 'https://quietboard-app.test';

const toReal = (url: string): string => url.replace(ORIGIN, 'quietboard://app');

/** What the program has set up for its pages. */
export interface PageServices {
  readonly handlers: ReadonlyMap<string, (...args: never[]) => unknown>;
  readonly protocols: ReadonlyMap<string, (request: Request) => Promise<Response>>;
}

/** A window's page: its files come from the program's protocol handler, its preload script runs before it. */
export async function openPage(
  browser: Browser,
  double: PageServices,
  options: BrowserWindowConstructorOptions,
  url: string,
): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: options.width!, height: options.height! } });
  const page = await context.newPage();
  await context.route('**/*', async (route) => {
    const request = route.request();
    if (!request.url().startsWith(ORIGIN)) return route.abort();
    const answer = await double.protocols.get('quietboard')!(
      new Request(toReal(request.url()), { method: request.method() }),
    );
    const headers = Object.fromEntries(answer.headers);
    return route.fulfill({ status: answer.status, headers, body: Buffer.from(await answer.arrayBuffer()) });
  });
  await page.exposeBinding('quietboardDoubleInvoke', async ({ frame }, channel: string, text: string) => {
    const args = decode(text) as never[];
    const event = { senderFrame: { url: toReal(frame.url()) } };
    const handler = double.handlers.get(channel);
    if (handler === undefined) throw new Error(`no handler for ${channel}`);
    return encode(await handler(event as never, ...args));
  });
  await page.addInitScript({ content: preloadIn(readFileSync(options.webPreferences!.preload!, 'utf8')) });
  await page.goto(url.replace('quietboard://app', ORIGIN));
  return page;
}

/** Bytes travel as they do in the runtime: as `Uint8Array`, here by way of text. */
const encode = (value: unknown): string =>
  JSON.stringify(value, (_key, item: unknown) =>
    item instanceof Uint8Array || isBufferJson(item)
      ? { $bytes: Buffer.from(item as Uint8Array).toString('base64') }
      : item,
  ) ?? 'null';

const decode = (text: string): unknown =>
  JSON.parse(text, (_key, item: { $bytes?: string } | null) =>
    typeof item?.$bytes === 'string' ? new Uint8Array(Buffer.from(item.$bytes, 'base64')) : item,
  );

/** A Buffer writes itself as this before anybody is asked. */
const isBufferJson = (item: unknown): boolean =>
  typeof item === 'object' && item !== null && (item as { type?: unknown }).type === 'Buffer' && 'data' in item;

/** The preload script with what a sandboxed one is given: `require` of "electron", of which it sees two parts. */
const preloadIn = (script: string): string => `(() => {
  const invoke = globalThis.quietboardDoubleInvoke;
  delete globalThis.quietboardDoubleInvoke;
  const toText = (value) => JSON.stringify(value, (_key, item) =>
    item instanceof Uint8Array ? { $bytes: btoa(Array.from(item, (byte) => String.fromCharCode(byte)).join('')) } : item);
  const fromText = (text) => JSON.parse(text, (_key, item) =>
    item && typeof item.$bytes === 'string' ? Uint8Array.from(atob(item.$bytes), (sign) => sign.charCodeAt(0)) : item);
  const listeners = new Map();
  const electron = {
    contextBridge: {
      exposeInMainWorld: (name, api) => Object.defineProperty(globalThis, name, { value: Object.freeze(api) }),
    },
    ipcRenderer: {
      invoke: async (channel, ...args) => fromText(await invoke(channel, toText(args))),
      on: (channel, listener) => listeners.set(channel, listener),
    },
  };
  globalThis.quietboardDoubleSend = (channel, args) => listeners.get(channel)?.({}, ...args);
  const require = (name) => {
    if (name !== 'electron') throw new Error('a sandboxed script cannot load ' + name);
    return electron;
  };
  ((require, exports, module) => {
${script}
  })(require, {}, { exports: {} });
})();`;
