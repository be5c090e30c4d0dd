import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { guardProcess, onInterrupt, reportFailure } from '../cli/exit.ts';
import { startFileOf } from '../electron/start-file.ts';
import { serve } from '../web/serve.ts';
import { desktopRuntime } from './desktop-runtime.ts';

/** Opens the window: the desktop one, or where its runtime is not to be had the same interface in a browser. */

const packageFolder = fileURLToPath(new URL('../../..', import.meta.url));

function openDesktop(program: string): Promise<number> {
  const child = spawn(program, [packageFolder, ...process.argv.slice(2)], { stdio: 'inherit' });
  return new Promise((resolve, reject) => {
    child.on('error', reject);
    child.on('exit', (code) => resolve(code ?? 1));
  });
}

async function openInBrowser(why: string): Promise<void> {
  process.stderr.write(`Opening in a browser window: ${why}.\n`);
  const stop = new AbortController();
  onInterrupt(() => stop.abort());
  const startFile = startFileOf(process.argv, process.cwd());
  await serve({
    port: 0,
    ...(startFile !== undefined && { startFile }),
    opensWindow: true,
    endsWithWindows: true,
    onAddress: (address) => process.stdout.write(`Serving ${address}\n`),
    onNoWindow: () =>
      process.stderr.write(
        'No browser window could be opened (looked for one of the Chromium family): open the address yourself.\n',
      ),
    signal: stop.signal,
  });
}

guardProcess();
try {
  const runtime = desktopRuntime(import.meta.url);
  if ('program' in runtime) process.exitCode = await openDesktop(runtime.program);
  else await openInBrowser(runtime.missing);
} catch (error) {
  process.exitCode = reportFailure(error);
}
