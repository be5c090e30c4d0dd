import { UNSTABLE_ToastQueue as ToastQueue } from 'react-aria-components';
import { AppError } from '../../app/errors.ts';

/** A short notice at the window's edge; never the only place where something can be read. */
export interface Notice {
  readonly tone: 'plain' | 'problem';
  readonly text: string;
  readonly action?: { readonly label: string; readonly run: () => void };
}

export const notices = new ToastQueue<Notice>({ maxVisibleToasts: 4 });

/** Time to read and act; problems stay until they are closed. */
export const NOTICE_MS = 8000;

/** Shows a notice; the returned function takes it away. */
export function notify(notice: Notice, onClose?: () => void): () => void {
  const key = notices.add(notice, {
    ...(notice.tone === 'plain' && { timeout: NOTICE_MS }),
    ...(onClose && { onClose }),
  });
  return () => notices.close(key);
}

/** Words of a failure for the user; `null` when it was wanted (a job was stopped). */
export function failureText(error: unknown): string | null {
  if (!(error instanceof AppError)) return `Unexpected: ${error instanceof Error ? error.message : String(error)}`;
  return error.code === 'cancelled' ? null : error.message;
}

/** Runs an action of the user; its failure becomes a notice. */
export async function attempt(what: string, action: () => Promise<void>): Promise<void> {
  try {
    await action();
  } catch (error) {
    const text = failureText(error);
    if (text !== null) notify({ tone: 'problem', text: text.startsWith(`${what}: `) ? text : `${what}: ${text}` });
  }
}
