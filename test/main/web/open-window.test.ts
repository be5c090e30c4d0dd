import { spawn } from 'node:child_process';
import { chmodSync, existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { describe, expect, test, vi } from 'vitest';
import { findBrowser } from '../../../main/web/find-browser.ts';
import { TESTED } from '../../support/host.ts';
import { testFolder } from '../../support/run-cli.ts';

const START = fileURLToPath(new URL('../start/open.js', pathToFileURL(TESTED)));

/** A browser that writes down what it is started with and stays open. */
function recordingBrowser() {
  const { folder, write } = testFolder();
  const record = join(folder, 'arguments');
  const browser = write(
    'my-browser',
    `#!/bin/sh\nprintf '%s\\n' "$@" > '${record}.part'\nmv '${record}.part' '${record}'\nsleep 20\n`,
  );
  chmodSync(browser, 0o755);
  return { folder, browser, record };
}

/** Starts what `npm start` starts once all is built. */
function start(home: string, browser: string, args: readonly string[] = []) {
  const env = { ...process.env, QUIETBOARD_HOME: home, QUIETBOARD_BROWSER: browser };
  const child = spawn(process.execPath, [START, ...args], { env });
  const said = { out: '', err: '' };
  child.stdout.setEncoding('utf8').on('data', (text: string) => (said.out += text));
  child.stderr.setEncoding('utf8').on('data', (text: string) => (said.err += text));
  const ended = new Promise<number | null>((resolve) => child.on('exit', resolve));
  return { child, said, ended };
}

describe('npm start without the desktop runtime', () => {
  test('says so in one line and opens the same interface as an app window of a browser', async () => {
    const { folder, browser, record } = recordingBrowser();
    const { child, said, ended } = start(folder, browser);
    await vi.waitFor(() => expect(existsSync(record)).toBe(true), 20_000);
    const [app, ...options] = readFileSync(record, 'utf8').trim().split('\n');
    const address = /^Serving (\S+)\n$/.exec(said.out)![1];
    expect(app).toBe(`--app=${address}`);
    // A profile of its own, in the program's folder.
    expect(options).toContain(`--user-data-dir=${join(folder, 'browser')}`);
    expect(said.err).toMatch(/^Opening in a browser window: [^\n]+\.\n$/);
    child.kill('SIGINT');
    expect(await ended).toBe(0);
  });

  test('prints the address where no browser starts', async () => {
    const { folder } = testFolder();
    const { child, said, ended } = start(folder, '/bin/false');
    await vi.waitFor(() => expect(said.err).toContain('open the address yourself'), 20_000);
    expect(said.out).toMatch(/^Serving http:\/\/127\.0\.0\.1:\d+\/#\S+\n$/);
    child.kill('SIGINT');
    expect(await ended).toBe(0);
  });

  test('a project file given is the one shown first', async () => {
    const { folder, browser, record } = recordingBrowser();
    const project = join(folder, 'valve.quietboard');
    const { child, said, ended } = start(folder, browser, [project]);
    await vi.waitFor(() => expect(existsSync(record)).toBe(true), 20_000);
    const [origin, token] = /^Serving (\S+)\n$/.exec(said.out)![1]!.split('/#');
    const response = await fetch(`${origin}/rpc/app.info`, {
      method: 'POST',
      headers: { Authorization: `Bearer ${token}`, 'Content-Type': 'application/json' },
      body: '{}',
    });
    expect(await response.json()).toMatchObject({ ok: true, value: { startProject: { file: project } } });
    child.kill('SIGINT');
    expect(await ended).toBe(0);
  });
});

describe('which browser', () => {
  test('the one named, else the first on the path', () => {
    const { folder, write } = testFolder();
    expect(findBrowser({ QUIETBOARD_BROWSER: '/opt/mine', PATH: folder }, 'linux')).toBe('/opt/mine');
    expect(findBrowser({ PATH: folder }, 'linux')).toBeUndefined();
    write('google-chrome', '');
    expect(findBrowser({ PATH: folder }, 'linux')).toBeUndefined();
    chmodSync(join(folder, 'google-chrome'), 0o755);
    expect(findBrowser({ PATH: folder }, 'linux')).toBe(join(folder, 'google-chrome'));
    const chromium = write('chromium', '');
    chmodSync(chromium, 0o755);
    expect(findBrowser({ PATH: `${folder}` }, 'linux')).toBe(chromium);
  });

  test('no folder relative to where one happens to be', () => {
    const { write } = testFolder();
    chmodSync(write('chromium', ''), 0o755);
    expect(findBrowser({ PATH: '.:bin:' }, 'linux')).toBeUndefined();
  });
});
