import { EventEmitter } from 'node:events';
import type { BrowserWindowConstructorOptions, MenuItemConstructorOptions, Rectangle } from 'electron';
import type { Browser, Page } from 'playwright-core';
import { openPage } from './page.ts';

/**
 * Stands in for the `electron` module where its runtime is not to be had: as much of it as the program uses, its windows being
 * pages of Debian's Chromium. What the program sets and asks for is kept in `record`; what a user or the system would do is
 * done by `act`.
 */

type Handler = (...args: never[]) => unknown;
type Call = { readonly name: string; readonly args: readonly unknown[] };

export class ElectronDouble {
  readonly record = {
    schemes: [] as unknown[],
    windows: [] as BrowserWindowConstructorOptions[],
    menus: [] as (readonly MenuItemConstructorOptions[])[],
    dialogs: [] as Call[],
    isQuit: false,
  };
  readonly handlers = new Map<string, Handler>();
  readonly protocols = new Map<string, (request: Request) => Promise<Response>>();
  readonly permissions = new Map<string, Handler>();
  /** What the next dialog answers. */
  dialogAnswer: unknown = { canceled: true, filePaths: [], filePath: '' };
  hasLock = true;
  readonly app = Object.assign(new EventEmitter(), {
    requestSingleInstanceLock: () => this.hasLock,
    whenReady: async () => undefined,
    exit: () => this.#quit(),
    quit: () => this.#askToQuit(),
  });
  #window: WindowDouble | null = null;
  #isFocused = false;
  readonly #browser: Browser;

  constructor(browser: Browser) {
    this.#browser = browser;
  }

  /** The module's exports. */
  get exports(): Record<string, unknown> {
    const { record } = this;
    const dialog =
      (name: string) =>
      async (...args: unknown[]) => {
        record.dialogs.push({ name, args: args.filter((arg) => !(arg instanceof WindowDouble)) });
        return this.dialogAnswer;
      };
    const open = (options: BrowserWindowConstructorOptions) => this.#open(options);
    return {
      app: this.app,
      // Called with `new`: what it returns takes the place of its own object.
      BrowserWindow: function BrowserWindow(options: BrowserWindowConstructorOptions) {
        return open(options);
      },
      ipcMain: { handle: (channel: string, handler: Handler) => this.handlers.set(channel, handler) },
      protocol: {
        registerSchemesAsPrivileged: (schemes: unknown[]) => record.schemes.push(...schemes),
        handle: (scheme: string, handler: (request: Request) => Promise<Response>) =>
          this.protocols.set(scheme, handler),
      },
      dialog: { showOpenDialog: dialog('open'), showSaveDialog: dialog('save') },
      Menu: {
        buildFromTemplate: (template: MenuItemConstructorOptions[]) => template,
        setApplicationMenu: (menu: MenuItemConstructorOptions[]) => record.menus.push(menu),
      },
      screen: { getAllDisplays: () => [{ workArea: { x: 0, y: 0, width: 1920, height: 1080 } satisfies Rectangle }] },
      session: {
        defaultSession: {
          setPermissionRequestHandler: (handler: Handler) => this.permissions.set('request', handler),
          setPermissionCheckHandler: (handler: Handler) => this.permissions.set('check', handler),
          setDevicePermissionHandler: (handler: Handler) => this.permissions.set('device', handler),
        },
      },
    };
  }

  get window(): WindowDouble {
    if (this.#window === null) throw new Error('the program has opened no window');
    return this.#window;
  }

  get isFocused(): boolean {
    return this.#isFocused;
  }

  /** Chooses an entry of the newest menu by its label. */
  chooseMenu(label: string): void {
    const entries = this.record.menus.at(-1)!.flatMap(({ submenu }) => submenu as MenuItemConstructorOptions[]);
    const entry = entries.find((candidate) => candidate.label === label);
    if (entry === undefined) throw new Error(`no menu entry "${label}"`);
    (entry.click as () => void)();
  }

  focus(): void {
    this.#isFocused = true;
  }

  #open(options: BrowserWindowConstructorOptions): WindowDouble {
    this.record.windows.push(options);
    this.#window = new WindowDouble(this, this.#browser, options);
    this.app.emit('web-contents-created', {}, this.#window.webContents);
    return this.#window;
  }

  /** The runtime asks "will-quit" and quits unless somebody objects. */
  #askToQuit(): void {
    let isHeld = false;
    this.app.emit('will-quit', { preventDefault: () => (isHeld = true) });
    if (!isHeld) this.#quit();
  }

  #quit(): void {
    this.record.isQuit = true;
    this.app.emit('quit');
  }
}

export class WindowDouble extends EventEmitter {
  readonly webContents: WebContentsDouble;
  readonly page: Promise<Page>;
  #showPage: (page: Page) => void = () => undefined;
  readonly #double: ElectronDouble;
  readonly #browser: Browser;
  readonly #options: BrowserWindowConstructorOptions;

  constructor(double: ElectronDouble, browser: Browser, options: BrowserWindowConstructorOptions) {
    super();
    this.#double = double;
    this.#browser = browser;
    this.#options = options;
    this.page = new Promise((resolve) => {
      this.#showPage = resolve;
    });
    this.webContents = new WebContentsDouble(this.page);
  }

  async loadURL(url: string): Promise<void> {
    const page = await openPage(this.#browser, this.#double, this.#options, url);
    this.#showPage(page);
    this.emit('ready-to-show');
  }

  show(): void {}
  maximize(): void {}
  restore(): void {}
  isMinimized = () => false;
  isMaximized = () => false;
  focus(): void {
    this.#double.focus();
  }
  getNormalBounds = (): Rectangle => ({ x: 40, y: 30, width: 1300, height: 850 });

  /** As the user does. */
  async close(): Promise<void> {
    this.emit('close');
    this.webContents.isEnded = true;
    await (await this.page).close();
    this.emit('closed');
    this.#double.app.emit('window-all-closed');
  }
}

export class WebContentsDouble extends EventEmitter {
  openHandler: ((details: { url: string }) => { action: string }) | null = null;
  isEnded = false;
  readonly #page: Promise<Page>;

  constructor(page: Promise<Page>) {
    super();
    this.#page = page;
  }

  isDestroyed = () => this.isEnded;
  setWindowOpenHandler(handler: (details: { url: string }) => { action: string }): void {
    this.openHandler = handler;
  }

  send(channel: string, ...args: unknown[]): void {
    void this.#page.then((page) =>
      page.evaluate(([name, values]) => (globalThis as never as DoubleGlobal).quietboardDoubleSend(name, values), [
        channel,
        args,
      ] as const),
    );
  }

  async executeJavaScript(code: string): Promise<unknown> {
    return (await this.#page).evaluate(code);
  }
}

interface DoubleGlobal {
  quietboardDoubleSend(channel: string, args: readonly unknown[]): void;
}
