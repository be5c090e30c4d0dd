import { fileURLToPath } from 'node:url';
import { createHost } from '../rpc/host.ts';
import { openWindow } from './open-window.ts';
import { startWebServer } from './server.ts';

export interface ServeOptions {
  /** 0: any free one. */
  readonly port: number;
  /** Project to show first. */
  readonly startFile?: string;
  readonly opensWindow: boolean;
  /** Ends when the last window has been closed for a while. */
  readonly endsWithWindows: boolean;
  /** Told once the address is known. */
  readonly onAddress: (address: string) => void;
  /** Told when no window could be opened. */
  readonly onNoWindow: () => void;
  /** Ends it. */
  readonly signal: AbortSignal;
}

/** A window that is loaded anew is gone for a moment; one that the machine put to sleep, for longer. */
const UNUSED_MS = 60_000;

/** Serves the window on the loopback address until it is told to end. */
export async function serve(options: ServeOptions): Promise<void> {
  const host = createHost({ kind: 'loopback', ...(options.startFile && { startFile: options.startFile }) });
  const ended = aborted(options.signal);
  try {
    const unused = unusedTimer(() => host.isBusy());
    const server = await startWebServer({
      host,
      rendererFolder: rendererFolder(),
      port: options.port,
      onWindowCount: unused.onWindowCount,
    });
    const address = `${server.origin}/#${server.token}`;
    options.onAddress(address);
    if (options.opensWindow && !(await openWindow(address))) options.onNoWindow();
    await (options.endsWithWindows ? Promise.race([ended, unused.ended]) : ended);
    await server.close();
  } finally {
    await host.close();
  }
}

/** Where the build puts the window's files, beside the built program. */
export const rendererFolder = (): string => fileURLToPath(new URL('../../renderer', import.meta.url));

/** `ended` once there were windows, none is left for a while, and no work is under way. */
function unusedTimer(isBusy: () => boolean): { onWindowCount: (count: number) => void; ended: Promise<void> } {
  const unused = new AbortController();
  let timer: NodeJS.Timeout | undefined;
  const wait = () => {
    timer = setTimeout(() => (isBusy() ? wait() : unused.abort()), UNUSED_MS);
    // The server keeps the program running; this must not, once the server has ended.
    timer.unref();
  };
  const onWindowCount = (count: number) => {
    clearTimeout(timer);
    if (count === 0) wait();
  };
  return { onWindowCount, ended: aborted(unused.signal) };
}

const aborted = (signal: AbortSignal): Promise<void> =>
  new Promise((resolve) => {
    if (signal.aborted) resolve();
    signal.addEventListener('abort', () => resolve(), { once: true });
  });
