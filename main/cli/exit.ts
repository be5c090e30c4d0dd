import { CommanderError } from 'commander';
import { AppError } from '../../app/errors.ts';
import { visibleText } from '../../app/report/safe-text.ts';
import { removeTemporaryFiles } from '../files/write-text.ts';

/** Exit codes: part of the contract with scripts. */
export const EXIT_DONE = 0;
/** Done, but a margin falls short or a check fails. */
export const EXIT_SHORT = 1;
const EXIT_INPUT = 2;
const EXIT_UNEXPECTED = 3;
/** 128 + signal number, as shells report it. */
const EXIT_INTERRUPTED = 130;
const EXIT_TERMINATED = 143;

/** Says what went wrong on stderr and returns the exit code. */
export function reportFailure(error: unknown): number {
  if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT_DONE : EXIT_INPUT;
  if (error instanceof AppError && error.code !== 'internal') {
    const lines = error.message.split('\n').map(visibleText);
    process.stderr.write(`quietboard: ${lines.join('\n')}\n`);
    return error.code === 'cancelled' ? EXIT_INTERRUPTED : EXIT_INPUT;
  }
  const text = error instanceof Error ? (error.stack ?? error.message) : String(error);
  const lines = text.split('\n').map(visibleText);
  process.stderr.write(`quietboard: unexpected failure, please report it: ${lines.join('\n')}\n`);
  return EXIT_UNEXPECTED;
}

/** Whoever starts a command often passes the user's one Ctrl-C on a second time. */
const SAME_INTERRUPT_MS = 1000;

interface Interrupt {
  readonly handler: () => void;
  calledAtMs: number | undefined;
}
let expected: Interrupt | undefined;

/** For commands that run until they are stopped: the first Ctrl-C calls `handler`, a later one ends the process. */
export function onInterrupt(handler: () => void): void {
  expected = { handler, calledAtMs: undefined };
}

/** Whether the command has taken the interrupt upon itself. */
function handInterruptOver(): boolean {
  if (expected === undefined) return false;
  const nowMs = performance.now();
  if (expected.calledAtMs !== undefined) return nowMs - expected.calledAtMs < SAME_INTERRUPT_MS;
  expected.calledAtMs = nowMs;
  expected.handler();
  return true;
}

/** Ends the process in an orderly way on signals, on failures nobody caught, and when nobody reads the output. */
export function guardProcess(): void {
  const endNow = (code: number) => {
    removeTemporaryFiles();
    process.exit(code);
  };
  const interrupt = (code: number) => {
    // The shell's prompt must not land behind a progress line.
    if (process.stderr.isTTY) process.stderr.write('\n');
    if (!handInterruptOver()) endNow(code);
  };
  process.on('SIGINT', () => interrupt(EXIT_INTERRUPTED));
  process.on('SIGTERM', () => interrupt(EXIT_TERMINATED));
  process.on('uncaughtException', (error) => endNow(reportFailure(error)));
  process.on('unhandledRejection', (error) => endNow(reportFailure(error)));
  // A reader that closes early (`| head`) has what it wanted; files are written before anything is printed.
  process.stdout.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code === 'EPIPE') endNow(Number(process.exitCode ?? EXIT_DONE));
    else endNow(reportFailure(error));
  });
  process.stderr.on('error', () => undefined);
}
