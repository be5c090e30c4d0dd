import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { homeFolder, makeFolder } from '../state/home.ts';
import { findBrowser } from './find-browser.ts';

/** Long enough for a browser to say that it cannot start. */
const START_MS = 1500;

/**
 * Opens the address in an app window of a browser of the Chromium family, with a profile of its own: what is typed here
 * stays out of the user's history, and nothing of theirs reaches in here. Whether a browser was found and started.
 */
export async function openWindow(address: string): Promise<boolean> {
  const browser = findBrowser();
  if (browser === undefined) return false;
  const profile = makeFolder(join(homeFolder(), 'browser'));
  const options = [`--app=${address}`, `--user-data-dir=${profile}`, '--no-first-run', '--no-default-browser-check'];
  const child = spawn(browser, options, { detached: true, stdio: 'ignore' });
  child.unref();
  return new Promise((resolve) => {
    const started = setTimeout(() => resolve(true), START_MS);
    const ended = (hasStarted: boolean) => {
      clearTimeout(started);
      resolve(hasStarted);
    };
    child.on('error', () => ended(false));
    // A browser that runs already takes the address over and the new process ends well.
    child.on('exit', (code) => ended(code === 0));
  });
}
