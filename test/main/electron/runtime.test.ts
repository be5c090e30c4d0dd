import { fileURLToPath } from 'node:url';
import { _electron } from 'playwright-core';
import { expect, test } from 'vitest';
import { desktopRuntime } from '../../../main/start/desktop-runtime.ts';
import { testFolder } from '../../support/run-cli.ts';

/** The built program in the real runtime, where there is one: it starts, its page is confined and reaches its host. */

const CHECKOUT = fileURLToPath(new URL('../../../', import.meta.url));

test('the desktop program starts in its runtime', async (context) => {
  const runtime = desktopRuntime(import.meta.url);
  if ('missing' in runtime) {
    console.warn(`skipped: ${runtime.missing}`);
    context.skip();
    return;
  }
  const env = { ...process.env, QUIETBOARD_HOME: testFolder().folder } as Record<string, string>;
  const args = [CHECKOUT, ...(process.getuid?.() === 0 ? ['--no-sandbox'] : [])];
  const program = await _electron.launch({ executablePath: runtime.program, args, env });
  try {
    const page = await program.firstWindow();
    await page.waitForSelector('button');
    const seen = await page.evaluate(async () => {
      const { quietboard } = globalThis as never as {
        quietboard: { call(name: string, input: unknown): Promise<unknown> };
      };
      return {
        address: location.href,
        node: [typeof require, typeof process],
        offered: Object.keys(quietboard).sort(),
        info: await quietboard.call('app.info', {}),
        project: await quietboard.call('project.open', { create: true }),
      };
    });
    expect(seen).toMatchObject({
      address: 'quietboard://app/index.html',
      node: ['undefined', 'undefined'],
      offered: ['call', 'on'],
      info: { ok: true, value: { host: 'window' } },
      project: { ok: true },
    });
    const preferences = await program.evaluate(({ BrowserWindow }) => {
      const [window] = BrowserWindow.getAllWindows();
      return (window!.webContents as never as { getLastWebPreferences(): object }).getLastWebPreferences();
    });
    expect(preferences).toMatchObject({ contextIsolation: true, sandbox: true, nodeIntegration: false });
  } finally {
    await program.close();
  }
});
