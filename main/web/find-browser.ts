import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

/** Commands of browsers that know `--app`: a window of its own without address bar. */
const COMMANDS = [
  'chromium',
  'chromium-browser',
  'google-chrome',
  'google-chrome-stable',
  'microsoft-edge',
  'microsoft-edge-stable',
  'brave-browser',
  'vivaldi',
];
const MAC_PLACES = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  '/Applications/Brave Browser.app/Contents/MacOS/Brave Browser',
];
const WINDOWS_PLACES = ['Google\\Chrome\\Application\\chrome.exe', 'Microsoft\\Edge\\Application\\msedge.exe'];
const WINDOWS_ROOTS = ['PROGRAMFILES', 'PROGRAMFILES(X86)', 'LOCALAPPDATA'];

/** A browser of the Chromium family on this machine; `QUIETBOARD_BROWSER` names one. undefined: none was found. */
export function findBrowser(
  environment: NodeJS.ProcessEnv = process.env,
  platform: string = process.platform,
): string | undefined {
  const own = environment.QUIETBOARD_BROWSER;
  return own ? own : candidates(environment, platform).find(isExecutable);
}

function candidates(environment: NodeJS.ProcessEnv, platform: string): string[] {
  if (platform === 'darwin') return MAC_PLACES;
  if (platform === 'win32') {
    const roots = WINDOWS_ROOTS.flatMap((name) => environment[name] ?? []);
    return roots.flatMap((root) => WINDOWS_PLACES.map((place) => join(root, place)));
  }
  const folders = (environment.PATH ?? '').split(delimiter).filter((folder) => folder.startsWith('/'));
  return COMMANDS.flatMap((command) => folders.map((folder) => join(folder, command)));
}

function isExecutable(file: string): boolean {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}
