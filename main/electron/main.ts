import { app, type BrowserWindow, ipcMain, screen, session } from 'electron';
import { createHost, type Host } from '../rpc/host.ts';
import { rendererFolder } from '../web/serve.ts';
import { CALL_CHANNEL, EVENT_CHANNEL } from './channels.ts';
import { systemDialogs } from './dialogs.ts';
import { showMenu } from './menu.ts';
import { isOwnPage, registerScheme, servePage } from './page.ts';
import { confine, openProgramWindow, refusePermissions } from './program-window.ts';
import { startFileOf } from './start-file.ts';

/** The desktop program: one window, one host behind it. */

const PLACE_SETTING = 'window-place';

let window: BrowserWindow | null = null;
let host: Host | null = null;
/** A file the system handed over before there was a window. */
let startFile = startFileOf(process.argv, process.cwd());

registerScheme();
if (app.requestSingleInstanceLock()) start();
else app.quit();

function start(): void {
  app.on('second-instance', (_event, commandLine, folder) => {
    const file = startFileOf(commandLine, folder);
    if (file !== undefined) openFile(file);
    if (window?.isMinimized()) window.restore();
    window?.focus();
  });
  app.on('open-file', (event, file) => {
    event.preventDefault();
    openFile(file);
  });
  app.on('web-contents-created', (_event, contents) => confine(contents));
  app.on('window-all-closed', () => app.quit());
  app.on('will-quit', (event) => {
    if (host === null) return;
    // Once more, when jobs, projects and files are closed.
    event.preventDefault();
    const closing = host;
    host = null;
    void closing.close().finally(() => app.quit());
  });
  app.whenReady().then(open, (error: unknown) => {
    process.stderr.write(`${String(error)}\n`);
    app.exit(1);
  });
}

async function open(): Promise<void> {
  refusePermissions(session.defaultSession);
  servePage(rendererFolder());
  const opened = createHost({
    kind: 'window',
    dialogs: systemDialogs(() => window),
    showMenu: (commands) => showMenu(commands, runCommand),
    ...(startFile !== undefined && { startFile }),
  });
  host = opened;
  ipcMain.handle(CALL_CHANNEL, (event, name: unknown, input: unknown) => {
    if (!isOwnPage(event.senderFrame?.url ?? '')) throw new Error('calls come from the own page only');
    return opened.dispatch(String(name), input);
  });
  opened.events.subscribe((name, payload) => send(name, payload));
  showMenu([], runCommand);
  const screens = screen.getAllDisplays().map(({ workArea }) => workArea);
  window = openProgramWindow(await opened.state.setting(PLACE_SETTING), screens, (place) => {
    void opened.state.putSetting(PLACE_SETTING, place);
  });
  window.on('closed', () => {
    window = null;
  });
}

function send(name: string, payload: unknown): void {
  if (window !== null && !window.webContents.isDestroyed()) window.webContents.send(EVENT_CHANNEL, name, payload);
}

/** A menu entry counts as the user's own act: a page may open a file dialog only upon one. */
function runCommand(name: string): void {
  void window?.webContents.executeJavaScript('undefined', true).then(() => send('app.command', { name }));
}

function openFile(file: string): void {
  if (host === null) startFile = file;
  else host.events.publish('app.open-file', { file });
}
