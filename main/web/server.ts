import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { AppError } from '../../app/errors.ts';
import type { Host } from '../rpc/host.ts';
import { sendRefusal } from './answer.ts';
import { EventStreams } from './event-streams.ts';
import { newToken, refuseCaller, refusePlace } from './guard.ts';
import { answerCall } from './rpc-route.ts';
import { SECURITY_HEADERS } from './security-headers.ts';
import { StaticFiles } from './static-files.ts';
import { answerFile, sendText } from './static-route.ts';

const LOOPBACK = '127.0.0.1';
/** Of a request's head, and of a whole request: who sends slower is cut off. */
const HEADERS_TIMEOUT_MS = 10_000;
const REQUEST_TIMEOUT_MS = 120_000;
const MOST_CONNECTIONS = 64;
const MAX_HEADER_BYTES = 8192;
/** Answers under way get this long when the server stops. */
const CLOSE_GRACE_MS = 500;

export interface WebServerOptions {
  readonly host: Host;
  /** Folder of the window's build. */
  readonly rendererFolder: string;
  /** 0: any free one. */
  readonly port: number;
  /** Called with the number of windows that listen, after each change. */
  readonly onWindowCount?: (count: number) => void;
}

export interface WebServer {
  /** `http://127.0.0.1:PORT` */
  readonly origin: string;
  readonly token: string;
  /** Ends the event streams and takes no more requests. The host is the caller's. */
  close(): Promise<void>;
}

/** Serves the window and its procedures on the loopback address. Throws `input` when the port cannot be had. */
export async function startWebServer(options: WebServerOptions): Promise<WebServer> {
  const { host } = options;
  const token = newToken();
  const streams = new EventStreams(host.events, options.onWindowCount ?? (() => undefined));
  const files = new StaticFiles(options.rendererFolder);
  const limits = { maxHeaderSize: MAX_HEADER_BYTES, connectionsCheckingInterval: 2_000 };
  const server = createServer({ ...limits, headersTimeout: HEADERS_TIMEOUT_MS, requestTimeout: REQUEST_TIMEOUT_MS });
  server.maxConnections = MOST_CONNECTIONS;
  await listen(server, options.port);
  const address = `${LOOPBACK}:${(server.address() as AddressInfo).port}`;
  server.on('request', (request, response) => {
    answer(request, response).catch((error: unknown) => {
      host.logFailure('answering a request', error);
      response.destroy();
    });
  });

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    for (const [name, value] of Object.entries(SECURITY_HEADERS)) response.setHeader(name, value);
    const place = refusePlace(request, address);
    if (place !== null) return sendText(response, place.status, place.message, { Connection: 'close' });
    const path = request.url!.split('?', 1)[0]!;
    const procedure = /^\/rpc\/([^/]*)$/.exec(path)?.[1];
    if (procedure === undefined && path !== '/events') return answerFile(files, path, request, response);
    response.setHeader('Cache-Control', 'no-store');
    const caller = refuseCaller(request, token);
    if (caller !== null) {
      response.setHeader('Connection', 'close');
      return sendRefusal(response, caller.status, caller.message);
    }
    if (procedure !== undefined) return answerCall(host, procedure, request, response);
    if (request.method === 'GET') return streams.open(response);
    response.setHeader('Allow', 'GET');
    sendRefusal(response, 405, 'events are read with GET');
  }

  return {
    origin: `http://${address}`,
    token,
    close: async () => {
      streams.closeAll();
      const closed = new Promise<void>((resolve) => server.close(() => resolve()));
      server.closeIdleConnections();
      const grace = setTimeout(() => server.closeAllConnections(), CLOSE_GRACE_MS);
      await closed;
      clearTimeout(grace);
    },
  };
}

function listen(server: Server, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => {
      const why = error.code === 'EADDRINUSE' ? 'is in use by another program' : `cannot be used: ${error.message}`;
      reject(new AppError('input', `--port ${port} ${why}`, '--port', { cause: error }));
    });
    server.listen(port, LOOPBACK, resolve);
  });
}
