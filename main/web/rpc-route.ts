import type { IncomingMessage, ServerResponse } from 'node:http';
import { FRAMED_TYPE, JSON_TYPE, packFramed, parseJson, unpackFramed } from '../../app/contract/framing.ts';
import { type ProcedureName, procedures } from '../../app/contract/procedures.ts';
import type { Reply } from '../../app/contract/transport.ts';
import { AppError } from '../../app/errors.ts';
import { refusal } from '../rpc/dispatch.ts';
import type { Host } from '../rpc/host.ts';
import { sendRefusal, sendReply } from './answer.ts';
import { readBody, TooLarge } from './read-body.ts';

const MAX_JSON_BYTES = 64e6;
/** JSON part and bytes of a framed body: a little more than the largest upload. */
const MAX_FRAMED_BYTES = 260e6;
/** A JSON answer that takes long is begun with white space, so that nobody on the way takes the connection for dead. */
const KEEP_ALIVE_MS = 15_000;
/** How long the rest of a refused body is read and thrown away, so that the caller gets to see the answer; then it is cut off. */
const LINGER_MS = 2_000;

/** `POST /rpc/<name>`: the caller is known already. */
export async function answerCall(
  host: Host,
  name: string,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  if (request.method !== 'POST') {
    response.setHeader('Allow', 'POST');
    return refuse(request, response, 405, 'a procedure is called with POST');
  }
  const type = request.headers['content-type']?.split(';', 1)[0]?.trim().toLowerCase();
  if (type !== JSON_TYPE && type !== FRAMED_TYPE) {
    return refuse(request, response, 415, `the content type must be ${JSON_TYPE} or ${FRAMED_TYPE}`);
  }
  let input: unknown;
  try {
    input = inputOf(type, await readBody(request, type === JSON_TYPE ? MAX_JSON_BYTES : MAX_FRAMED_BYTES));
  } catch (error) {
    if (error instanceof TooLarge) return refuse(request, response, 413, error.message);
    if (request.destroyed && !request.complete) return;
    return sendReply(
      response,
      400,
      refusal(error, (unexpected) => host.logFailure('reading a body', unexpected)),
    );
  }
  await answer(host, name, input, response);
}

async function answer(host: Host, name: string, input: unknown, response: ServerResponse): Promise<void> {
  response.on('close', () => {
    // Nobody waits any more.
    const jobId = (input as { jobId?: unknown } | null)?.jobId;
    if (!response.writableFinished && typeof jobId === 'string') host.stopJob(jobId);
  });
  const keepAlive = setInterval(() => {
    // A framed answer has no place for it.
    if (answersBytes(name)) return;
    if (!response.headersSent) response.writeHead(200, { 'Content-Type': JSON_TYPE });
    response.write(' ');
  }, KEEP_ALIVE_MS);
  const reply = await host.dispatch(name, input).finally(() => clearInterval(keepAlive));
  const framed = response.headersSent ? undefined : framedReply(reply);
  if (framed === undefined) return sendReply(response, 200, reply);
  response.writeHead(200, { 'Content-Type': FRAMED_TYPE, 'Content-Length': framed.length });
  response.end(framed);
}

function inputOf(type: string, body: Uint8Array): unknown {
  if (type === JSON_TYPE) return parseJson(body);
  const { json, bytes } = unpackFramed(body);
  if (typeof json !== 'object' || json === null || Array.isArray(json)) {
    throw new AppError('input', 'the JSON part of the body must be an object; received something else', 'body');
  }
  return { ...json, bytes };
}

function answersBytes(name: string): boolean {
  if (!Object.hasOwn(procedures, name)) return false;
  const { output } = procedures[name as ProcedureName];
  return 'shape' in output && 'bytes' in output.shape;
}

/** undefined for a reply without bytes. */
function framedReply(reply: Reply): Uint8Array | undefined {
  if (!reply.ok || typeof reply.value !== 'object' || reply.value === null) return undefined;
  const { bytes, ...rest } = reply.value as { readonly bytes?: unknown };
  return bytes instanceof Uint8Array ? packFramed({ json: { ok: true, value: rest }, bytes }) : undefined;
}

/** Turns a request away whose body was not read, or not to its end. */
function refuse(request: IncomingMessage, response: ServerResponse, status: number, message: string): void {
  sendRefusal(response, status, message);
  if (request.complete) return;
  request.resume();
  const linger = setTimeout(() => request.destroy(), LINGER_MS);
  request.on('end', () => clearTimeout(linger));
  request.on('close', () => clearTimeout(linger));
}
