import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { describe } from 'vitest';
import { findBrowser } from '../../main/web/find-browser.ts';
import { PROGRAM } from '../support/run-cli.ts';
import type { NamedFile } from './small-board.ts';

/** The built program, serving a folder of its own, and a browser before it: what a user has. */

const BROWSER = findBrowser();
/** `QUIETBOARD_PROGRAM` names another build to be tested, for example an installed one. */
const TESTED = process.env.QUIETBOARD_PROGRAM ?? PROGRAM;

/** Tests that need a browser of the Chromium family; says when there is none. */
export function describeInBrowser(name: string, tests: () => void): void {
  if (BROWSER === undefined) console.log(`${name}: skipped, no browser of the Chromium family is installed`);
  describe.skipIf(BROWSER === undefined)(name, tests);
}

/** Pictures of the views, kept as build output. */
export const picture = (name: string): string =>
  fileURLToPath(new URL(`../../out/pictures/${name}.png`, import.meta.url));

export interface OpenPage {
  readonly page: Page;
  /** Everything the browser complained about: errors of scripts, refused content, failed requests. */
  readonly complaints: readonly string[];
}

export class ServedWindow {
  readonly address: string;
  readonly home: string;
  readonly #program: ChildProcess;
  readonly #browser: Browser;

  private constructor(address: string, home: string, program: ChildProcess, browser: Browser) {
    this.address = address;
    this.home = home;
    this.#program = program;
    this.#browser = browser;
  }

  /** `home`: the program's folder of an earlier start, to go on with. */
  static async start(home: string = mkdtempSync(join(tmpdir(), 'quietboard-e2e-'))): Promise<ServedWindow> {
    const program = spawn(process.execPath, [TESTED, 'serve', '--no-open'], {
      env: { ...process.env, QUIETBOARD_HOME: home },
    });
    const address = await addressOf(program);
    const browser = await chromium.launch({ executablePath: BROWSER!, args: ['--no-sandbox'] });
    return new ServedWindow(address, home, program, browser);
  }

  /** A window of a user who was never here before, 1280 × 720 unless said otherwise. */
  async open(options: BrowserContextOptions = {}): Promise<OpenPage> {
    const context = await this.#browser.newContext({
      viewport: { width: 1280, height: 720 },
      locale: 'en-GB',
      reducedMotion: 'reduce',
      ...options,
    });
    const page = await context.newPage();
    const complaints: string[] = [];
    page.on('console', (message) => {
      if (['error', 'warning'].includes(message.type())) complaints.push(message.text());
    });
    page.on('pageerror', (error) => complaints.push(String(error)));
    page.on('requestfailed', (request) => complaints.push(`${request.url()} ${request.failure()?.errorText}`));
    // A listener of its own from the start: without one, the first choice could reach the system's dialog.
    page.on('filechooser', () => {});
    await page.goto(this.address);
    await page.getByRole('main').waitFor();
    return { page, complaints };
  }

  /** Ends program and browser and removes the program's folder. */
  async close(): Promise<void> {
    await this.#end('SIGINT');
    rmSync(this.home, { recursive: true });
  }

  /** Ends the program as a power cut does; its folder stays, to be started with again. */
  kill(): Promise<void> {
    return this.#end('SIGKILL');
  }

  async #end(signal: NodeJS.Signals): Promise<void> {
    const ended = new Promise((resolve) => this.#program.once('close', resolve));
    this.#program.kill(signal);
    await ended;
    await this.#browser.close();
  }
}

/** Chooses files by the window's own key, as a user does in the system's dialog. */
export async function chooseFiles(page: Page, files: readonly NamedFile[]): Promise<void> {
  const [chooser] = await Promise.all([page.waitForEvent('filechooser'), page.keyboard.press('Control+o')]);
  await chooser.setFiles([...files]);
}

function addressOf(program: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let said = '';
    const listen = (text: string) => {
      said += text;
      const address = /http:\/\/127\.0\.0\.1:\d+\/#\S+(?=\n)/.exec(said)?.[0];
      if (address !== undefined) resolve(address);
    };
    program.stdout!.setEncoding('utf8').on('data', listen);
    program.stderr!.setEncoding('utf8').on('data', listen);
    program.once('close', () => reject(new Error(`the program ended before it served: ${said}`)));
  });
}
