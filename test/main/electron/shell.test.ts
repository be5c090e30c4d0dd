import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { type Browser, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import type { Reply, Transport } from '../../../app/contract/transport.ts';
import { testFolder } from '../../support/run-cli.ts';
import { ElectronDouble } from './double/double.ts';

/**
 * The desktop program as it is built (main process, preload script, page) over a double of the `electron` module that drives
 * Debian's Chromium. What only the runtime itself can show (its own sandbox and isolation) is asserted as settings.
 */

const ENTRY = new URL('../../../dist/main/electron/main.js', import.meta.url).href;
const home = testFolder().folder;

let browser: Browser;
let double: ElectronDouble;
let page: Page;
const consoleErrors: string[] = [];

vi.mock('electron', () => double.exports);

beforeAll(async () => {
  vi.stubEnv('QUIETBOARD_HOME', home);
  browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: ['--no-sandbox'] });
  double = new ElectronDouble(browser);
  await import(ENTRY);
  await vi.waitFor(() => double.window, 10_000);
  page = await double.window.page;
  page.on('console', (message) => {
    if (message.type() === 'error') consoleErrors.push(message.text());
  });
});
afterAll(async () => {
  await browser.close();
});

/** A call through the page's own transport. */
const call = (name: string, input: unknown): Promise<Reply> =>
  page.evaluate(
    ([procedure, value]) =>
      (globalThis as never as { quietboard: Transport }).quietboard.call(procedure as never, value),
    [name, input] as const,
  );

test('the page has no Node, its own world and a sandbox', () => {
  const [options] = double.record.windows;
  expect(options!.webPreferences).toMatchObject({
    contextIsolation: true,
    sandbox: true,
    nodeIntegration: false,
    nodeIntegrationInWorker: false,
    nodeIntegrationInSubFrames: false,
    webSecurity: true,
    allowRunningInsecureContent: false,
    webviewTag: false,
  });
  expect(options!.webPreferences).not.toHaveProperty('enableRemoteModule');
  expect(double.record.windows).toHaveLength(1);
});

test('its scheme is a secure origin without leave to bypass the policy', () => {
  expect(double.record.schemes).toEqual([
    { scheme: 'quietboard', privileges: { standard: true, secure: true, supportFetchAPI: true } },
  ]);
});

test('the page is given call and on, nothing else', async () => {
  const names = await page.evaluate(() => Object.keys((globalThis as never as { quietboard: object }).quietboard));
  expect(names.sort()).toEqual(['call', 'on']);
  expect(
    await page.evaluate(() => [typeof require, typeof process, typeof (globalThis as { Buffer?: unknown }).Buffer]),
  ).toEqual(['undefined', 'undefined', 'undefined']);
});

test('the window’s page runs under the policy and talks to its host', async () => {
  await page.waitForSelector('button');
  expect(await page.title()).toContain('Quietboard');
  const info = await call('app.info', {});
  expect(info).toMatchObject({ ok: true, value: { host: 'window', hasDialogs: true } });
  expect(consoleErrors).toEqual([]);
  // The policy holds: a script written into the page does not run.
  await page.evaluate(() => {
    const script = document.createElement('script');
    script.textContent = 'globalThis.isTaken = true';
    document.body.append(script);
  });
  expect(await page.evaluate(() => (globalThis as { isTaken?: boolean }).isTaken)).toBeUndefined();
  expect(consoleErrors).toEqual([expect.stringContaining('Content Security Policy')]);
});

test('files of the page’s origin only, and no way out of its folder', async () => {
  const ask = async (url: string, method = 'GET') =>
    (await double.protocols.get('quietboard')!(new Request(url, { method }))).status;
  expect(await ask('quietboard://app/index.html')).toBe(200);
  for (const path of ['../package.json', '%2e%2e/package.json', '..%2f..%2fpackage.json', '%00', '%']) {
    expect(await ask(`quietboard://app/${path}`)).toBe(404);
  }
  expect(await ask('quietboard://elsewhere/index.html')).toBe(404);
  expect(await ask('quietboard://app/index.html', 'POST')).toBe(404);
  const answer = await double.protocols.get('quietboard')!(new Request('quietboard://app/index.html'));
  expect(answer.headers.get('content-security-policy')).toContain("default-src 'none'");
  expect(answer.headers.get('content-security-policy')).not.toMatch(/unsafe|https?:/);
});

test('the page stays where it is and opens nothing', () => {
  const { webContents } = double.window;
  const isHeld = (name: string, url: string) => {
    const event = { url, preventDefault: vi.fn() };
    webContents.emit(name, event);
    return event.preventDefault.mock.calls.length > 0;
  };
  for (const name of ['will-navigate', 'will-redirect', 'will-frame-navigate']) {
    for (const url of ['https://example.com/', 'file:///etc/passwd', 'quietboard://application/', 'quietboard:app']) {
      expect(isHeld(name, url)).toBe(true);
    }
    expect(isHeld(name, 'quietboard://app/index.html')).toBe(false);
  }
  expect(webContents.openHandler!({ url: 'https://example.com/' })).toEqual({ action: 'deny' });
  expect(isHeld('will-attach-webview', '')).toBe(true);
});

