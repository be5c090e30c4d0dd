import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { FRAMED_TYPE, JSON_TYPE, packFramed, unpackFramed } from '../../app/contract/framing.ts';
import type { Input, Output, ProcedureName } from '../../app/contract/procedures.ts';
import type { Reply } from '../../app/contract/transport.ts';
import { PROGRAM } from './run-cli.ts';

const START_MS = 30_000;
/** `QUIETBOARD_PROGRAM` names another build to be tested, for example an installed one. */
export const TESTED = process.env.QUIETBOARD_PROGRAM ?? PROGRAM;

export interface HostOptions {
  /** Project to open first. */
  readonly project?: string;
  /** Folder of the program's own; absent: a new one, removed in the end. */
  readonly home?: string;
}

/** The built program, serving the window on the loopback address with a home folder of its own. */
export class TestHost {
  readonly home: string;
  /** `http://127.0.0.1:PORT` */
  readonly origin: string;
  readonly token: string;
  readonly #child: ChildProcess;
  readonly #ownsHome: boolean;
  readonly #exit: Promise<number | null>;

  private constructor(child: ChildProcess, address: string, home: string, ownsHome: boolean) {
    const [origin, token] = address.split('/#') as [string, string];
    this.#child = child;
    this.origin = origin;
    this.token = token;
    this.home = home;
    this.#ownsHome = ownsHome;
    this.#exit = new Promise((resolve) => child.on('exit', resolve));
  }

  static async start({ project, home }: HostOptions = {}): Promise<TestHost> {
    const folder = home ?? mkdtempSync(join(tmpdir(), 'quietboard-home-'));
    const args = [TESTED, 'serve', '--no-open', ...(project === undefined ? [] : ['--project', project])];
    const child = spawn(process.execPath, args, { env: { ...process.env, QUIETBOARD_HOME: folder } });
    return new TestHost(child, await addressOf(child), folder, home === undefined);
  }

  /** What the program prints for the user to open. */
  get address(): string {
    return `${this.origin}/#${this.token}`;
  }

  /** Calls a procedure as the window does. */
  async reply(name: string, input: unknown, signal?: AbortSignal): Promise<Reply> {
    const { bytes, ...json } = input as { bytes?: unknown };
    const isFramed = bytes instanceof Uint8Array;
    const response = await fetch(`${this.origin}/rpc/${name}`, {
      method: 'POST',
      headers: { Authorization: `Bearer ${this.token}`, 'Content-Type': isFramed ? FRAMED_TYPE : JSON_TYPE },
      body: isFramed ? packFramed({ json, bytes }) : JSON.stringify(json),
      ...(signal && { signal }),
    });
    if (response.headers.get('content-type') !== FRAMED_TYPE) return (await response.json()) as Reply;
    const framed = unpackFramed(new Uint8Array(await response.arrayBuffer()));
    const reply = framed.json as Reply;
    return reply.ok ? { ok: true, value: { ...(reply.value as object), bytes: framed.bytes } } : reply;
  }

  /** The value of a procedure that must succeed. */
  async call<N extends ProcedureName>(name: N, input: Input<N>, signal?: AbortSignal): Promise<Output<N>> {
    const reply = await this.reply(name, input, signal);
    if (!reply.ok) throw new Error(`${name}: ${reply.error.code}: ${reply.error.message}`);
    return reply.value as Output<N>;
  }

  /** Listens to events until `signal` ends it; `listener` is given each by name. */
  async listen(listener: (name: string, payload: never) => void, signal: AbortSignal): Promise<void> {
    const headers = { Authorization: `Bearer ${this.token}` };
    const response = await fetch(`${this.origin}/events`, { headers, signal });
    if (!response.ok) throw new Error(`events: ${response.status}`);
    const read = async () => {
      let text = '';
      for await (const piece of response.body!.pipeThrough(new TextDecoderStream())) {
        text += piece;
        const blocks = text.split('\n\n');
        text = blocks.pop()!;
        for (const block of blocks) {
          const [, name, data] = /^event: (.*)\ndata: (.*)$/.exec(block) ?? [];
          if (name !== undefined && data !== undefined) listener(name, JSON.parse(data) as never);
        }
      }
    };
    // Ends with the signal.
    read().catch(() => undefined);
  }

  /** As Ctrl-C does; the exit code. */
  async stop(): Promise<number | null> {
    this.#child.kill('SIGINT');
    return this.#ended();
  }

  /** As a power cut does. */
  async kill(): Promise<void> {
    this.#child.kill('SIGKILL');
    await this.#ended();
  }

  async #ended(): Promise<number | null> {
    const code = await this.#exit;
    if (this.#ownsHome) rmSync(this.home, { recursive: true, force: true });
    return code;
  }
}

function addressOf(child: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let [out, err] = ['', ''];
    const timer = setTimeout(() => reject(new Error(`the host printed no address: ${out}${err}`)), START_MS);
    child.stdout!.setEncoding('utf8').on('data', (text: string) => {
      out += text;
      const address = /^Serving (\S+)\n/m.exec(out)?.[1];
      if (address === undefined) return;
      clearTimeout(timer);
      resolve(address);
    });
    child.stderr!.setEncoding('utf8').on('data', (text: string) => (err += text));
    child.on('exit', (code) => reject(new Error(`the host ended with code ${code}: ${err}`)));
  });
}
