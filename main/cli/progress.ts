/** A line on stderr that is rewritten in place; nothing at all when stderr is no terminal. */
export function progressLine(what: string): { show: (done: number, total: number) => void; clear: () => void } {
  if (!process.stderr.isTTY) return { show: () => undefined, clear: () => undefined };
  return {
    show: (done, total) => process.stderr.write(`\r${what} ${done} of ${total}\x1b[K`),
    clear: () => process.stderr.write('\r\x1b[K'),
  };
}