test('permissions are refused, except to copy', () => {
  const request = double.permissions.get('request')! as (c: unknown, p: string, answer: (is: boolean) => void) => void;
  const check = double.permissions.get('check')! as (c: unknown, p: string) => boolean;
  for (const permission of [
    'media',
    'geolocation',
    'notifications',
    'midi',
    'openExternal',
    'fileSystem',
    'clipboard-read',
  ]) {
    const answer = vi.fn();
    request(null, permission, answer);
    expect(answer).toHaveBeenCalledWith(false);
    expect(check(null, permission)).toBe(false);
  }
  expect(check(null, 'clipboard-sanitized-write')).toBe(true);
  expect((double.permissions.get('device') as () => boolean)()).toBe(false);
});

test('calls come from the own page only', async () => {
  const handler = double.handlers.get('quietboard:call') as (event: unknown, name: string, input: unknown) => unknown;
  for (const url of ['https://example.com/', 'quietboard://app.example/', undefined]) {
    const event = { senderFrame: url === undefined ? null : { url } };
    expect(() => handler(event, 'app.info', {})).toThrow('own page');
  }
  expect(await call('__proto__', {})).toMatchObject({ ok: false, error: { code: 'input', path: 'procedure' } });
});

test('bytes go both ways', async () => {
  const bytes = await page.evaluate(async () => {
    const { quietboard } = globalThis as never as { quietboard: Transport };
    const opened = await quietboard.call('project.open', { create: true });
    const { project } = (opened as { value: { project: { projectId: string } } }).value;
    const exported = await quietboard.call('project.export', { projectId: project.projectId });
    const { bytes: file } = (exported as { value: { bytes: Uint8Array } }).value;
    return { isBytes: file instanceof Uint8Array, start: String.fromCharCode(...file.subarray(0, 15)) };
  });
  expect(bytes).toEqual({ isBytes: true, start: 'SQLite format 3' });
});

test('the system’s dialogs: backing out is an answer, a file is written', async () => {
  expect(await call('dialog.open-project', {})).toEqual({ ok: true, value: { file: null } });
  const file = join(home, 'spectrum.csv');
  double.dialogAnswer = { canceled: false, filePath: file };
  const saved = await page.evaluate(() =>
    (globalThis as never as { quietboard: Transport }).quietboard.call('dialog.save-bytes', {
      name: 'valve: 1/2.csv',
      bytes: new Uint8Array([1, 2, 255]),
    }),
  );
  expect(saved).toEqual({ ok: true, value: { file } });
  expect([...readFileSync(file)]).toEqual([1, 2, 255]);
  expect(double.record.dialogs.at(-1)).toEqual({ name: 'save', args: [{ defaultPath: 'valve- 1-2.csv' }] });
});

test('the system’s menu has the window’s commands, and choosing one runs it', async () => {
  await vi.waitFor(() => expect(double.record.menus.at(-1)!.map(({ label }) => label)).toContain('File'), 5000);
  const menu = double.record.menus.at(-1)!;
  const file = menu.find(({ label }) => label === 'File')!.submenu as {
    label?: string;
    role?: string;
    accelerator?: string;
  }[];
  expect(file.map(({ label }) => label)).toContain('Open the sample project');
  expect(file.find(({ label }) => label === 'Save')!.accelerator).toBe('CommandOrControl+S');
  expect(file.at(-1)).toEqual({ role: 'quit' });
  double.chooseMenu('Open the sample project');
  await page.waitForSelector('text=Orchard valve controller');
});

test('a second start hands its project over and comes to the front', async () => {
  const seen = page.evaluate(
    () =>
      new Promise((resolve) => {
        (globalThis as never as { quietboard: Transport }).quietboard.on('app.open-file', resolve);
      }),
  );
  await page.evaluate(() => undefined);
  double.app.emit('second-instance', {}, ['electron', '.', '--flag', 'valve.quietboard'], join(home, 'projects'));
  expect(await seen).toEqual({ file: join(home, 'projects', 'valve.quietboard') });
  expect(double.isFocused).toBe(true);
});

test('closing the window keeps its place, closes the host and quits', async () => {
  await double.window.close();
  await vi.waitFor(() => expect(double.record.isQuit).toBe(true), 5000);
  const state = JSON.parse(readFileSync(join(home, 'state.json'), 'utf8')) as { settings: [string, unknown][] };
  expect(new Map(state.settings).get('window-place')).toEqual({
    bounds: { x: 40, y: 30, width: 1300, height: 850 },
    isMaximized: false,
  });
});
