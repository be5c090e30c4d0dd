import { fileURLToPath } from 'node:url';
import { BrowserWindow, type Session } from 'electron';
import { isOwnPage, PAGE_ADDRESS } from './page.ts';
import { LEAST_SIZE, type Rectangle, type WindowPlace, windowPlace } from './window-place.ts';

/** What the page may do is what the preload script offers; it has no Node, and its world is not the preload script's. */
export const WEB_PREFERENCES = {
  preload: fileURLToPath(new URL('./preload.cjs', import.meta.url)),
  contextIsolation: true,
  sandbox: true,
  nodeIntegration: false,
  nodeIntegrationInWorker: false,
  nodeIntegrationInSubFrames: false,
  webSecurity: true,
  allowRunningInsecureContent: false,
  webviewTag: false,
  navigateOnDragDrop: false,
  spellcheck: false,
} as const;

/** Opens the program's window where it was. `onPlace` is told the place when it closes. */
export function openProgramWindow(
  remembered: unknown,
  screens: readonly Rectangle[],
  onPlace: (place: WindowPlace) => void,
): BrowserWindow {
  const place = windowPlace(remembered, screens);
  const window = new BrowserWindow({
    ...place.size,
    ...place.bounds,
    minWidth: LEAST_SIZE.width,
    minHeight: LEAST_SIZE.height,
    title: 'Quietboard',
    show: false,
    webPreferences: WEB_PREFERENCES,
  });
  if (place.isMaximized) window.maximize();
  // An empty window would flash.
  window.once('ready-to-show', () => window.show());
  window.on('close', () => onPlace({ bounds: window.getNormalBounds(), isMaximized: window.isMaximized() }));
  void window.loadURL(PAGE_ADDRESS);
  return window;
}

/** The page stays where it is and opens nothing; what a page asks the system for is refused. */
export function confine(contents: Electron.WebContents): void {
  contents.setWindowOpenHandler(() => ({ action: 'deny' }));
  contents.on('will-attach-webview', (event) => event.preventDefault());
  const stay = (event: { readonly url: string; preventDefault: () => void }) => {
    if (!isOwnPage(event.url)) event.preventDefault();
  };
  contents.on('will-navigate', stay);
  contents.on('will-frame-navigate', stay);
  contents.on('will-redirect', stay);
}

export function refusePermissions(session: Session): void {
  session.setPermissionRequestHandler((_contents, permission, answer) => answer(isHarmless(permission)));
  session.setPermissionCheckHandler((_contents, permission) => isHarmless(permission));
  session.setDevicePermissionHandler(() => false);
}

/** Copying a table or a picture is the one thing the page needs leave for. */
const isHarmless = (permission: string): boolean => permission === 'clipboard-sanitized-write';
